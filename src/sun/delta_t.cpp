#include "sun/delta_t.h"

#include <erfa.h>

namespace sunfall {
namespace {

constexpr double kTtMinusTai_s = 32.184;  // by definition
constexpr int kFirstTableYear = 1972;
// The first year for which ERFA 2.0 warns that its table may lack a leap second.
constexpr int kFirstYearAfterTable = 2027;

double fractional_year(UtcTime time) {
  const auto day = std::chrono::floor<std::chrono::days>(time);
  const auto year = Date{day}.year();
  const auto first = std::chrono::sys_days{year / std::chrono::January / 1};
  const double days = std::chrono::duration<double, std::chrono::days::period>(time - first).count();
  return static_cast<int>(year) + days / (year.is_leap() ? 366.0 : 365.0);
}

double table_s(const Date& date) {
  double tai_minus_utc = 0.0;
  eraDat(static_cast<int>(date.year()), static_cast<int>(static_cast<unsigned>(date.month())),
         static_cast<int>(static_cast<unsigned>(date.day())), 0.0, &tai_minus_utc);
  return tai_minus_utc + kTtMinusTai_s;
}

}  // namespace

// Espenak, F. and Meeus, J. (2006), Five Millennium Canon of Solar Eclipses, NASA/TP-2006-214141.
double polynomial_delta_t_s(double year) {
  if (year < 1961.0) {
    const double t = year - 1950.0;
    return 29.07 + t * (0.407 + t * (-1.0 / 233.0 + t / 2547.0));
  }
  if (year < 1986.0) {
    const double t = year - 1975.0;
    return 45.45 + t * (1.067 + t * (-1.0 / 260.0 - t / 718.0));
  }
  if (year < 2005.0) {
    const double t = year - 2000.0;
    return 63.86 + t * (0.3345 + t * (-0.060374 + t * (0.0017275 + t * (0.000651814 + t * 0.00002373599))));
  }
  if (year < 2050.0) {
    const double t = year - 2000.0;
    return 62.92 + t * (0.32217 + t * 0.005589);
  }
  const double centuries = (year - 1820.0) / 100.0;
  return -20.0 + 32.0 * centuries * centuries - 0.5628 * (2150.0 - year);
}

double tt_minus_utc_s(UtcTime time) {
  const Date date{std::chrono::floor<std::chrono::days>(time)};
  const int year = static_cast<int>(date.year());
  if (year < kFirstTableYear) return polynomial_delta_t_s(fractional_year(time));
  if (year < kFirstYearAfterTable) return table_s(date);
  const Date last = std::chrono::year{kFirstYearAfterTable - 1} / std::chrono::December / 31;
  return table_s(last) + polynomial_delta_t_s(fractional_year(time)) -
         polynomial_delta_t_s(kFirstYearAfterTable);
}

}  // namespace sunfall

#include "light/unit_check.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <map>

#include "core/month_names.h"
#include "light/flux_unit.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

// A cloudless hour's clearness, and how far the clearest two hours in a hundred may lie from it in any
// climate before the unit must be another.
constexpr double kClear = 0.75;
constexpr double kLeastBright = 0.35;
constexpr double kOddlyDark = 0.5;
constexpr double kMostBright = 1.10;
constexpr double kHighSun_w_m2 = 350.0;  // above the air on the level: some 15 degrees high
constexpr std::size_t kLeastReadings = 50;
constexpr std::size_t kLeastOfMonth = 20;
constexpr double kSurelyOther = 2.5;  // the clearest hours of one climate's months differ by less

// The value that so many in a hundred do not exceed.
double brightest(std::vector<double>& clearness, std::size_t percent) {
  const auto at = clearness.begin() + static_cast<std::ptrdiff_t>(clearness.size() * percent / 100);
  std::nth_element(clearness.begin(), at, clearness.end());
  return *at;
}

using Month = std::chrono::year_month;

Month month_of(std::int64_t utc_s) {
  const auto day =
      std::chrono::floor<std::chrono::days>(std::chrono::sys_seconds{std::chrono::seconds{utc_s}});
  const std::chrono::year_month_day date{day};
  return date.year() / date.month();
}

std::string month_text(Month month) {
  return fmt::format("{} {}", month_name(unsigned{month.month()} - 1), int{month.year()});
}

// The clearness of all readings under a high sun, in the order of the record, by month.
std::map<Month, std::vector<double>> clearness_by_month(const Readings& readings,
                                                        const std::vector<IntervalSun>& suns, double watts) {
  std::map<Month, std::vector<double>> months;
  const auto value_w = [&](std::size_t quantity, std::size_t i) {
    return readings.has(quantity) ? readings.value[quantity][i] * watts : std::nan("");
  };
  std::vector<double>* here = nullptr;
  std::int64_t day = 0;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (suns[i].level_w < kHighSun_w_m2) continue;
    double global_w = value_w(kGlobal, i);
    if (std::isnan(global_w)) global_w = value_w(kDiffuse, i) + value_w(kBeam, i) * suns[i].beam_sine;
    if (std::isnan(global_w)) continue;
    const std::int64_t its_day = readings.begin_s[i] / 86400;
    if (here == nullptr || its_day != day) here = &months[month_of(readings.begin_s[i])];
    day = its_day;
    here->push_back(global_w / suns[i].level_w);
  }
  return months;
}

// Months that are brighter than any sky can be.
struct OddMonths {
  std::vector<Month> months;
  std::vector<double> clearness;  // of all their readings
  double brightest_other = 0.0;   // of the months that may be right; 0 without one
};
OddMonths too_bright(std::map<Month, std::vector<double>>& months) {
  OddMonths odd;
  for (auto& [month, clearness] : months) {
    if (clearness.size() < kLeastOfMonth) continue;
    if (brightest(clearness, 90) > kMostBright) {
      odd.months.push_back(month);
      odd.clearness.insert(odd.clearness.end(), clearness.begin(), clearness.end());
    } else if (const double bright = brightest(clearness, 98); bright <= kMostBright) {
      odd.brightest_other = std::max(odd.brightest_other, bright);
    }
  }
  return odd;
}

std::string advice(const std::string& real) {
  if (real.empty()) return "name the unit of the file; see the plan's page for those known";
  if (real.ends_with("lux"))
    return "the values look like " + real +
           ": a lux meter weighs light as eyes do; measure radiation or photons";
  return "the values look like " + real;
}

[[noreturn]] void refuse_months(OddMonths& odd, const Readings& readings, SeriesSource::Unit unit) {
  const double times = brightest(odd.clearness, 98) / kClear;
  const std::string more = odd.months.size() > 1 ? fmt::format(" and {} more month{}", odd.months.size() - 1,
                                                               odd.months.size() > 2 ? "s" : "")
                                                 : "";
  throw Error(
      ErrorKind::data,
      {.what = fmt::format("the values of some months do not fit the unit {}", unit_name(unit)),
       .where = readings.file,
       .found =
           fmt::format("the clearest hours of {}{} have {:.3g} times the light of a cloudless sky, those "
                       "of other months do not",
                       month_text(odd.months.front()), more, times),
       .remedy = advice(unit_of_values(times, unit, readings.step)) + " there; bring the file to one unit"});
}

}  // namespace

std::string check_unit(const Readings& readings, const std::vector<IntervalSun>& suns,
                       SeriesSource::Unit unit) {
  std::map<Month, std::vector<double>> months =
      clearness_by_month(readings, suns, rough_w_per_unit(unit, readings.step));
  OddMonths odd = too_bright(months);
  const bool some = !odd.months.empty() && odd.brightest_other > 0.0;
  // A whole record in photons, taken for watts, has winter months that look right, but not so far off.
  if (some && brightest(odd.clearness, 98) > kSurelyOther * odd.brightest_other)
    refuse_months(odd, readings, unit);
  std::vector<double> all;
  for (const auto& [month, clearness] : months) all.insert(all.end(), clearness.begin(), clearness.end());
  if (all.size() < kLeastReadings) return "";
  const double bright = brightest(all, 98);
  if (bright >= kLeastBright && bright <= kMostBright) {
    if (some) refuse_months(odd, readings, unit);
    if (bright >= kOddlyDark) return "";
    return fmt::format(
        "the clearest hours have only {:.0f} % of a cloudless sky's light: is the sensor shaded, dirty "
        "or under a cover?",
        100.0 * bright / kClear);
  }
  throw Error(ErrorKind::data,
              {.what = fmt::format("the values do not fit the unit {}", unit_name(unit)),
               .where = readings.file,
               .found = fmt::format("its clearest hours have {:.3g} times the light of a cloudless sky",
                                    bright / kClear),
               .remedy = advice(unit_of_values(bright / kClear, unit, readings.step))});
}

}  // namespace sunfall

#include "light/monthly.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "light/clear.h"
#include "light/daily_ratios.h"
#include "light/sky_split.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using Months = std::array<double, 12>;

// Twilight, frost on an instrument or rounding: less than this counts as none in polar night.
constexpr double kTwilight_mj_m2_d = 0.05;
// A sky much cleaner than most (Linke turbidity 2) bounds what a month can bring.
constexpr double kCleanTurbidity = 2.0;

[[noreturn]] void refuse(const LightRequest& request, std::size_t month, std::string what, double value,
                         std::string remedy) {
  throw Error(ErrorKind::plan, {.what = fmt::format("{}: {}", month_name(month), what),
                                .where = request.where,
                                .found = fmt::format("{} MJ m-2 d-1", value),
                                .remedy = std::move(remedy)});
}

void check(const Months& given, const Months& ceiling, const LightRequest& request) {
  for (std::size_t month = 0; month < 12; ++month) {
    const double value = given[month];
    if (!std::isfinite(value))
      refuse(request, month, "global radiation is not a number", value, "give a number");
    if (value < 0.0) refuse(request, month, "global radiation is negative", value, "give 0 or more");
    if (value > ceiling[month] && value > kTwilight_mj_m2_d) {
      refuse(
          request, month,
          fmt::format("global radiation is more than the sun sends to the top of the air, {:.1f} MJ m-2 d-1",
                      ceiling[month]),
          value, "is it MJ m-2 d-1, January first? W m-2 times 0.0864 and kWh m-2 d-1 times 3.6 give it");
    }
  }
}

Months clear_sky_ceiling(const LightSeries& open) {
  LightSeries clear = open;
  Months turbidity;
  turbidity.fill(kCleanTurbidity);
  fill_clear_sky(clear, turbidity);
  return monthly_mean_mj_m2_d(clear, [&clear](std::size_t i) {
    return static_cast<double>(clear.steps[i].beam_w) + clear.steps[i].sky_w;
  });
}

void note_oddities(const Months& given, const Months& extraterrestrial, LightSeries& series) {
  const Months clear = clear_sky_ceiling(series);
  for (std::size_t month = 0; month < 12; ++month) {
    if (given[month] <= kTwilight_mj_m2_d) {
      if (given[month] > extraterrestrial[month]) {
        series.notes.push_back(fmt::format("{}: the sun does not rise; {:.3g} MJ m-2 d-1 counts as none",
                                           month_name(month), given[month]));
      }
      continue;
    }
    if (given[month] > clear[month]) {
      series.notes.push_back(fmt::format(
          "{}: {:.1f} MJ m-2 d-1 is more than a very clean cloudless sky gives ({:.1f}); check the value",
          month_name(month), given[month], clear[month]));
    } else if (given[month] < 0.1 * extraterrestrial[month]) {
      series.notes.push_back(fmt::format(
          "{}: {:.1f} MJ m-2 d-1 is less than a tenth of what the sun sends ({:.1f}); check the value",
          month_name(month), given[month], extraterrestrial[month]));
    }
  }
  // Under such a sun even the dullest climates have a month above 8.5 MJ; in kWh none has.
  if (*std::max_element(given.begin(), given.end()) < 8.5 &&
      *std::max_element(extraterrestrial.begin(), extraterrestrial.end()) > 25.0) {
    series.notes.push_back(
        "monthly_global is so low all year that it may be in kWh m-2 d-1: times 3.6 gives MJ");
  }
}

// The sun of one step in the frame of the equator: hour angle and declination.
struct StepSun {
  Angle hour_angle;
  Angle declination;
};

StepSun sun_of_step(const LightSeries& series, std::size_t step) {
  const SkyDirection& left = series.sun.edges[step];
  const SkyDirection& right = series.sun.edges[step + 1];
  const double east = 0.5 * (left.east + right.east);
  const double north = 0.5 * (left.north + right.north);
  const double up = 0.5 * (left.up + right.up);
  const Angle latitude = series.place.latitude;
  return {Angle::radians(std::atan2(-east, up * cos(latitude) - north * sin(latitude))),
          Angle::radians(std::asin(std::clamp(up * sin(latitude) + north * cos(latitude), -1.0, 1.0)))};
}

// Declination in the middle of a day, clear of refraction where the sun is up.
Angle declination_of_day(const LightSeries& series, std::size_t day) {
  const auto first = series.sun.mean_sine.begin() + static_cast<std::ptrdiff_t>(day * kStepsPerDay);
  const auto highest = std::max_element(first, first + kStepsPerDay);
  const auto step = static_cast<std::size_t>(highest - series.sun.mean_sine.begin());
  return sun_of_step(series, step).declination;
}

// One day's course: its sum over the steps by Collares-Pereira and Rabl, renormalised, the diffuse
// part along the sine of elevation (Liu and Jordan) as far as the steps can hold it.
class DayCourse {
 public:
  DayCourse(LightSeries& series, std::size_t day) : series_(series), first_(day * kStepsPerDay) {}

  void fill(double global_w_steps, double diffuse_part, Angle sunset) {
    std::array<StepShare, kStepsPerDay> shares;
    const std::array<double, kStepsPerDay> weights = global_weights(sunset);
    const double weight_sum = std::accumulate(weights.begin(), weights.end(), 0.0);
    if (weight_sum <= 0.0) return;
    for (std::size_t i = 0; i < kStepsPerDay; ++i) {
      const double global_w = global_w_steps * weights[i] / weight_sum;
      const double above_air_w = extraterrestrial_level_w_m2(series_, first_ + i);
      shares[i] = {series_.sun.mean_sine[first_ + i], std::max(0.0, global_w - above_air_w), global_w};
    }
    const std::vector<double> sky_w = spread_sky(shares, diffuse_part * global_w_steps);
    for (std::size_t i = 0; i < kStepsPerDay; ++i) {
      series_.steps[first_ + i].sky_w = static_cast<float>(sky_w[i]);
      series_.steps[first_ + i].beam_w = static_cast<float>(shares[i].most - sky_w[i]);
    }
  }

 private:
  std::array<double, kStepsPerDay> global_weights(Angle sunset) const {
    std::array<double, kStepsPerDay> weights{};
    for (std::size_t i = 0; i < kStepsPerDay; ++i) {
      const double mean_sine = series_.sun.mean_sine[first_ + i];
      if (mean_sine <= 0.0) continue;
      weights[i] = mean_sine * collares_pereira_rabl(sun_of_step(series_, first_ + i).hour_angle, sunset);
    }
    return weights;
  }

  LightSeries& series_;
  std::size_t first_;
};

double extraterrestrial_w_steps(const LightSeries& series, std::size_t day) {
  double sum_w = 0.0;
  for (std::size_t i = day * kStepsPerDay; i < (day + 1) * kStepsPerDay; ++i) {
    sum_w += extraterrestrial_level_w_m2(series, i);
  }
  return sum_w;
}

// Erbs's split of each month at the sunset of its mean declination.
Months diffuse_parts(const LightSeries& series, const Months& clearness) {
  Months declination_sum_rad{};
  const std::vector<int> months = months_of_days(series);
  for (std::size_t day = 0; day < months.size(); ++day) {
    declination_sum_rad[static_cast<std::size_t>(months[day])] += declination_of_day(series, day).radians();
  }
  const std::array<int, 12> days = days_of_months(series);
  Months parts{};
  for (std::size_t month = 0; month < 12; ++month) {
    const Angle declination = Angle::radians(declination_sum_rad[month] / days[month]);
    parts[month] =
        erbs_monthly_diffuse_part(clearness[month], sunset_hour_angle(series.place.latitude, declination));
  }
  return parts;
}

}  // namespace

LightSeries make_series(const MonthlyGlobalSource& source, const LightRequest& request) {
  const Months& given = source.global_mj_m2_d;
  LightSeries series = open_series(request);
  const Months extraterrestrial = monthly_mean_mj_m2_d(
      series, [&series](std::size_t i) { return extraterrestrial_level_w_m2(series, i); });
  check(given, extraterrestrial, request);
  note_oddities(given, extraterrestrial, series);

  Months clearness{};
  for (std::size_t month = 0; month < 12; ++month) {
    if (extraterrestrial[month] > 0.0)
      clearness[month] = std::min(1.0, given[month] / extraterrestrial[month]);
  }
  const Months diffuse = diffuse_parts(series, clearness);
  const std::vector<int> months = months_of_days(series);
  for (std::size_t day = 0; day < months.size(); ++day) {
    const auto month = static_cast<std::size_t>(months[day]);
    const Angle sunset = sunset_hour_angle(series.place.latitude, declination_of_day(series, day));
    DayCourse(series, day)
        .fill(clearness[month] * extraterrestrial_w_steps(series, day), diffuse[month], sunset);
  }
  series.description = "monthly means of daily global radiation, every day of a month equally clear";
  series.notes.push_back(
      "monthly means hold no dull and bright days: beam and sky are those of the mean day (Erbs and others "
      "1982)");
  add_photons(series);
  return series;
}

}  // namespace sunfall

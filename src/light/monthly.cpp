#include "light/monthly.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "light/clear.h"
#include "light/daily_ratios.h"
#include "light/day_course.h"
#include "light/varied_days.h"
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

// The split of each month's mean day, at the sunset of its mean declination.
Months diffuse_parts(const LightSeries& series, DaySplit split, const Months& clearness) {
  Months declination_sum_rad{};
  const std::vector<int> months = months_of_days(series);
  for (std::size_t day = 0; day < months.size(); ++day) {
    declination_sum_rad[static_cast<std::size_t>(months[day])] += declination_of_day(series, day).radians();
  }
  const std::array<int, 12> days = days_of_months(series);
  Months parts{};
  for (std::size_t month = 0; month < 12; ++month) {
    const Angle declination = Angle::radians(declination_sum_rad[month] / days[month]);
    const Angle sunset = sunset_hour_angle(series.place.latitude, declination);
    parts[month] = monthly_diffuse_part(split, clearness[month], sunset);
  }
  return parts;
}

StepLight mean_days(const MonthlyGlobalSource& source, const Months& extraterrestrial,
                    const LightSeries& series) {
  Months clearness{};
  for (std::size_t month = 0; month < 12; ++month) {
    if (extraterrestrial[month] > 0.0)
      clearness[month] = std::min(1.0, source.global_mj_m2_d[month] / extraterrestrial[month]);
  }
  const Months diffuse = diffuse_parts(series, source.split, clearness);
  StepLight steps = unknown_steps(series);
  const std::vector<int> months = months_of_days(series);
  for (std::size_t day = 0; day < months.size(); ++day) {
    const auto month = static_cast<std::size_t>(months[day]);
    const double global = clearness[month] * above_air_of_day(series, day);
    lay_global(steps, series, day, global);
    lay_sky(steps, series, day, diffuse[month] * global);
  }
  return steps;
}

// Each month of each year gets days of its own, of which the mean is the one given.
StepLight varied_days(const MonthlyGlobalSource& source, const LightSeries& series) {
  ClearnessMaker maker(source.seed, source.persistence);
  StepLight steps = unknown_steps(series);
  const std::vector<int> months = months_of_days(series);
  for (std::size_t first = 0; first < months.size();) {
    std::vector<double> above_air;
    for (std::size_t day = first; day < months.size() && months[day] == months[first]; ++day) {
      above_air.push_back(above_air_of_day(series, day));
    }
    const double sum = std::accumulate(above_air.begin(), above_air.end(), 0.0);
    const double given = source.global_mj_m2_d[static_cast<std::size_t>(months[first])] *
                         static_cast<double>(above_air.size()) / kMegajoulePerWattStep;
    const double mean = sum > 0.0 ? std::min(1.0, given / sum) : 0.0;
    const std::vector<double> clearness = maker.month(mean, above_air);
    for (std::size_t k = 0; k < above_air.size(); ++k) {
      const std::size_t day = first + k;
      const double global = clearness[k] * above_air[k];
      lay_global(steps, series, day, global);
      lay_sky(steps, series, day,
              daily_diffuse_part(source.split, clearness[k], sunset_of_day(series, day)) * global);
    }
    first += above_air.size();
  }
  return steps;
}

void describe(const MonthlyGlobalSource& source, LightSeries& series) {
  if (source.days == MonthlyGlobalSource::Days::mean) {
    series.description = "monthly means of daily global radiation, every day of a month equally clear";
    series.notes.push_back(
        fmt::format("monthly means hold no dull and bright days: beam and sky are those of the mean day ({})",
                    name_of(source.split)));
    return;
  }
  series.description =
      fmt::format("monthly means of daily global radiation, with made days that vary (seed {}, {} year{})",
                  source.seed, source.years, source.years == 1 ? "" : "s");
  series.notes.push_back(fmt::format(
      "the days are made, not measured: each month's follow the distribution of Bendt, Collares-Pereira and "
      "Rabl (1981) for its mean clearness, a day is like the one before by {:g}, seed {}; every month of "
      "every year keeps the given mean, so that the years do not stand for good and bad ones, and no "
      "percentiles over them are told. Beam and sky of each day by {}",
      source.persistence, source.seed, name_of(source.split)));
}

// A program may ask for what no plan can.
void check_days(const MonthlyGlobalSource& source, const LightRequest& request) {
  const bool good = source.years >= 1 && source.persistence >= 0.0 && source.persistence <= 0.9;
  if (good) return;
  throw Error(ErrorKind::plan,
              {.what = "days cannot be made so",
               .where = request.where,
               .found = fmt::format("{} years, persistence {:g}", source.years, source.persistence),
               .remedy = "give at least one year, and a persistence from 0 to 0.9"});
}

}  // namespace

LightSeries make_series(const MonthlyGlobalSource& source, const LightRequest& request) {
  const bool varied = source.days == MonthlyGlobalSource::Days::varied;
  if (varied) check_days(source, request);
  LightSeries series = varied ? open_series(request, std::chrono::year{request.options.year}, source.years)
                              : open_series(request);
  const Months extraterrestrial = monthly_mean_mj_m2_d(
      series, [&series](std::size_t i) { return extraterrestrial_level_w_m2(series, i); });
  check(source.global_mj_m2_d, extraterrestrial, request);
  note_oddities(source.global_mj_m2_d, extraterrestrial, series);
  write_steps(varied ? varied_days(source, series) : mean_days(source, extraterrestrial, series), series);
  describe(source, series);
  series.made_years = varied;
  add_photons(series);
  return series;
}

}  // namespace sunfall

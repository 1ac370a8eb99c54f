#include "light/clock_check.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <complex>
#include <numbers>

#include "light/open_series.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr double kWrong_min = 40.0;
constexpr double kOdd_min = 20.0;
constexpr std::size_t kLeastDays = 5;

// A day's light and that above the air as sums over the turning clock: their angles are the hours about which
// they lie evenly, whatever a wrong clock has pushed past midnight.
struct DayLight {
  std::complex<double> light;
  std::complex<double> sun;
  double light_sum = 0.0;
  double sun_sum = 0.0;
};

std::vector<DayLight> days_of(const Readings& readings, const std::vector<IntervalSun>& suns,
                              const LightSeries& series) {
  const std::int64_t origin_s = series.sun.begin.time_since_epoch().count();
  const std::size_t quantity = readings.has(kGlobal) ? kGlobal : kDiffuse;
  std::vector<DayLight> days(series.steps.size() / kStepsPerDay);
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const double value = readings.value[quantity][i];
    const std::int64_t middle_s = readings.begin_s[i] + readings.step.count() / 2 - origin_s;
    const std::int64_t day = middle_s / 86400;
    if (std::isnan(value) || middle_s < 0 || day >= static_cast<std::int64_t>(days.size())) continue;
    const double turn = 2.0 * std::numbers::pi * static_cast<double>(middle_s % 86400) / 86400.0;
    DayLight& sums = days[static_cast<std::size_t>(day)];
    const double light = std::max(value, 0.0);
    sums.light += std::polar(light, turn);
    sums.sun += std::polar<double>(suns[i].level_w, turn);
    sums.light_sum += light;
    sums.sun_sum += suns[i].level_w;
  }
  return days;
}

double median(std::vector<double> values) {
  const auto middle = values.begin() + static_cast<std::ptrdiff_t>(values.size() / 2);
  std::nth_element(values.begin(), middle, values.end());
  return *middle;
}

// The days of a month nearly as clear as its clearest, as minutes by which their light comes late.
std::vector<double> late_minutes(const std::vector<const DayLight*>& days) {
  double clearest = 0.0;
  for (const DayLight* day : days) clearest = std::max(clearest, day->light_sum / day->sun_sum);
  std::vector<double> late;
  for (const DayLight* day : days) {
    if (day->light_sum / day->sun_sum < 0.85 * clearest) continue;
    const double turn = std::arg(day->light * std::conj(day->sun));
    late.push_back(turn / (2.0 * std::numbers::pi) * 1440.0);
  }
  return late;
}

std::string span_text(double minutes) {
  const double hours = minutes / 60.0;
  if (minutes < 50.0) return fmt::format("{:.0f} minutes", minutes);
  const double halves = std::round(2.0 * hours) / 2.0;
  return fmt::format("about {:g} hour{}", halves, halves == 1.0 ? "" : "s");
}

// What may have shifted a record so; `late_min` as in ClockShifts.
std::string causes(double late_min, const Readings& readings, const SeriesSource& source,
                   std::chrono::seconds utc_offset) {
  using Stamp = SeriesSource::Stamp;
  const auto near = [late_min](double minutes) { return std::abs(late_min - minutes) < 15.0; };
  const double step_min = static_cast<double>(readings.step.count()) / 60.0;
  const double offset_min = static_cast<double>(utc_offset.count()) / 60.0;
  std::string text;
  const auto add = [&](const std::string& words) { text += (text.empty() ? "" : ", or ") + words; };
  if (source.stamp == Stamp::end && near(-step_min)) add("give stamp = \"begin\"");
  if (source.stamp == Stamp::begin && near(step_min)) add("give stamp = \"end\"");
  if (!readings.zone_known && !source.utc && offset_min != 0.0 && near(-offset_min))
    add("give utc = true if the stamps are UTC");
  if (!readings.zone_known && source.utc && offset_min != 0.0 && near(offset_min)) add("remove utc = true");
  add("mend the stamps, the plan's clock or the place of its map");
  return text + "; trust_clock = true takes them as they are";
}

}  // namespace

ClockShifts clock_shifts_min(const Readings& readings, const std::vector<IntervalSun>& suns,
                             const LightSeries& series) {
  const std::vector<DayLight> days = days_of(readings, suns, series);
  const std::vector<int> months = months_of_days(series);
  std::array<std::vector<const DayLight*>, 12> whole_days;
  // Of a day that is whole and long enough to show its middle: 3 MJ m-2 above the air.
  const double least_w_steps = 3e6 / static_cast<double>(readings.step.count());
  for (std::size_t day = 0; day < days.size(); ++day) {
    double above_air_w = 0.0;
    for (std::size_t i = day * kStepsPerDay; i < (day + 1) * kStepsPerDay; ++i) {
      above_air_w += extraterrestrial_level_w_m2(series, i);
    }
    above_air_w *= 600.0 / static_cast<double>(readings.step.count());
    if (above_air_w < least_w_steps || days[day].sun_sum < 0.98 * above_air_w) continue;
    whole_days[static_cast<std::size_t>(months[day])].push_back(&days[day]);
  }
  ClockShifts shifts_min;
  for (std::size_t month = 0; month < 12; ++month) {
    const std::vector<double> late = late_minutes(whole_days[month]);
    if (late.size() >= kLeastDays) shifts_min[month] = median(late);
  }
  return shifts_min;
}

std::string check_clock(const ClockShifts& shifts_min, const Readings& readings, const SeriesSource& source,
                        std::chrono::seconds utc_offset) {
  std::vector<double> known;
  std::vector<double> wrong;
  std::string wrong_months;
  for (std::size_t month = 0; month < 12; ++month) {
    if (!shifts_min[month]) continue;
    known.push_back(*shifts_min[month]);
    if (std::abs(*shifts_min[month]) < kWrong_min) continue;
    wrong.push_back(*shifts_min[month]);
    wrong_months += (wrong_months.empty() ? "" : ", ") + std::string(month_name(month));
  }
  if (known.empty()) return "the clock could not be held against the sun: too few whole clear days";
  const double shift_min = median(known);
  const auto side = [](double late_min) { return late_min > 0.0 ? "after" : "before"; };
  if (std::abs(shift_min) >= kWrong_min && wrong.size() * 4 >= known.size() * 3 && !source.trust_clock) {
    throw Error(ErrorKind::data,
                {.what = fmt::format("the record's clock is wrong by {}", span_text(std::abs(shift_min))),
                 .where = readings.file,
                 .found = fmt::format("the light of clear days comes {:.0f} minutes {} the sun",
                                      std::abs(shift_min), side(shift_min)),
                 .remedy = causes(shift_min, readings, source, utc_offset)});
  }
  if (wrong.size() >= 2 && std::abs(std::abs(median(wrong)) - 60.0) < 20.0 && !source.trust_clock) {
    throw Error(
        ErrorKind::data,
        {.what = "the record's clock is wrong by about an hour in a part of the year, as daylight "
                 "saving time makes it",
         .where = readings.file,
         .found = fmt::format("the light of clear days comes {:.0f} minutes {} the sun in {}",
                              std::abs(median(wrong)), side(median(wrong)), wrong_months),
         .remedy = "write standard time all year, or UTC, or each stamp with its offset; trust_clock = "
                   "true takes them as they are"});
  }
  if (std::abs(shift_min) < kOdd_min && wrong.empty()) return "";
  return fmt::format(
      "the light of clear days comes {:.0f} minutes {} the sun{}: check the stamps, or a hill or haze takes "
      "a "
      "part of the day",
      std::abs(shift_min), side(shift_min),
      wrong_months.empty() ? "" : ", and much more so in " + wrong_months);
}

}  // namespace sunfall

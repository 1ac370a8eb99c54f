#include "light/sunshine.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <optional>

#include "light/day_course.h"
#include "light/day_light.h"
#include "light/day_record.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr double kLongDay_h = 6.0;
constexpr std::size_t kLeastDays = 60;
constexpr double kMostTooLong = 0.05;  // of the days: then it is not a slip but another unit

// From the first to the last of the sun's rim.
double longest_h(const LightSeries& series, std::chrono::sys_days date) {
  const SunDay day = sun_day(Date{date}, series.utc_offset, series.place);
  if (day.kind == SunDay::Kind::always_up) return 24.0;
  if (day.kind == SunDay::Kind::never_up) return 0.0;
  const double hours = std::chrono::duration<double, std::ratio<3600>>(day.set - day.rise).count();
  return hours >= 0.0 ? hours : hours + 24.0;  // the sun sets after midnight
}

// What a record's sunniest days tell when they are so many times longer than days can be.
const char* unit_of_sunshine(double times_day_length) {
  if (times_day_length > 1000.0) return "the values look like seconds: divide by 3600";
  if (times_day_length > 25.0) return "the values look like minutes: divide by 60";
  if (times_day_length > 4.0) return "are they tenths of hours, or per cent of the day's length?";
  return "is the plan's place that of the record?";
}

// What the record says of its days, in the order of the file.
class SunshineCheck {
 public:
  SunshineCheck(const DayRecord& record, const LightSeries& series) : record_(record), series_(series) {}

  void run() {
    for (std::size_t i = 0; i < record_.size(); ++i) look_at(i);
    if (!first_too_long_) {
      if (long_days_ >= kLeastDays && longest_of_long_days_h_ <= 1.0) {
        refuse_unit(fmt::format("no more than {:g} on {} long days", longest_of_long_days_h_, long_days_),
                    "are they parts of the day's length, 0 to 1? Multiply by the length");
      }
      return;
    }
    if (static_cast<double>(too_long_) > kMostTooLong * static_cast<double>(parts_.size()) && days_ >= 20) {
      refuse_unit(fmt::format("{} of {} days have more sunshine than the day is long", too_long_, days_),
                  unit_of_sunshine(bright_part()));
    }
    const std::size_t i = *first_too_long_;
    throw Error(ErrorKind::data,
                {.what = "there is more sunshine than the day is long",
                 .where = record_.where(i),
                 .found = fmt::format("{:g} h of {:.1f} h", hours(i), longest_h(series_, record_.date[i])),
                 .remedy = "mend the value or leave it empty; are these hours, and is the place right?"});
  }

 private:
  double hours(std::size_t i) const { return record_.value[0][i]; }

  void look_at(std::size_t i) {
    if (std::isnan(hours(i))) return;
    if (hours(i) < 0.0) {
      throw Error(ErrorKind::data, {.what = "sunshine is negative",
                                    .where = record_.where(i),
                                    .found = fmt::format("{:g} h", hours(i)),
                                    .remedy = "leave a missing value empty, or write NaN or -9999"});
    }
    ++days_;
    const double most_h = longest_h(series_, record_.date[i]);
    if (most_h > 1.0) parts_.push_back(hours(i) / most_h);
    if (hours(i) > most_h + kSunshineAllowance_h) {
      if (!first_too_long_) first_too_long_ = i;
      ++too_long_;
    }
    if (most_h > kLongDay_h) {
      ++long_days_;
      longest_of_long_days_h_ = std::max(longest_of_long_days_h_, hours(i));
    }
  }

  // Sunshine over the day's length that two days in a hundred exceed.
  double bright_part() {
    if (parts_.empty()) return 1.0;
    const auto at = parts_.begin() + static_cast<std::ptrdiff_t>(parts_.size() * 98 / 100);
    std::nth_element(parts_.begin(), at, parts_.end());
    return *at;
  }

  [[noreturn]] void refuse_unit(const std::string& found, const std::string& remedy) const {
    throw Error(ErrorKind::data, {.what = "the values are not hours of sunshine",
                                  .where = record_.file,
                                  .found = found,
                                  .remedy = remedy});
  }

  const DayRecord& record_;
  const LightSeries& series_;
  std::vector<double> parts_;
  std::size_t days_ = 0;
  std::size_t too_long_ = 0;
  std::optional<std::size_t> first_too_long_;
  std::size_t long_days_ = 0;
  double longest_of_long_days_h_ = 0.0;
};

}  // namespace

double clearness_of_sunshine(double part_of_day, double a_s, double b_s) {
  return a_s + b_s * std::clamp(part_of_day, 0.0, 1.0);
}

double day_length_h(Angle sunset_hour_angle) { return 24.0 * sunset_hour_angle.radians() / std::numbers::pi; }

LightSeries make_series(const SunshineSource& source, const LightRequest& request) {
  const DayRecord record = read_days(source, {source.hours}, request.place);
  LightSeries series = open_years(record, request);
  SunshineCheck(record, series).run();
  series.notes = record.notes;
  std::vector<DayLight> days(series.steps.size() / kStepsPerDay);
  for (std::size_t i = 0; i < record.size(); ++i) {
    const double hours = record.value[0][i];
    if (std::isnan(hours)) continue;
    const std::size_t day = day_of_series(series, record.date[i]);
    const double length_h = day_length_h(sunset_of_day(series, day));
    const double part = length_h > 0.0 ? hours / length_h : 0.0;
    days[day].global = clearness_of_sunshine(part, source.a_s, source.b_s) * above_air_of_day(series, day);
  }
  series.description = fmt::format("record {} of daily sunshine hours, {}", source.file.filename().string(),
                                   years_text(series));
  const bool usual = source.a_s == 0.25 && source.b_s == 0.50;
  series.notes.push_back(fmt::format(
      "global radiation of each day from its hours of sunshine by Angstrom and Prescott (FAO-56 "
      "eq. 35), a_s = {:g} and b_s = {:g}{}",
      source.a_s, source.b_s, usual ? ", which FAO-56 gives for places without values of their own" : ""));
  fill_days(series, days, {source.split, false, source.allow_gaps, source.file.string(), ""});
  return series;
}

}  // namespace sunfall

#include "light/temperature.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "light/day_course.h"
#include "light/day_light.h"
#include "light/day_record.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

// No weather station has shown more (56.7 and −89.2 degrees).
constexpr double kHottest_c = 60.0;
constexpr double kColdest_c = -95.0;
// The hottest place known has a yearly mean of 34.6 degrees.
constexpr double kHottestMean_c = 40.0;
constexpr std::size_t kLeastDays = 300;
constexpr double kManyCapped = 0.25;  // of the days

[[noreturn]] void refuse_unit(const std::string& where, const std::string& found, double value) {
  std::string remedy =
      "are they tenths of a degree? Divide by 10. Leave a missing value empty, or write NaN or -9999";
  if (value > 0.0 && value < 140.0) {
    remedy = "are they degrees Fahrenheit? Subtract 32 and divide by 1.8; tenths of a degree? Divide by 10";
  } else if (value > 180.0 && value < 340.0) {
    remedy = "are they kelvin? Subtract 273.15; tenths of a degree? Divide by 10";
  }
  throw Error(ErrorKind::data, {.what = "the temperatures are not in degrees Celsius",
                                .where = where,
                                .found = found,
                                .remedy = remedy});
}

// Days of which both ends are known.
std::vector<std::size_t> known_days(const DayRecord& record) {
  std::vector<std::size_t> known;
  for (std::size_t i = 0; i < record.size(); ++i) {
    if (!std::isnan(record.value[0][i]) && !std::isnan(record.value[1][i])) known.push_back(i);
  }
  return known;
}

void check_unit(const DayRecord& record, const std::vector<std::size_t>& known) {
  double sum = 0.0;
  for (const std::size_t i : known) {
    for (const std::vector<double>& column : record.value) {
      sum += 0.5 * column[i];
      if (column[i] <= kHottest_c && column[i] >= kColdest_c) continue;
      refuse_unit(record.where(i), fmt::format("{:g}", column[i]), column[i]);
    }
  }
  if (known.size() < kLeastDays) return;
  const double mean = sum / static_cast<double>(known.size());
  if (mean > kHottestMean_c)
    refuse_unit(record.file, fmt::format("a mean of {:.1f} over {} days", mean, known.size()), mean);
}

void check_order(const DayRecord& record, const std::vector<std::size_t>& known,
                 const TemperatureSource& source) {
  const auto is_turned = [&](std::size_t i) { return record.value[1][i] < record.value[0][i]; };
  const auto first = std::find_if(known.begin(), known.end(), is_turned);
  if (first == known.end()) return;
  const auto turned = static_cast<std::size_t>(std::count_if(first, known.end(), is_turned));
  throw Error(
      ErrorKind::data,
      {.what = "the highest temperature of a day is below its lowest",
       .where = record.where(*first),
       .found = fmt::format("{} {:g}, {} {:g}; so on {} of {} days", source.t_min, record.value[0][*first],
                            source.t_max, record.value[1][*first], turned, known.size()),
       .remedy = 2 * turned > known.size() ? "exchange the columns t_min and t_max in the plan"
                                           : "mend the values or leave them empty"});
}

std::string capped_note(std::size_t capped, std::size_t days) {
  const bool many = static_cast<double>(capped) > kManyCapped * static_cast<double>(days);
  return fmt::format(
      "{} of {} days would be clearer than a cloudless one and are taken as cloudless (FAO-56 eq. 37){}",
      capped, days,
      many ? ": so many that k_rs may be too large, or the temperatures not in degrees Celsius" : "");
}

}  // namespace

double clearness_of_range(double t_min_c, double t_max_c, double k_rs) {
  return k_rs * std::sqrt(std::max(0.0, t_max_c - t_min_c));
}

double cloudless_clearness(double height_m) { return 0.75 + 2e-5 * height_m; }

LightSeries make_series(const TemperatureSource& source, const LightRequest& request) {
  const DayRecord record = read_days(source, {source.t_min, source.t_max}, request.place);
  const std::vector<std::size_t> known = known_days(record);
  check_unit(record, known);
  check_order(record, known, source);
  LightSeries series = open_years(record, request);
  series.notes = record.notes;
  const double most = cloudless_clearness(series.place.height_m);
  std::vector<DayLight> days(series.steps.size() / kStepsPerDay);
  std::size_t capped = 0;
  for (const std::size_t i : known) {
    const std::size_t day = day_of_series(series, record.date[i]);
    const double clearness = clearness_of_range(record.value[0][i], record.value[1][i], source.k_rs);
    if (clearness > most) ++capped;
    days[day].global = std::min(clearness, most) * above_air_of_day(series, day);
  }
  series.description = fmt::format("record {} of daily lowest and highest temperature, {}",
                                   source.file.filename().string(), years_text(series));
  series.notes.push_back(fmt::format(
      "global radiation of each day from the range of its temperature by Hargreaves (FAO-56 eq. "
      "50), k_rs = {:g} (0.16 inland, 0.19 at a coast): a rough estimate of a day, better of a month",
      source.k_rs));
  if (capped > 0) series.notes.push_back(capped_note(capped, known.size()));
  fill_days(series, days, {source.split, false, source.allow_gaps, source.file.string(), ""});
  return series;
}

}  // namespace sunfall

#include "light/daily_series.h"

#include <fmt/format.h>

#include <algorithm>

#include "light/day_light.h"
#include "light/day_quality.h"
#include "light/day_record.h"
#include "light/flux_unit.h"
#include "light/interval_sun.h"
#include "light/series_steps.h"
#include "light/unit_check.h"

namespace sunfall {
namespace {

constexpr std::chrono::seconds kDay{86400};

// The days as intervals from midnight to midnight of the series' standard time.
Readings as_readings(const DayRecord& record, const SeriesSource& source, const LightSeries& series) {
  Readings readings;
  readings.file = record.file;
  readings.step = kDay;
  readings.line = record.line;
  readings.notes = record.notes;
  for (const std::chrono::sys_days date : record.date) {
    readings.begin_s.push_back(std::chrono::sys_seconds{date}.time_since_epoch().count() -
                               series.utc_offset.count());
  }
  std::size_t column = 0;
  for (std::size_t q = 0; q < kQuantities; ++q) {
    if (column_of(source, q).empty()) continue;
    const std::vector<double>& value = record.value[column++];
    readings.value[q].assign(value.begin(), value.end());
  }
  return readings;
}

}  // namespace

LightSeries make_daily_series(const SeriesSource& source, const LightRequest& request) {
  const DayRecord record = read_days(table_of(source), value_columns(source), request.place);
  LightSeries series = open_years(record, request);
  Readings readings = as_readings(record, source, series);
  const std::vector<IntervalSun> suns = suns_of(readings, series);
  const std::string unit_note = check_unit(readings, suns, source.unit);
  const DayTally tally = judge_days(readings, suns, rough_w_per_unit(source.unit, kDay));
  series.notes = readings.notes;
  for (const std::string& note : {unit_note, tally.note()}) {
    if (!note.empty()) series.notes.push_back(note);
  }

  constexpr auto kSteps = static_cast<double>(kStepsPerDay);
  const double flux = flux_per_unit(source.unit, kDay);
  std::vector<DayLight> days(series.steps.size() / kStepsPerDay);
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const auto light = light_of_interval(readings, i, suns[i], flux);
    if (!light) continue;
    DayLight& day = days[day_of_series(series, record.date[i])];
    day.global = light->global * kSteps;
    if (light->sky) day.sky = *light->sky * kSteps;
  }
  const bool photons = is_quantum(source.unit);
  series.description =
      fmt::format("record {} of daily {} ({}), {}", source.file.filename().string(),
                  photons ? "photons" : "radiation", quantities_text(readings), years_text(series));
  fill_days(series, days, {source.day_split, photons, source.allow_gaps, source.file.string(), tally.note()});
  return series;
}

}  // namespace sunfall

#include "light/series.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "light/clock_check.h"
#include "light/daily_series.h"
#include "light/flux_unit.h"
#include "light/gaps.h"
#include "light/quality.h"
#include "light/quantum.h"
#include "light/record_file.h"
#include "light/record_step.h"
#include "light/series_steps.h"
#include "light/split_hours.h"
#include "light/unit_check.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr std::int64_t kDay_s = 86400;
constexpr std::chrono::seconds kHour{3600};
// Twilight stays below, and a fault of some nights is no reason to refuse a year.
constexpr double kMostAtNight_w_m2 = 20.0;
constexpr double kMostLitNights = 0.05;

std::chrono::year year_of(std::int64_t local_s) {
  const std::chrono::sys_seconds time{std::chrono::seconds{local_s}};
  return std::chrono::year_month_day{std::chrono::floor<std::chrono::days>(time)}.year();
}

// The years that the record covers. Less than a day at either end belongs to the neighbouring year only
// because the file's day is not the place's, or its first stamp ends the year before.
LightSeries open_years(const Readings& readings, const LightRequest& request) {
  const std::int64_t step_s = readings.step.count();
  const auto local_s = [&](std::int64_t utc_s) {
    return utc_s + request.clock.standard_offset(year_of(utc_s)).count();
  };
  const std::int64_t from_s = local_s(readings.begin_s.front());
  const std::int64_t to_s = local_s(readings.begin_s.back() + step_s);
  std::chrono::year first = year_of(std::min(from_s + kDay_s, to_s - 1));
  std::chrono::year last = year_of(std::max(to_s - kDay_s, from_s));
  if (last < first) first = last = year_of((from_s + to_s) / 2);
  return open_series(request, first, int{last} - int{first} + 1);
}

void check_night(const Readings& readings, const std::vector<IntervalSun>& suns, double watts) {
  const std::vector<float>& value = readings.value[readings.has(kGlobal) ? kGlobal : kDiffuse];
  long lit = 0;
  long all = 0;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (suns[i].level_w > 0.0F || std::isnan(value[i])) continue;
    ++all;
    if (value[i] * watts > kMostAtNight_w_m2) ++lit;
  }
  const double part = all > 0 ? static_cast<double>(lit) / static_cast<double>(all) : 0.0;
  if (part <= kMostLitNights) return;
  throw Error(ErrorKind::data, {.what = "there is light while the sun is down",
                                .where = readings.file,
                                .found = fmt::format("above {:g} W m-2 in {:.0f} % of the readings by night",
                                                     kMostAtNight_w_m2, 100.0 * part),
                                .remedy = "are the stamps, the clock and the place right? No lamp may shine "
                                          "on the sensor"});
}

std::string describe(const Readings& readings, const SeriesSource& source, const LightSeries& series) {
  return fmt::format("record {} of {} ({}) every {}, {}", source.file.filename().string(),
                     is_quantum(source.unit) ? "photons" : "radiation", quantities_text(readings),
                     step_text(readings.step), years_text(series));
}

void split_and_note(StepLight& steps, const Readings& readings, const SeriesSource& source,
                    LightSeries& series) {
  const std::chrono::seconds phase{readings.begin_s.front() % 3600};
  const long hours = split_hours(steps, series, source.split, phase);
  if (hours == 0) return;
  series.notes.push_back(fmt::format("{} hours of global radiation were split into beam and sky by {}", hours,
                                     source.split == SeriesSource::Split::erbs
                                         ? "Erbs, Klein and Duffie (1982)"
                                         : "Ridley, Boland and Lauret (2010)"));
}

void check_stamp(const SeriesSource& source, const std::string& where) {
  if (!is_per_day(source.unit) || source.stamp == SeriesSource::Stamp::day) return;
  throw Error(ErrorKind::plan, {.what = "a unit per day is for a daily record",
                                .where = where,
                                .found = unit_name(source.unit),
                                .remedy = "give stamp = \"day\" if each line is a day's"});
}

}  // namespace

void check_columns(const SeriesSource& source, const std::string& where) {
  const bool whole = !source.global.empty() || (!source.diffuse.empty() && !source.beam.empty());
  if (!whole) {
    throw Error(ErrorKind::plan, {.what = "global radiation is not given",
                                  .where = where,
                                  .found = "",
                                  .remedy = "name the column global, or both diffuse and beam"});
  }
  if (is_quantum(source.unit) && (source.global.empty() || !source.beam.empty())) {
    throw Error(ErrorKind::plan, {.what = "photons are taken as global, with or without diffuse",
                                  .where = where,
                                  .found = source.global.empty() ? "no global" : "beam",
                                  .remedy = "name the column of the level quantum sensor as global"});
  }
}

LightSeries make_series(const SeriesSource& source, const LightRequest& request) {
  check_columns(source, request.where);
  check_stamp(source, request.where);
  if (source.stamp == SeriesSource::Stamp::day) return make_daily_series(source, request);
  Readings readings = read_readings(source, request.clock);
  check_station(readings.station, table_of(source), request.place, readings.notes);
  return series_of(std::move(readings), source, request);
}

LightSeries series_of(Readings readings, const SeriesSource& source, const LightRequest& request) {
  LightSeries series = open_years(readings, request);
  const std::vector<IntervalSun> suns = suns_of(readings, series);
  const double flux = flux_per_unit(source.unit, readings.step);
  const double watts = rough_w_per_unit(source.unit, readings.step);
  // The clock first: it is told by the hours alone, while a wrong one makes any unit look wrong.
  const std::string clock_note =
      check_clock(clock_shifts_min(readings, suns, series), readings, source, series.utc_offset);
  const std::string unit_note = check_unit(readings, suns, source.unit);
  check_night(readings, suns, watts);
  const QualityTally tally = judge(readings, suns, watts);

  series.notes = readings.notes;
  for (const std::string& note : {clock_note, unit_note, tally.notes()}) {
    if (!note.empty()) series.notes.push_back(note);
  }
  if (readings.step > kHour) {
    series.notes.push_back(fmt::format(
        "steps of {} hide when within them the sun shone: each is taken as equally clear all through",
        step_text(readings.step)));
  }
  StepLight steps = steps_of(readings, suns, series, flux);
  if (is_quantum(source.unit)) photons_to_watts(steps, series);
  split_and_note(steps, readings, source, series);
  fill_and_note(steps, source.allow_gaps, source.file.string(), tally.rejected() > 0 ? tally.notes() : "",
                series);
  write_steps(steps, series);
  series.description = describe(readings, source, series);
  add_photons(series);
  return series;
}

}  // namespace sunfall

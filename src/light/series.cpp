#include "light/series.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "light/clock_check.h"
#include "light/flux_unit.h"
#include "light/gaps.h"
#include "light/quality.h"
#include "light/quantum.h"
#include "light/series_steps.h"
#include "light/split_hours.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr std::int64_t kDay_s = 86400;
// Twilight stays below, and a fault of some nights is no reason to refuse a year.
constexpr double kMostAtNight_w_m2 = 20.0;
constexpr double kMostLitNights = 0.05;

bool is_quantum(const SeriesSource& source) { return source.unit == SeriesSource::Unit::umol_m2_s; }

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

Angle elevation_of_step(const LightSeries& series, std::size_t i) {
  return Angle::radians(std::asin(std::clamp<double>(series.sun.mean_sine[i], 0.0, 1.0)));
}

void photons_to_watts(StepLight& steps, const LightSeries& series) {
  for (std::size_t i = 0; i < steps.global.size(); ++i) {
    const double global_umol = steps.global[i];
    if (std::isnan(global_umol)) continue;
    const double global_w = global_of_photons_w(global_umol, extraterrestrial_level_w_m2(series, i),
                                                elevation_of_step(series, i));
    steps.global[i] = static_cast<float>(global_w);
    if (std::isnan(steps.sky[i])) continue;
    const double part = global_umol > 0.0 ? diffuse_part_of_radiation(steps.sky[i] / global_umol) : 1.0;
    steps.sky[i] = static_cast<float>(part * global_w);
  }
}

// Global is kept to the last bit; a beam above the sun's own becomes sky.
void write_steps(const StepLight& steps, LightSeries& series) {
  for (std::size_t i = 0; i < steps.global.size(); ++i) {
    if (std::isnan(steps.global[i])) continue;
    const auto most_w = static_cast<float>(extraterrestrial_level_w_m2(series, i));
    series.steps[i].beam_w = std::clamp(steps.global[i] - steps.sky[i], 0.0F, most_w);
    series.steps[i].sky_w = steps.global[i] - series.steps[i].beam_w;
  }
}

std::string describe(const Readings& readings, const SeriesSource& source, const LightSeries& series) {
  std::string quantities;
  const auto add = [&](std::size_t quantity, const char* name) {
    if (readings.has(quantity)) quantities += (quantities.empty() ? "" : ", ") + std::string(name);
  };
  add(kGlobal, "global");
  add(kDiffuse, "diffuse");
  add(kBeam, "beam");
  const int last = int{series.first_year} + series.years - 1;
  const std::string years =
      series.years == 1 ? fmt::format("{}", last) : fmt::format("{} to {}", int{series.first_year}, last);
  return fmt::format("record {} of {} ({}) every {} minutes, {}", source.file.filename().string(),
                     is_quantum(source) ? "photons" : "radiation", quantities, readings.step.count() / 60,
                     years);
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

void fill_and_note(StepLight& steps, const SeriesSource& source, LightSeries& series) {
  const std::vector<MonthGaps> months = count_gaps(steps, series);
  check_gaps(months, source.allow_gaps, source.file.string());
  const std::string text = gaps_text(months);
  if (text.empty()) return;
  if (!fill_gaps(steps, series)) {
    throw Error(ErrorKind::data,
                {.what = "gaps cannot be filled: no day within 15 days, in any year, has light "
                         "at that time",
                 .where = source.file.string(),
                 .found = text,
                 .remedy = "give a record of at least one whole year"});
  }
  series.notes.push_back(
      "missing daylight was filled with the mean clearness of the same time on the days "
      "around, or in other years: " +
      text);
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
  if (is_quantum(source) && (source.global.empty() || !source.beam.empty())) {
    throw Error(ErrorKind::plan, {.what = "photons are taken as global, with or without diffuse",
                                  .where = where,
                                  .found = source.global.empty() ? "no global" : "beam",
                                  .remedy = "name the column of the level quantum sensor as global"});
  }
}

LightSeries make_series(const SeriesSource& source, const LightRequest& request) {
  check_columns(source, request.where);
  return series_of(read_readings(source, request.clock), source, request);
}

LightSeries series_of(Readings readings, const SeriesSource& source, const LightRequest& request) {
  LightSeries series = open_years(readings, request);
  const std::vector<IntervalSun> suns = suns_of(readings, series);
  const double flux = flux_per_unit(source.unit, readings.step);
  const double watts = is_quantum(source) ? kRough_w_umol : flux;
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
  StepLight steps = steps_of(readings, suns, series, flux);
  if (is_quantum(source)) photons_to_watts(steps, series);
  split_and_note(steps, readings, source, series);
  fill_and_note(steps, source, series);
  write_steps(steps, series);
  series.description = describe(readings, source, series);
  add_photons(series);
  return series;
}

}  // namespace sunfall

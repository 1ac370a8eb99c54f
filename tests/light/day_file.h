#pragma once
// Daily records for tests.

#include <cstdio>
#include <string>
#include <vector>

#include "light/series_checks.h"
#include "light/station.h"

namespace sunfall {

// "date,<names>" and one line for each day from 1 January of `year` on; value(day) is the line's end.
template <typename Value>
std::string day_text(const std::string& names, int year, int days, const Value& value) {
  std::string text = "date," + names + "\n";
  const std::chrono::sys_days first{std::chrono::year{year} / std::chrono::January / 1};
  for (int day = 0; day < days; ++day) {
    text += stamp_text(first + std::chrono::days{day}).substr(0, 10) + "," + value(day) + "\n";
  }
  return text;
}

inline std::string number_text(double value) {
  char text[32];
  std::snprintf(text, sizeof text, "%.9g", value);
  return text;
}

inline SeriesSource days_of(const TextFile& file, SeriesSource::Unit unit = SeriesSource::Unit::mj_m2) {
  SeriesSource source;
  source.file = file.path();
  source.time = "date";
  source.global = "g";
  source.stamp = SeriesSource::Stamp::day;
  source.unit = unit;
  return source;
}

// Sums over the series' days, MJ m-2 or mol m-2.
template <typename Power>
std::vector<double> day_sums(const LightSeries& series, double scale, const Power& power) {
  std::vector<double> sums(series.steps.size() / kStepsPerDay);
  for (std::size_t i = 0; i < series.steps.size(); ++i) sums[i / kStepsPerDay] += power(i) * scale;
  return sums;
}
inline std::vector<double> day_global_mj(const LightSeries& series) {
  return day_sums(series, kMegajoulePerWattStep, [&](std::size_t i) { return global_w(series.steps[i]); });
}
inline std::vector<double> day_sky_mj(const LightSeries& series) {
  return day_sums(series, kMegajoulePerWattStep,
                  [&](std::size_t i) { return static_cast<double>(series.steps[i].sky_w); });
}
inline std::vector<double> day_above_air_mj(const LightSeries& series) {
  return day_sums(series, kMegajoulePerWattStep,
                  [&](std::size_t i) { return extraterrestrial_level_w_m2(series, i); });
}

// The day of a common year's series, from month and day.
inline std::size_t day_at(int year, unsigned month, unsigned day) {
  const std::chrono::sys_days first{std::chrono::year{year} / std::chrono::January / 1};
  const std::chrono::sys_days date{std::chrono::year{year} / std::chrono::month{month} /
                                   std::chrono::day{day}};
  return static_cast<std::size_t>((date - first).count());
}

}  // namespace sunfall

#pragma once
// An invented station: a cloudless sky under known clouds, written as its logger would.

#include <cmath>
#include <random>
#include <string>

#include "light/series_checks.h"
#include "light/text_file.h"

namespace sunfall {

// A year at 10-minute steps whose beam comes and goes with clouds that last for hours, and whose sky
// brightens a little under them. Clear, half-clear and dull days follow each other at random.
inline LightSeries cloudy_truth(const Place& place, int year, const std::string& clock, unsigned seed = 7) {
  ClearSource hazy;
  hazy.linke_turbidity.fill(4.5);  // not the one that the program takes for granted
  LightSeries truth = light_of(hazy, place, year, clock);
  std::mt19937 random(seed);  // NOLINT: the same clouds in every run
  const auto uniform = [&random] { return static_cast<double>(random()) / 4294967296.0; };
  double day_clouds = 0.0;
  double clouds = 0.0;
  for (std::size_t i = 0; i < truth.steps.size(); ++i) {
    if (i % kStepsPerDay == 0) day_clouds = std::max(0.0, 1.6 * uniform() - 0.5);
    if (i % 12 == 0)
      clouds = std::clamp(day_clouds + 0.6 * (uniform() - 0.5) * (day_clouds > 0.0 ? 1.0 : 0.0), 0.0, 1.0);
    LightStep& step = truth.steps[i];
    const float beam_w = step.beam_w * static_cast<float>(1.0 - clouds);
    step.sky_w = step.sky_w * static_cast<float>(1.0 + 0.8 * clouds - 1.2 * clouds * clouds) +
                 0.15F * (step.beam_w - beam_w);
    step.beam_w = beam_w;
  }
  truth.notes.clear();
  add_photons(truth);
  return truth;
}

struct LoggerFormat {
  int step_min = 60;
  SeriesSource::Stamp stamp = SeriesSource::Stamp::end;
  std::string columns = "gdb";   // of global, diffuse, beam normal, photons (p) and those of the sky (q)
  double scale = 1.0;            // of all values
  std::string offset;            // written behind each stamp; its value is added to the stamp
  int clock_error_min = 0;       // how much later the clock runs
  bool daylight_saving = false;  // an hour later from April to September
};

inline std::string stamp_text(std::chrono::sys_seconds time) {
  const auto day = std::chrono::floor<std::chrono::days>(time);
  const std::chrono::year_month_day date{day};
  const std::chrono::hh_mm_ss clock{time - day};
  char text[32];
  std::snprintf(text, sizeof text, "%04d-%02u-%02uT%02d:%02d", int{date.year()}, unsigned{date.month()},
                unsigned{date.day()}, int(clock.hours().count()), int(clock.minutes().count()));
  return text;
}

// What an instrument shows over [begin, begin + step) of the truth: means, the beam normal weighted by time.
struct Shown {
  double global = 0.0, diffuse = 0.0, beam = 0.0, photons = 0.0, sky_photons = 0.0;
};
inline Shown shown(const LightSeries& truth, std::size_t minute, int step_min) {
  Shown mean;
  for (std::size_t m = minute; m < minute + std::size_t(step_min); ++m) {
    const std::size_t i = std::min(m / 10, truth.steps.size() - 1);
    const LightStep& step = truth.steps[i];
    mean.global += global_w(step);
    mean.diffuse += step.sky_w;
    mean.photons += global_umol(step);
    mean.sky_photons += step.sky_umol;
    if (truth.sun.mean_sine[i] > 0.0F) mean.beam += step.beam_w / truth.sun.mean_sine[i];
  }
  for (double* value : {&mean.global, &mean.diffuse, &mean.beam, &mean.photons, &mean.sky_photons})
    *value /= step_min;
  return mean;
}

inline std::string logged(const LightSeries& truth, const LoggerFormat& format) {
  std::string text = "time";
  for (const char column : format.columns) {
    text += column == 'g'   ? ",ghi"
            : column == 'd' ? ",dhi"
            : column == 'b' ? ",dni"
            : column == 'p' ? ",par"
                            : ",pard";
  }
  text += '\n';
  const std::chrono::sys_seconds midnight =
      std::chrono::sys_days{truth.first_year / std::chrono::January / 1};
  const std::size_t minutes = truth.steps.size() * 10;
  for (std::size_t minute = 0; minute < minutes; minute += std::size_t(format.step_min)) {
    const Shown values = shown(truth, minute, format.step_min);
    auto time = midnight + std::chrono::minutes{minute + std::size_t(format.clock_error_min)};
    if (format.stamp == SeriesSource::Stamp::end) time += std::chrono::minutes{format.step_min};
    if (format.stamp == SeriesSource::Stamp::middle) time += std::chrono::seconds{30 * format.step_min};
    if (format.daylight_saving) {
      const std::chrono::year_month_day date{std::chrono::floor<std::chrono::days>(time)};
      if (date.month() >= std::chrono::April && date.month() <= std::chrono::September)
        time += std::chrono::hours{1};
    }
    text += stamp_text(time) + format.offset;
    for (const char column : format.columns) {
      const double value = column == 'g'   ? values.global
                           : column == 'd' ? values.diffuse
                           : column == 'b' ? values.beam
                           : column == 'p' ? values.photons
                                           : values.sky_photons;
      char number[32];
      std::snprintf(number, sizeof number, ",%.7g", value * format.scale);
      text += number;
    }
    text += '\n';
  }
  return text;
}

inline SeriesSource source_of(const TextFile& file, const LoggerFormat& format) {
  SeriesSource source;
  source.file = file.path();
  source.stamp = format.stamp;
  if (format.columns.find('g') != std::string::npos) source.global = "ghi";
  if (format.columns.find('d') != std::string::npos) source.diffuse = "dhi";
  if (format.columns.find('b') != std::string::npos) source.beam = "dni";
  if (format.columns.find('p') != std::string::npos) {
    source.global = "par";
    source.unit = SeriesSource::Unit::umol_m2_s;
  }
  if (format.columns.find('q') != std::string::npos) source.diffuse = "pard";
  return source;
}

// Mean photons per day of a month, mol m-2 d-1.
struct MonthlyLight {
  std::array<double, 12> beam{};
  std::array<double, 12> sky{};
  double total(std::size_t month) const { return beam[month] + sky[month]; }
};
inline MonthlyLight monthly_dli(const LightSeries& series) {
  MonthlyLight sums;
  const std::array<int, 12> days = days_of_months(series);
  const std::vector<int> months = months_of_days(series);
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const auto month = static_cast<std::size_t>(months[i / kStepsPerDay]);
    sums.beam[month] += series.steps[i].beam_umol * 6e-4 / days[month];
    sums.sky[month] += series.steps[i].sky_umol * 6e-4 / days[month];
  }
  return sums;
}

}  // namespace sunfall

#include "light/day_light.h"

#include <fmt/format.h>

#include <cmath>

#include "light/daily_ratios.h"
#include "light/day_course.h"
#include "light/gaps.h"
#include "light/quantum.h"

namespace sunfall {
namespace {

// A day's sky (W m-2 over its steps) by what was measured; NaN where the split has to tell.
double measured_sky(const DayLight& day, double global_w, bool photons) {
  if (!photons || std::isnan(day.sky)) return day.sky;
  return day.global > 0.0 ? diffuse_part_of_radiation(day.sky / day.global) * global_w : 0.0;
}

}  // namespace

void fill_days(LightSeries& series, const std::vector<DayLight>& days, const DayLightOptions& options) {
  StepLight steps = unknown_steps(series);
  for (std::size_t day = 0; day < days.size(); ++day) {
    if (!std::isnan(days[day].global)) lay_global(steps, series, day, days[day].global);
  }
  if (options.photons) photons_to_watts(steps, series);

  long split = 0;
  for (std::size_t day = 0; day < days.size(); ++day) {
    const double above_air = above_air_of_day(series, day);
    if (std::isnan(days[day].global) || above_air <= 0.0) continue;
    const double global_w = options.photons ? global_of_day(steps, day) : days[day].global;
    double sky_w = measured_sky(days[day], global_w, options.photons);
    if (std::isnan(sky_w)) {
      sky_w = daily_diffuse_part(options.split, global_w / above_air, sunset_of_day(series, day)) * global_w;
      ++split;
    }
    lay_sky(steps, series, day, sky_w);
  }
  if (split > 0) {
    series.notes.push_back(fmt::format("{} days of global radiation were split into beam and sky by {}",
                                       split, name_of(options.split)));
  }
  fill_and_note(steps, options.allow_gaps, options.file, options.rejected, series);
  write_steps(steps, series);
  add_photons(series);
}

}  // namespace sunfall

#pragma once
// The sun over the intervals of a record, which need not be those of the series.

#include <algorithm>
#include <cstdint>
#include <vector>

#include "light/readings.h"
#include "sunfall/light.h"

namespace sunfall {

// Means over one interval; the parts of it outside the series count as dark.
struct IntervalSun {
  float sine = 0.0F;     // of the elevation, 0 at night
  float level_w = 0.0F;  // extraterrestrial on a level plane
  // What beam on a plane facing the sun is multiplied by for that on the level. More than `sine` where the
  // sun is low: the beam grows with it, and most of it comes in the brighter part of the interval. The
  // growth is that of a cloudless sky (Ineichen and Perez 2002, Linke turbidity 3).
  float beam_sine = 0.0F;
};
std::vector<IntervalSun> suns_of(const Readings& readings, const LightSeries& series);

// Calls use(step, seconds) for every step of the series that the interval overlaps.
template <typename Use>
void for_each_overlap(const LightSeries& series, std::int64_t begin_s, std::int64_t length_s,
                      const Use& use) {
  const std::int64_t step_s = series.sun.step.count();
  const std::int64_t origin_s = series.sun.begin.time_since_epoch().count();
  const auto last_s = static_cast<std::int64_t>(series.steps.size()) * step_s;
  const std::int64_t from_s = std::max<std::int64_t>(begin_s - origin_s, 0);
  const std::int64_t to_s = std::min(begin_s - origin_s + length_s, last_s);
  for (std::int64_t i = from_s / step_s; i * step_s < to_s; ++i) {
    const std::int64_t overlap_s = std::min(to_s, (i + 1) * step_s) - std::max(from_s, i * step_s);
    use(static_cast<std::size_t>(i), static_cast<double>(overlap_s));
  }
}

}  // namespace sunfall

#pragma once
// From readings to the series' steps: energy is kept, and goes to the steps of an interval as the level
// light above the air does, so that clearness and not power is even within the interval.

#include <optional>
#include <vector>

#include "light/interval_sun.h"
#include "light/readings.h"

namespace sunfall {

// Per step of the series, W m-2 (or µmol m-2 s-1); NaN where unknown, and where the sun is down.
struct StepLight {
  std::vector<float> global;
  std::vector<float> sky;  // NaN where only the global is known
};

// An interval's light from what was measured. The sum of the parts is better than a pyranometer's global
// (less error of its cosine); where beam and global are given, the rest is sky.
struct IntervalLight {
  double global = 0.0;
  std::optional<double> sky;
};
std::optional<IntervalLight> light_of_interval(const Readings& readings, std::size_t i,
                                               const IntervalSun& sun, double flux);

// `flux` is the flux of one of the file's unit. A step is known when readings cover half of it.
StepLight steps_of(const Readings& readings, const std::vector<IntervalSun>& suns, const LightSeries& series,
                   double flux);

// Writes known steps (W m-2) into the series: global to the last bit; a beam above the sun's own becomes sky.
void write_steps(const StepLight& steps, LightSeries& series);

}  // namespace sunfall

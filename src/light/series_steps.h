#pragma once
// From readings to the series' steps: energy is kept, and goes to the steps of an interval as the level
// light above the air does, so that clearness and not power is even within the interval.

#include <vector>

#include "light/interval_sun.h"
#include "light/readings.h"

namespace sunfall {

// Per step of the series, W m-2 (or µmol m-2 s-1); NaN where unknown, and where the sun is down.
struct StepLight {
  std::vector<float> global;
  std::vector<float> sky;  // NaN where only the global is known
};

// `flux` is the flux of one of the file's unit. A step is known when readings cover half of it.
StepLight steps_of(const Readings& readings, const std::vector<IntervalSun>& suns, const LightSeries& series,
                   double flux);

}  // namespace sunfall

#pragma once
// The light of some days of a series on the dome.

#include <cstddef>
#include <vector>

#include "sunfall/dome.h"

namespace sunfall {

// Sums over the days, mol m-2.
struct GatheredLight {
  std::vector<double> beam_level;   // [line][step]
  std::vector<double> beam_facing;  // [line][step]
  std::vector<double> sky;          // [sector][band]
};

// How skies are drawn: one for each step, or by the lattice of sky_lattice.h.
enum class SkyMethod { steps, lattice };

// From three years on the all-weather sky goes by the lattice, whose cost hardly grows with the years.
// Shorter series have a sky for each step.
SkyMethod method_for(const LightSeries& series, const Dome& dome, SkyModel sky);

// `days` are numbers of the series' days.
GatheredLight gather_light(const LightSeries& series, const std::vector<std::size_t>& days, const Dome& dome,
                           SkyModel sky, SkyMethod method);

}  // namespace sunfall

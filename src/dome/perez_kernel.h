#pragma once
// The inner loop of the all-weather sky, over all patches of a dome at once.

#include <vector>

#include "dome/sky_radiance.h"

namespace sunfall {

// Where the patches are, [sector][band] flat: unit vectors towards their middles; and per band the sine.
struct PatchDirections {
  int sectors = 0;
  int bands = 0;
  std::vector<float> east, north, up;
  std::vector<float> band_sine;
};

// Writes relative light on the level per patch: equation 1 of Perez, Seals and Michalsky (1993) times
// the sine of elevation; negative radiance counts as none. The cosine of zenith in the horizon term is
// held above 0.01. `sun`: east, north, up, never below the horizon. Returns the sum over all patches.
double perez_patches(const PatchDirections& patches, const SkyShape& shape, const float (&sun)[3],
                     float* light);

}  // namespace sunfall

#pragma once
// The parts of photons(): how clear it is, how many photons a joule carries, how many come from the
// sky.

#include "sunfall/angle.h"

namespace sunfall {

// The clearness that the same sky would have with the sun overhead (Perez and others 1990, Solar
// Energy 45:111, eq. 1).
double height_free_clearness(double clearness, Angle elevation);

// Photons 400-700 nm per joule of global radiation, µmol.
double photons_per_joule_umol(double height_free_clearness);

// Diffuse part of the photons from the diffuse part of all radiation: Spitters, Toussaint and
// Goudriaan (1986), their numerator only, which leaves the light around the sun with the sky.
double diffuse_part_of_photons(double diffuse_part);

}  // namespace sunfall

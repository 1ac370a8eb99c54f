#pragma once
// From the photons that a quantum sensor counts back to the radiation that they came with.

#include "light/series_steps.h"
#include "sunfall/angle.h"

namespace sunfall {

// Global radiation whose photons() sum to the given flux.
double global_of_photons_w(double total_umol, double extraterrestrial_level_w, Angle elevation);

// Diffuse part of all radiation from that of the photons: the inverse of diffuse_part_of_photons().
double diffuse_part_of_radiation(double diffuse_part_of_photons);

// Turns the photons of known steps into the radiation that would bring them.
void photons_to_watts(StepLight& steps, const LightSeries& series);

}  // namespace sunfall

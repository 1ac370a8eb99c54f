#include "light/quantum.h"

#include <algorithm>
#include <cmath>

#include "light/open_series.h"
#include "light/photons.h"

namespace sunfall {

// Photons per joule hardly depend on the clearness (1.97 to 2.10): each round leaves an eighth of the error.
double global_of_photons_w(double total_umol, double extraterrestrial_level_w, Angle elevation) {
  constexpr int kRounds = 14;
  double global_w = total_umol / 2.0;
  if (!(extraterrestrial_level_w > 0.0)) return global_w;
  for (int round = 0; round < kRounds; ++round) {
    const double clearness = height_free_clearness(global_w / extraterrestrial_level_w, elevation);
    global_w = total_umol / photons_per_joule_umol(clearness);
  }
  return global_w;
}

double diffuse_part_of_radiation(double part_of_photons) {
  const double part = std::clamp(part_of_photons, 0.0, 1.0);
  double diffuse = part;
  for (int round = 0; round < 20; ++round) {  // Newton; the slope lies between 0.4 and 1.3
    const double slope = 1.3 - 0.9 * diffuse * diffuse;
    diffuse = std::clamp(diffuse - (diffuse_part_of_photons(diffuse) - part) / slope, 0.0, 1.0);
  }
  return diffuse;
}

namespace {

Angle elevation_of_step(const LightSeries& series, std::size_t i) {
  return Angle::radians(std::asin(std::clamp<double>(series.sun.mean_sine[i], 0.0, 1.0)));
}

}  // namespace

void photons_to_watts(StepLight& steps, const LightSeries& series) {
  for (std::size_t i = 0; i < steps.global.size(); ++i) {
    const double global_umol = steps.global[i];
    if (std::isnan(global_umol)) continue;
    const double global_w = global_of_photons_w(global_umol, extraterrestrial_level_w_m2(series, i),
                                                elevation_of_step(series, i));
    steps.global[i] = static_cast<float>(global_w);
    if (std::isnan(steps.sky[i])) continue;
    const double part = global_umol > 0.0 ? diffuse_part_of_radiation(steps.sky[i] / global_umol) : 1.0;
    steps.sky[i] = static_cast<float>(part * global_w);
  }
}

}  // namespace sunfall

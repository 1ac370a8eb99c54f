#include "light/photons.h"

#include <algorithm>
#include <cmath>

#include "light/clear_sky.h"
#include "sunfall/light.h"

namespace sunfall {
namespace {

// Jacovides and others (2007), Agric. For. Meteorol. 143:277-287: hourly photons to global radiation, 1.971 ±
// 0.031 under clear and 2.099 ± 0.025 µmol per J under overcast skies.
constexpr double kClear_umol_j = 1.971;
constexpr double kOvercast_umol_j = 2.099;
// The classes of height-free clearness in use for clear and for overcast (Ineichen and others 2009,
// Int. J. Remote Sensing 30:5549, for the former).
constexpr double kClear = 0.65;
constexpr double kOvercast = 0.30;

}  // namespace

double height_free_clearness(double clearness, Angle elevation) {
  return clearness / (1.031 * std::exp(-1.4 / (0.9 + 9.4 / air_mass(elevation))) + 0.1);
}

double photons_per_joule_umol(double height_free_clearness) {
  const double clear_part = std::clamp((height_free_clearness - kOvercast) / (kClear - kOvercast), 0.0, 1.0);
  return kOvercast_umol_j + clear_part * (kClear_umol_j - kOvercast_umol_j);
}

double diffuse_part_of_photons(double diffuse_part) {
  return (1.0 + 0.3 * (1.0 - diffuse_part * diffuse_part)) * diffuse_part;
}

PhotonSplit photons(double beam_w, double sky_w, double extraterrestrial_level_w, Angle elevation) {
  const double global_w = beam_w + sky_w;
  if (!(global_w > 0.0)) return {};
  const double clearness = extraterrestrial_level_w > 0.0 ? global_w / extraterrestrial_level_w : 0.0;
  const double total_umol = global_w * photons_per_joule_umol(height_free_clearness(clearness, elevation));
  PhotonSplit split;
  split.sky_umol = total_umol * diffuse_part_of_photons(sky_w / global_w);
  split.beam_umol = total_umol - split.sky_umol;
  return split;
}

}  // namespace sunfall

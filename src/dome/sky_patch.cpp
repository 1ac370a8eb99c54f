#include "dome/sky_patch.h"

#include <algorithm>
#include <cmath>
#include <numbers>

namespace sunfall {
// The middle of a band is its middle in sine: bands are uniform in sine, and a band's share of the
// level light of a uniform radiance is proportional to that middle exactly.
SkyPatches::SkyPatches(const Dome& dome) {
  patches_.sectors = dome.sectors;
  patches_.bands = dome.bands;
  for (int band = 0; band < dome.bands; ++band) {
    patches_.band_sine.push_back(static_cast<float>((band + 0.5) / dome.bands));
  }
  for (int sector = 0; sector < dome.sectors; ++sector) {
    const double azimuth = 2.0 * std::numbers::pi * (sector + 0.5) / dome.sectors;
    for (int band = 0; band < dome.bands; ++band) {
      const double sine = (band + 0.5) / dome.bands, cosine = std::sqrt(1.0 - sine * sine);
      patches_.east.push_back(static_cast<float>(cosine * std::sin(azimuth)));
      patches_.north.push_back(static_cast<float>(cosine * std::cos(azimuth)));
      patches_.up.push_back(static_cast<float>(sine));
    }
  }
  fraction_.resize(patches_.up.size());
}

const std::vector<float>& SkyPatches::perez(const SkyShape& shape, const SkyDirection& sun) {
  const double up = std::clamp(sun.up, 0.0, 1.0);
  const double level = std::sqrt(1.0 - up * up) / std::max(std::hypot(sun.east, sun.north), 1e-12);
  const float at[3] = {static_cast<float>(level * sun.east), static_cast<float>(level * sun.north),
                       static_cast<float>(up)};
  return normalised(perez_patches(patches_, shape, at, fraction_.data()));
}

template <typename Radiance>
const std::vector<float>& SkyPatches::by_band(Radiance radiance) {
  double sum = 0.0;
  for (std::size_t k = 0; k < fraction_.size(); ++k) {
    fraction_[k] = patches_.up[k] * radiance(patches_.up[k]);
    sum += fraction_[k];
  }
  return normalised(sum);
}

const std::vector<float>& SkyPatches::isotropic() {
  return by_band([](float) { return 1.0F; });
}
const std::vector<float>& SkyPatches::overcast() {
  return by_band([](float sine) { return static_cast<float>(overcast_radiance(sine)); });
}

const std::vector<float>& SkyPatches::normalised(double sum) {
  if (!(sum > 0.0) || !std::isfinite(sum)) return isotropic();
  const auto scale = static_cast<float>(1.0 / sum);
  for (float& value : fraction_) value *= scale;
  return fraction_;
}

SkyDirection middle_direction(const SkyDirection& a, const SkyDirection& b) {
  const SkyDirection d{a.east + b.east, a.north + b.north, a.up + b.up};
  const double length = std::sqrt(d.east * d.east + d.north * d.north + d.up * d.up);
  return {d.east / length, d.north / length, d.up / length};
}

SkyState sky_state(const LightSeries& series, std::size_t i, const SkyDirection& middle) {
  SkyState state;
  state.sky_w_m2 = series.steps[i].sky_w;
  const double sine = std::max<double>(series.sun.mean_sine[i], 1e-3);
  state.beam_normal_w_m2 = series.steps[i].beam_w / sine;
  state.extraterrestrial_w_m2 = series.sun.normal_w_m2[i];
  state.sun_zenith = Angle::radians(std::acos(std::clamp(middle.up, 0.0, 1.0)));
  return state;
}

const std::vector<float>& sky_fractions(SkyPatches& patches, SkyModel sky, const LightSeries& series,
                                        std::size_t step) {
  if (sky == SkyModel::isotropic) return patches.isotropic();
  if (sky == SkyModel::overcast) return patches.overcast();
  const SkyDirection middle = middle_direction(series.sun.edges[step], series.sun.edges[step + 1]);
  const SkyState state = sky_state(series, step, middle);
  return patches.perez(perez_shape(sky_indices(state), state.sun_zenith), middle);
}

}  // namespace sunfall

#include "dome/sky_patch.h"

#include <Eigen/Core>
#include <algorithm>
#include <cmath>

namespace sunfall {
namespace {

using Band = Eigen::Map<const Eigen::ArrayXf>;

// Abramowitz and Stegun (1964) 4.4.46, absolute error below 2e-8 on [0, 1].
Eigen::ArrayXf arc_cosine(const Eigen::ArrayXf& x) {
  const Eigen::ArrayXf a = x.abs().min(1.0F);
  const Eigen::ArrayXf series =
      ((((((-0.0012624911F * a + 0.0066700901F) * a - 0.0170881256F) * a + 0.0308918810F) * a -
         0.0501743046F) *
            a +
        0.0889789874F) *
           a -
       0.2145988016F) *
          a +
      1.5707963050F;
  const Eigen::ArrayXf angle = (1.0F - a).sqrt() * series;
  return (x < 0.0F).select(3.14159265F - angle, angle);
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

}  // namespace

// The middle of a band is its middle in sine: bands are uniform in sine, and a band's share of the
// level light of a uniform radiance is proportional to that middle exactly.
SkyPatches::SkyPatches(const Dome& dome) : sectors_(dome.sectors), bands_(dome.bands) {
  for (int sector = 0; sector < sectors_; ++sector) {
    const double azimuth = 2.0 * std::numbers::pi * (sector + 0.5) / sectors_;
    east_.push_back(static_cast<float>(std::sin(azimuth)));
    north_.push_back(static_cast<float>(std::cos(azimuth)));
  }
  for (int band = 0; band < bands_; ++band) {
    const double sine = (band + 0.5) / bands_;
    sine_.push_back(static_cast<float>(sine));
    cosine_.push_back(static_cast<float>(std::sqrt(1.0 - sine * sine)));
  }
  fraction_.resize(static_cast<std::size_t>(sectors_) * bands_);
}

const std::vector<float>& SkyPatches::perez(const SkyShape& shape, const SkyDirection& sun) {
  const Band sine(sine_.data(), bands_), cosine(cosine_.data(), bands_);
  const float up = static_cast<float>(std::clamp(sun.up, 0.0, 1.0));
  const float level = std::sqrt(1.0F - up * up);
  const double length = std::max(std::hypot(sun.east, sun.north), 1e-12);
  const float sun_east = level * static_cast<float>(sun.east / length);
  const float sun_north = level * static_cast<float>(sun.north / length);
  const auto a = static_cast<float>(shape.a), b = static_cast<float>(shape.b),
             c = static_cast<float>(shape.c);
  const auto d = static_cast<float>(shape.d), e = static_cast<float>(shape.e);
  // Zenith angle's cosine is held above 0.01, as the horizon term runs away below.
  const Eigen::ArrayXf gradation = ((1.0F + a * (b / sine.max(0.01F)).max(-80.0F).exp()) * sine).max(0.0F);
  const Eigen::ArrayXf above = sine * up;
  for (int sector = 0; sector < sectors_; ++sector) {
    const float beside = east_[sector] * sun_east + north_[sector] * sun_north;
    const Eigen::ArrayXf cosine_gap = (above + cosine * beside).max(-1.0F).min(1.0F);
    const Eigen::ArrayXf gap = arc_cosine(cosine_gap);
    const Eigen::ArrayXf glow = 1.0F + c * (d * gap).min(60.0F).exp() + e * cosine_gap.square();
    Eigen::Map<Eigen::ArrayXf>(fraction_.data() + static_cast<std::size_t>(sector) * bands_, bands_) =
        gradation * glow.max(0.0F);
  }
  normalise();
  return fraction_;
}

template <typename Radiance>
const std::vector<float>& SkyPatches::by_band(Radiance radiance) {
  for (int sector = 0; sector < sectors_; ++sector) {
    for (int band = 0; band < bands_; ++band) {
      fraction_[static_cast<std::size_t>(sector) * bands_ + band] = sine_[band] * radiance(sine_[band]);
    }
  }
  normalise();
  return fraction_;
}

const std::vector<float>& SkyPatches::isotropic() {
  return by_band([](float) { return 1.0F; });
}
const std::vector<float>& SkyPatches::overcast() {
  return by_band([](float sine) { return static_cast<float>(overcast_radiance(sine)); });
}

void SkyPatches::normalise() {
  double sum = 0.0;
  for (const float value : fraction_) sum += value;
  if (!(sum > 0.0) || !std::isfinite(sum)) {
    isotropic();
    return;
  }
  for (float& value : fraction_) value = static_cast<float>(value / sum);
}

SkyDirection middle_direction(const SkyDirection& a, const SkyDirection& b) {
  const SkyDirection d{a.east + b.east, a.north + b.north, a.up + b.up};
  const double length = std::sqrt(d.east * d.east + d.north * d.north + d.up * d.up);
  return {d.east / length, d.north / length, d.up / length};
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

#include "dome/sky_lattice.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <numbers>

#include "core/clones.h"

namespace sunfall {
namespace {

constexpr int kTurn = 360;
constexpr int kZenithGap_deg = 2;
constexpr int kZeniths = 90 / kZenithGap_deg + 1;
constexpr int kBrightnessGaps = 12;
constexpr int kBrightnesses = kBrightnessGaps + 1;

std::size_t node_of(int clearness_class, int brightness, int zenith) {
  return static_cast<std::size_t>((clearness_class * kBrightnesses + brightness) * kZeniths + zenith);
}

// A place between two neighbours on an axis of `count`.
struct Between {
  int low = 0;
  double up = 0.0;
};
Between between(double position, int count) {
  const double held = std::clamp(position, 0.0, count - 1.0);
  const int low = std::min(static_cast<int>(held), count - 2);
  return {low, held - low};
}

SUNFALL_CLONES void add_row(const float* __restrict values, double scale, int count,
                            double* __restrict sums) {
  for (int k = 0; k < count; ++k) sums[k] += scale * values[k];
}

}  // namespace

bool fits_lattice(const Dome& dome) { return kTurn % dome.sectors == 0; }

SkyLattice::SkyLattice(const Dome& dome)
    : sectors_(dome.sectors), bands_(dome.bands), width_deg_(kTurn / dome.sectors) {
  half_.sectors = kTurn / 2 + 1;
  half_.bands = bands_;
  for (int band = 0; band < bands_; ++band)
    half_.band_sine.push_back(static_cast<float>((band + 0.5) / bands_));
  for (int off = 0; off < half_.sectors; ++off) {
    const double azimuth = off * std::numbers::pi / 180.0;
    for (int band = 0; band < bands_; ++band) {
      const double sine = (band + 0.5) / bands_, cosine = std::sqrt(1.0 - sine * sine);
      half_.east.push_back(static_cast<float>(cosine * std::sin(azimuth)));
      half_.north.push_back(static_cast<float>(cosine * std::cos(azimuth)));
      half_.up.push_back(static_cast<float>(sine));
    }
  }
  light_.resize(static_cast<std::size_t>(kClearnessClasses) * kBrightnesses * kZeniths);
  radiance_.resize(half_.up.size());
}

void SkyLattice::add(const SkyIndices& indices, Angle sun_zenith, const SkyDirection& sun, double mol) {
  const int k = clearness_class(indices.clearness);
  const SoundBrightness range = sound_brightness(k);
  const Between brightness = between(
      (indices.brightness - range.lowest) / (range.highest - range.lowest) * kBrightnessGaps, kBrightnesses);
  const Between zenith = between(sun_zenith.degrees() / kZenithGap_deg, kZeniths);
  // Azimuth bin b is the sun at b degrees less the middle of the first sector, so that sectors lie whole
  // degrees off.
  const double azimuth_deg = std::atan2(sun.east, sun.north) * 180.0 / std::numbers::pi;
  const double position = azimuth_deg - 0.5 * width_deg_;
  const double floor = std::floor(position);
  const int bin = (static_cast<int>(floor) % kTurn + kTurn) % kTurn;
  const int next = (bin + 1) % kTurn;
  const double across = position - floor;
  for (const int j : {0, 1}) {
    for (const int z : {0, 1}) {
      const double part =
          mol * (j == 1 ? brightness.up : 1.0 - brightness.up) * (z == 1 ? zenith.up : 1.0 - zenith.up);
      if (part == 0.0) continue;
      std::vector<double>& light = light_[node_of(k, brightness.low + j, zenith.low + z)];
      if (light.empty()) light.assign(kTurn, 0.0);
      light[static_cast<std::size_t>(bin)] += part * (1.0 - across);
      light[static_cast<std::size_t>(next)] += part * across;
    }
  }
}

void SkyLattice::settle_node(std::size_t node, std::vector<double>& sums) {
  const int zenith = static_cast<int>(node) % kZeniths;
  const int brightness = static_cast<int>(node) / kZeniths % kBrightnesses;
  const int k = static_cast<int>(node) / kZeniths / kBrightnesses;
  const SoundBrightness range = sound_brightness(k);
  const Angle sun_zenith = Angle::degrees(zenith * kZenithGap_deg);
  const double value = range.lowest + (range.highest - range.lowest) * brightness / kBrightnessGaps;
  const float sun[3] = {0.0F, static_cast<float>(sin(sun_zenith)),
                        static_cast<float>(std::max(cos(sun_zenith), 0.0))};
  perez_patches(half_, perez_shape({class_floor(k), value}, sun_zenith), sun, radiance_.data());
  const auto row = [&](int off) {
    const int turned = (off % kTurn + kTurn) % kTurn;
    return radiance_.data() + static_cast<std::size_t>(std::min(turned, kTurn - turned)) * bands_;
  };
  // What a dome sums to depends on where between two sectors the sun stands.
  std::array<double, kTurn> whole{};
  const std::vector<double>& light = light_[node];
  for (int bin = 0; bin < kTurn; ++bin) {
    const double mol = light[static_cast<std::size_t>(bin)];
    if (mol == 0.0) continue;
    double& sum = whole[static_cast<std::size_t>(bin % width_deg_)];
    if (sum == 0.0) {
      for (int sector = 0; sector < sectors_; ++sector) {
        const float* values = row(sector * width_deg_ - bin);
        for (int band = 0; band < bands_; ++band) sum += values[band];
      }
    }
    if (!(sum > 0.0)) continue;  // perez_shape() leaves no sky without light
    for (int sector = 0; sector < sectors_; ++sector) {
      add_row(row(sector * width_deg_ - bin), mol / sum, bands_,
              sums.data() + static_cast<std::size_t>(sector) * bands_);
    }
  }
}

void SkyLattice::settle(std::vector<double>& sums) {
  for (std::size_t node = 0; node < light_.size(); ++node) {
    if (light_[node].empty()) continue;
    settle_node(node, sums);
    light_[node].clear();
  }
}

}  // namespace sunfall

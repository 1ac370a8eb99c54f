#include "dome/perez_kernel.h"

#include <algorithm>
#include <bit>
#include <cmath>
#include <cstdint>

#include "core/clones.h"

namespace sunfall {
namespace {

// All branch-free, so that loops over patches become vector code (this file is compiled without errno
// for roots; see CMakeLists.txt).

inline float clamped(float x, float low, float high) {
  const float above = x > low ? x : low;
  return above < high ? above : high;
}

// Moshier's Cephes library, expf: relative error below 2e-7 within the clamp.
inline float exponential(float x) {
  const float arg = clamped(x, -87.0F, 60.0F);
  constexpr float kRound = 12582912.0F;  // 1.5 * 2^23: adding it leaves the nearest integer
  const float rounded = arg * 1.44269504F + kRound;
  const float whole = rounded - kRound;
  const float r = (arg - whole * 0.693359375F) - whole * -2.12194440e-4F;
  const float series =
      ((((1.9875691500e-4F * r + 1.3981999507e-3F) * r + 8.3334519073e-3F) * r + 4.1665795894e-2F) * r +
       1.6666665459e-1F) *
          r +
      5.0000001201e-1F;
  const std::int32_t power = std::bit_cast<std::int32_t>(rounded) - std::bit_cast<std::int32_t>(kRound);
  return (series * r * r + r + 1.0F) * std::bit_cast<float>((power + 127) << 23);
}

// Abramowitz and Stegun (1964) 4.4.46, absolute error below 2e-8 on [0, 1], mirrored.
inline float arc_cosine(float x) {
  const float a = x < 0.0F ? -x : x;
  const float series =
      ((((((-0.0012624911F * a + 0.0066700901F) * a - 0.0170881256F) * a + 0.0308918810F) * a -
         0.0501743046F) *
            a +
        0.0889789874F) *
           a -
       0.2145988016F) *
          a +
      1.5707963050F;
  const float angle = std::sqrt(1.0F - a) * series;
  return x < 0.0F ? 3.14159265F - angle : angle;
}

SUNFALL_CLONES void glow(const float* __restrict east, const float* __restrict north,
                         const float* __restrict up, int count, const float (&sun)[3], float c, float d,
                         float e, float* __restrict light) {
  const float sun_east = sun[0], sun_north = sun[1], sun_up = sun[2];
  for (int k = 0; k < count; ++k) {
    const float cosine = clamped(east[k] * sun_east + north[k] * sun_north + up[k] * sun_up, -1.0F, 1.0F);
    const float value = 1.0F + c * exponential(d * arc_cosine(cosine)) + e * cosine * cosine;
    light[k] = value > 0.0F ? value : 0.0F;
  }
}

SUNFALL_CLONES void grade(const float* __restrict gradation, int sectors, int bands, float* __restrict light,
                          double* __restrict sums) {
  for (int sector = 0; sector < sectors; ++sector) {
    float* patch = light + static_cast<std::size_t>(sector) * bands;
    for (int band = 0; band < bands; ++band) {
      patch[band] *= gradation[band];
      sums[band] += patch[band];
    }
  }
}

}  // namespace

double perez_patches(const PatchDirections& patches, const SkyShape& shape, const float (&sun)[3],
                     float* light) {
  glow(patches.east.data(), patches.north.data(), patches.up.data(), patches.sectors * patches.bands, sun,
       static_cast<float>(shape.c), static_cast<float>(shape.d), static_cast<float>(shape.e), light);
  std::vector<float> gradation;
  for (const float sine : patches.band_sine) {
    const float horizon = exponential(static_cast<float>(shape.b) / std::max(sine, 0.01F));
    gradation.push_back(std::max(1.0F + static_cast<float>(shape.a) * horizon, 0.0F) * sine);
  }
  std::vector<double> sums(patches.band_sine.size(), 0.0);
  grade(gradation.data(), patches.sectors, patches.bands, light, sums.data());
  double sum = 0.0;
  for (const double band : sums) sum += band;
  return sum;
}

}  // namespace sunfall

#include "dome/sky_radiance.h"

#include <algorithm>
#include <cmath>
#include <iterator>

namespace sunfall {
namespace {

// Upper limits of the clearness classes 1 to 7; the eighth is open.
constexpr double kClassLimits[] = {1.065, 1.230, 1.500, 1.950, 2.800, 4.500, 6.200};

// Table 1: x = x1 + x2·Z + Delta·(x3 + x4·Z) for x = a, b, c, d, e.
constexpr double kCoefficients[8][5][4] = {{{1.3525, -0.2576, -0.2690, -1.4366},
                                            {-0.7670, 0.0007, 1.2734, -0.1233},
                                            {2.8000, 0.6004, 1.2375, 1.0000},
                                            {1.8734, 0.6297, 0.9738, 0.2809},
                                            {0.0356, -0.1246, -0.5718, 0.9938}},
                                           {{-1.2219, -0.7730, 1.4148, 1.1016},
                                            {-0.2054, 0.0367, -3.9128, 0.9156},
                                            {6.9750, 0.1774, 6.4477, -0.1239},
                                            {-1.5798, -0.5081, -1.7812, 0.1080},
                                            {0.2624, 0.0672, -0.2190, -0.4285}},
                                           {{-1.1000, -0.2515, 0.8952, 0.0156},
                                            {0.2782, -0.1812, -4.5000, 1.1766},
                                            {24.7219, -13.0812, -37.7000, 34.8438},
                                            {-5.0000, 1.5218, 3.9229, -2.6204},
                                            {-0.0156, 0.1597, 0.4199, -0.5562}},
                                           {{-0.5484, -0.6654, -0.2672, 0.7117},
                                            {0.7234, -0.6219, -5.6812, 2.6297},
                                            {33.3389, -18.3000, -62.2500, 52.0781},
                                            {-3.5000, 0.0016, 1.1477, 0.1062},
                                            {0.4659, -0.3296, -0.0876, -0.0329}},
                                           {{-0.6000, -0.3566, -2.5000, 2.3250},
                                            {0.2937, 0.0496, -5.6812, 1.8415},
                                            {21.0000, -4.7656, -21.5906, 7.2492},
                                            {-3.5000, -0.1554, 1.4062, 0.3988},
                                            {0.0032, 0.0766, -0.0656, -0.1294}},
                                           {{-1.0156, -0.3670, 1.0078, 1.4051},
                                            {0.2875, -0.5328, -3.8500, 3.3750},
                                            {14.0000, -0.9999, -7.1406, 7.5469},
                                            {-3.4000, -0.1078, -1.0750, 1.5702},
                                            {-0.0672, 0.4016, 0.3017, -0.4844}},
                                           {{-1.0000, 0.0211, 0.5025, -0.5119},
                                            {-0.3000, 0.1922, 0.7023, -1.6317},
                                            {19.0000, -5.0000, 1.2438, -1.9094},
                                            {-4.0000, 0.0250, 0.3844, 0.2656},
                                            {1.0468, -0.3788, -2.4517, 1.4656}},
                                           {{-1.0500, 0.0289, 0.4260, 0.3590},
                                            {-0.3250, 0.1156, 0.7781, 0.0025},
                                            {31.0625, -14.5000, -46.1148, 55.3750},
                                            {-7.2312, 0.4050, 13.3500, 0.6234},
                                            {1.5000, -0.6426, 1.8564, 0.5636}}};

// Where the published form holds, per class: see sky_radiance.h.
constexpr SoundBrightness kSoundBrightness[kClearnessClasses] = {
    {0.0, 0.6}, {0.2, 0.6}, {0.2, 0.6}, {0.2, 0.6}, {0.2, 0.6}, {0.08, 0.4}, {0.0, 0.4}, {0.0, 0.15}};

double relative_air_mass(double zenith_deg) {
  return 1.0 / (std::cos(zenith_deg * std::numbers::pi / 180.0) +
                0.50572 * std::pow(96.07995 - zenith_deg, -1.6364));
}

}  // namespace

int clearness_class(double clearness) {
  return static_cast<int>(std::upper_bound(std::begin(kClassLimits), std::end(kClassLimits), clearness) -
                          std::begin(kClassLimits));
}

double class_floor(int clearness_class) {
  return clearness_class == 0 ? 1.0 : kClassLimits[clearness_class - 1];
}

SoundBrightness sound_brightness(int clearness_class) { return kSoundBrightness[clearness_class]; }

SkyIndices sky_indices(const SkyState& state) {
  const double zenith = std::clamp(state.sun_zenith.radians(), 0.0, std::numbers::pi / 2.0);
  if (state.sky_w_m2 <= 0.0) return {};
  const double kappa = 1.041 * zenith * zenith * zenith;
  const double ratio = (state.sky_w_m2 + state.beam_normal_w_m2) / state.sky_w_m2;
  const double air_mass = relative_air_mass(zenith * 180.0 / std::numbers::pi);
  return {(ratio + kappa) / (1.0 + kappa), air_mass * state.sky_w_m2 / state.extraterrestrial_w_m2};
}

SkyShape perez_shape_unguarded(const SkyIndices& indices, Angle sun_zenith) {
  const int k = clearness_class(indices.clearness);
  const double zenith = std::clamp(sun_zenith.radians(), 0.0, std::numbers::pi / 2.0);
  const double delta = indices.brightness;
  double x[5];
  for (int i = 0; i < 5; ++i) {
    const double* q = kCoefficients[k][i];
    x[i] = q[0] + q[1] * zenith + delta * (q[2] + q[3] * zenith);
  }
  if (k == 0) {  // equations for the first class
    const double* c = kCoefficients[0][2];
    const double* d = kCoefficients[0][3];
    x[2] = std::exp(std::pow(delta * (c[0] + c[1] * zenith), c[2])) - c[3];
    x[3] = -std::exp(delta * (d[0] + d[1] * zenith)) + d[2] + delta * d[3];
  }
  return {x[0], x[1], x[2], x[3], x[4]};
}

SkyShape perez_shape(const SkyIndices& indices, Angle sun_zenith) {
  const auto& [lowest, highest] = kSoundBrightness[clearness_class(indices.clearness)];
  const SkyIndices guarded{indices.clearness, std::clamp(indices.brightness, lowest, highest)};
  SkyShape shape = perez_shape_unguarded(guarded, sun_zenith);
  shape.b = std::min(shape.b, -0.01);
  return shape;
}

double overcast_radiance(double sine_elevation) { return (1.0 + 2.0 * sine_elevation) / 3.0; }

}  // namespace sunfall

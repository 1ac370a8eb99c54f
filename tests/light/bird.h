#pragma once
// Bird and Hulstrom (1981), SERI/TR-642-761: a second clear sky for tests. 1367 W m-2, sea level,
// ground albedo 0.2.

#include <cmath>
#include <numbers>

namespace sunfall {

struct BirdAtmosphere {
  double ozone_cm = 0.3;
  double water_cm = 1.5;
  double depth_380 = 0.15;  // aerosol optical depth at 380 and 500 nm
  double depth_500 = 0.10;
};
inline constexpr BirdAtmosphere kBirdExample{};

struct BirdSky {
  double beam_normal_w_m2 = 0.0;
  double global_w_m2 = 0.0;
  double diffuse_w_m2 = 0.0;
};

inline BirdSky bird_and_hulstrom(double zenith_deg, const BirdAtmosphere& air) {
  constexpr double i0 = 1367.0;
  const double cosine = std::cos(zenith_deg * std::numbers::pi / 180.0);
  const double m = 1.0 / (cosine + 0.15 * std::pow(93.885 - zenith_deg, -1.25));
  const double mp = m * 1013.25 / 1013.0;
  const double rayleigh = std::exp(-0.0903 * std::pow(mp, 0.84) * (1.0 + mp - std::pow(mp, 1.01)));
  const double xo = air.ozone_cm * m;
  const double ozone = 1.0 - 0.1611 * xo * std::pow(1.0 + 139.48 * xo, -0.3035) -
                       0.002715 * xo / (1.0 + 0.044 * xo + 0.0003 * xo * xo);
  const double mixed = std::exp(-0.0127 * std::pow(mp, 0.26));
  const double xw = air.water_cm * m;
  const double water = 1.0 - 2.4959 * xw / (std::pow(1.0 + 79.034 * xw, 0.6828) + 6.385 * xw);
  const double depth = 0.2758 * air.depth_380 + 0.35 * air.depth_500;
  const double aerosol =
      std::exp(-std::pow(depth, 0.873) * (1.0 + depth - std::pow(depth, 0.7088)) * std::pow(m, 0.9108));
  const double absorbed = 1.0 - 0.1 * (1.0 - m + std::pow(m, 1.06)) * (1.0 - aerosol);
  const double scattered = aerosol / absorbed;
  const double forward = 0.84;
  const double sky_albedo = 0.0685 + (1.0 - forward) * (1.0 - scattered);
  BirdSky sky;
  sky.beam_normal_w_m2 = 0.9662 * i0 * rayleigh * ozone * mixed * water * aerosol;
  const double beam = sky.beam_normal_w_m2 * cosine;
  const double first_scatter = 0.79 * i0 * cosine * ozone * water * mixed * absorbed *
                               (0.5 * (1.0 - rayleigh) + forward * (1.0 - scattered)) /
                               (1.0 - m + std::pow(m, 1.02));
  sky.global_w_m2 = (beam + first_scatter) / (1.0 - 0.2 * sky_albedo);
  sky.diffuse_w_m2 = sky.global_w_m2 - beam;
  return sky;
}

}  // namespace sunfall

#pragma once
// Sheets by brute force: light is carried from surface to surface, one reflection after the other, until
// nothing is left. Fresnel's laws in sines and tangents, one polarisation at a time.

#include <array>
#include <cmath>
#include <numbers>
#include <vector>

#include "sunfall/covers.h"

namespace sunfall::testing {

struct TracedLight {
  double through = 0.0;
  double reflected = 0.0;
  double absorbed = 0.0;
};

inline constexpr double kDegree = std::numbers::pi / 180.0;

// Reflectance of a bare surface, s and p (Duffie and Beckman, Solar Engineering of Thermal Processes,
// eqs. 5.1.1 and 5.1.2; any book of optics).
inline std::array<double, 2> fresnel(double index, double angle_deg) {
  if (angle_deg == 0.0) {
    const double r = (index - 1.0) / (index + 1.0);
    return {r * r, r * r};
  }
  const double a = angle_deg * kDegree;
  const double b = std::asin(std::sin(a) / index);
  const double s = std::sin(b - a) / std::sin(b + a);
  const double p = std::tan(b - a) / std::tan(b + a);
  return {s * s, p * p};
}

// Uncoated clear sheets. Surfaces 0, 1, 2 …: even ones lead into a sheet, odd ones out of it.
inline TracedLight traced(const CoverSheets& sheets, double angle_deg) {
  TracedLight all;
  for (int polarisation = 0; polarisation < 2; ++polarisation) {
    const std::size_t surfaces = 2 * sheets.size();
    std::vector<double> reflect(surfaces);
    std::vector<double> pass(surfaces + 1, 1.0);  // of the medium before surface i
    for (std::size_t i = 0; i < surfaces; ++i) {
      const CoverSheet& sheet = sheets[i / 2];
      reflect[i] = fresnel(sheet.index, angle_deg)[polarisation];
      const double within = std::asin(std::sin(angle_deg * kDegree) / sheet.index);
      if (i % 2 == 1) pass[i] = std::exp(-sheet.absorption_per_m * sheet.thickness_m / std::cos(within));
    }
    std::vector<double> down(surfaces + 1, 0.0);  // about to meet surface i from above
    std::vector<double> up(surfaces + 1, 0.0);    // about to meet surface i - 1 from below
    down[0] = 0.5;
    for (double left = 1.0; left > 1e-15;) {
      std::vector<double> next_down(surfaces + 1, 0.0);
      std::vector<double> next_up(surfaces + 1, 0.0);
      // A crossing of the medium before surface i, met from surface i - 1 or i.
      const auto cross = [&](double light, std::size_t medium) {
        all.absorbed += light * (1.0 - pass[medium]);
        return light * pass[medium];
      };
      for (std::size_t i = 0; i < surfaces; ++i) {
        const double on = down[i] * (1.0 - reflect[i]) + up[i + 1] * reflect[i];
        const double back = down[i] * reflect[i] + up[i + 1] * (1.0 - reflect[i]);
        if (i + 1 == surfaces) {
          all.through += on;
        } else {
          next_down[i + 1] += cross(on, i + 1);
        }
        if (i == 0) {
          all.reflected += back;
        } else {
          next_up[i] += cross(back, i);
        }
      }
      down = next_down;
      up = next_up;
      left = 0.0;
      for (std::size_t i = 0; i <= surfaces; ++i) left += down[i] + up[i];
    }
  }
  return all;
}

}  // namespace sunfall::testing

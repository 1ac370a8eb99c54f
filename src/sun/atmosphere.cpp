#include "sun/atmosphere.h"

#include <algorithm>
#include <cmath>

namespace sunfall {
namespace {

constexpr double kSunHasSet_deg = -0.8333;
constexpr double kNoRefraction_deg = -2.5;

// 1 above the upper limit, 0 below the lower, with a level tangent at both.
double fade(double elevation_deg) {
  const double x =
      std::clamp((elevation_deg - kNoRefraction_deg) / (kSunHasSet_deg - kNoRefraction_deg), 0.0, 1.0);
  return x * x * (3.0 - 2.0 * x);
}

}  // namespace

double standard_pressure_pa(double height_m) {
  return 101325.0 * std::pow(1.0 - 2.25577e-5 * std::min(height_m, 11000.0), 5.25588);
}

Angle refraction(Angle geometric_elevation, double pressure_pa) {
  const double elevation_deg = geometric_elevation.degrees();
  if (elevation_deg <= kNoRefraction_deg) return Angle{};
  const double pressure_share = pressure_pa / 101000.0;
  // The temperature factor 283 / (273 + t) is 1 at 10 °C. At the zenith the formula is a hair below
  // zero.
  const double refraction_deg =
      pressure_share * 1.02 / (60.0 * tan(Angle::degrees(elevation_deg + 10.3 / (elevation_deg + 5.11))));
  return Angle::degrees(std::max(0.0, refraction_deg) * fade(elevation_deg));
}

}  // namespace sunfall

#include "light/clear_sky.h"

#include <algorithm>
#include <cmath>

#include "sun/atmosphere.h"

namespace sunfall {
namespace {

constexpr double kStandardPressure_pa = 101325.0;

// The factor exp(0.01 m^1.8) of the operational model (Perez and others 2002) brings the global of
// a low sun up to other models, but it outgrows extinction: from some air mass on the sky would
// clear as the sun sinks, and outshine the sun above the air below 2 degrees. Where
// d/dm (0.01 m^1.8 - k m) = 0, that is m = (k / 0.018)^1.25, clearness is held instead.
double corrected_log_clearness(double extinction, double air_mass) {
  const double held = std::min(air_mass, std::pow(extinction / 0.018, 1.25));
  return 0.01 * std::pow(held, 1.8) - extinction * held;
}

}  // namespace

double air_mass(Angle apparent_elevation) {
  const double elevation_deg = std::max(0.0, apparent_elevation.degrees());
  return 1.0 / (sin(Angle::degrees(elevation_deg)) + 0.50572 * std::pow(elevation_deg + 6.07995, -1.6364));
}

// Ineichen, P. and Perez, R. (2002), Solar Energy 73:151-157; letters as there.
ClearSky clear_sky(const ClearSkyInput& input, LowSun low_sun) {
  const double i0 = input.extraterrestrial_normal_w_m2;
  const double sine = input.sine_of_elevation;
  if (sine <= 0.0) return {};
  const double m = input.air_mass * standard_pressure_pa(input.height_m) / kStandardPressure_pa;
  const double tl = input.linke_turbidity;
  const double fh1 = std::exp(-input.height_m / 8000.0);
  const double fh2 = std::exp(-input.height_m / 1250.0);
  const double cg1 = 5.09e-5 * input.height_m + 0.868;
  const double cg2 = 3.92e-5 * input.height_m + 0.0387;
  const double extinction = cg2 * (fh1 + fh2 * (tl - 1.0));
  const double published_w_m2 = cg1 * i0 * sine * std::exp(-extinction * m);

  const double b = 0.664 + 0.163 / fh1;
  const double beam_by_turbidity_w_m2 = b * i0 * std::exp(-0.09 * m * (tl - 1.0));
  const double least_diffuse_part = (0.1 - 0.2 * std::exp(-tl)) / (0.1 + 0.882 / fh1);
  const double beam_by_diffuse_w_m2 = published_w_m2 * (1.0 - least_diffuse_part) / sine;

  ClearSky sky;
  sky.beam_normal_w_m2 = std::min({beam_by_turbidity_w_m2, beam_by_diffuse_w_m2, i0});
  const double global_w_m2 = low_sun == LowSun::published
                                 ? published_w_m2
                                 : cg1 * i0 * sine * std::exp(corrected_log_clearness(extinction, m));
  // Above 4000 m cg1 outgrows 1.07, and clean air would give more than comes in.
  sky.global_w_m2 = std::min(global_w_m2, i0 * sine);
  return sky;
}

}  // namespace sunfall

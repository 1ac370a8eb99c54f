#pragma once
// Published limits of what a radiometer can show: Long and Dutton's tests of the Baseline Surface
// Radiation Network, as in Long and Shi (2008), The Open Atmospheric Science Journal 2:23-37.

namespace sunfall {

// W m-2.
struct RadiationLimits {
  double global = 0.0;
  double diffuse = 0.0;
  double beam_normal = 0.0;
};

inline constexpr double kLeastPossible_w_m2 = -4.0;  // a thermopile under a cold sky

// Upper limits for the sun's sine of elevation, 0 at night, and its strength above the air.
RadiationLimits physically_possible(double sine, double normal_w_m2);
RadiationLimits extremely_rare(double sine, double normal_w_m2);

// How far global over (diffuse + beam on the level) may lie from 1, and diffuse over global above 1. The
// tests hold where the sum is above 50 W m-2.
inline constexpr double kClosureFrom_w_m2 = 50.0;
double closure_tolerance(double sine);
double most_diffuse_over_global(double sine);

}  // namespace sunfall

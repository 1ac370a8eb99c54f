#pragma once
// A cloudless sky at an instant.

#include "sunfall/angle.h"

namespace sunfall {

// Relative optical air mass at sea level by Kasten and Young (1989, eq. 3); apparent elevation,
// taken as 0 below the horizon.
double air_mass(Angle apparent_elevation);

struct ClearSky {
  double global_w_m2 = 0.0;
  double beam_normal_w_m2 = 0.0;
};

// Ineichen and Perez (2002) as first published.
enum class LowSun {
  published,  // too dark below 30 degrees: 11 % at 15 degrees against Bird and Hulstrom (1981)
  corrected,  // with the factor exp(0.01 m^1.8) of Perez and others (2002), see clear_sky.cpp
};

struct ClearSkyInput {
  double extraterrestrial_normal_w_m2 = 0.0;
  double sine_of_elevation = 0.0;  // geometric
  double air_mass = 1.0;           // relative; times pressure over standard pressure: absolute
  double height_m = 0.0;
  double linke_turbidity = 3.0;  // at least 1, that of clean dry air
};

// Beam on the level never exceeds global, nor beam normal the extraterrestrial.
ClearSky clear_sky(const ClearSkyInput& input, LowSun low_sun = LowSun::corrected);

}  // namespace sunfall

#pragma once
// From a month's clearness to its beam and sky, and from a day's sum to its course.

#include "sunfall/angle.h"

namespace sunfall {

// The hour angle of sunset of the sun's centre, 0 (polar night) to 180 degrees (midnight sun).
Angle sunset_hour_angle(Angle latitude, Angle declination);

// Diffuse part of the monthly mean of global radiation by clearness, Erbs, Klein and Duffie (1982).
// Published for clearness 0.3 to 0.8: below, the polynomial goes on and is capped at 1, which it
// meets near 0.13; above, its value at 0.8 is held.
double erbs_monthly_diffuse_part(double clearness, Angle sunset_hour_angle);

// By how much global radiation at an hour angle exceeds, relative to the day, a course that follows
// the sine of the sun's elevation: Collares-Pereira and Rabl (1979), a + b cos ω. Their hourly ratio
// is r_t = (a + b cos ω) r_d with the r_d of Liu and Jordan (1960), which follows the sine. It does not
// integrate to 1 (0.99 to 1.01): renormalise.
double collares_pereira_rabl(Angle hour_angle, Angle sunset_hour_angle);

}  // namespace sunfall

#pragma once
// From a month's or a day's clearness to its beam and sky, and from a day's sum to its course.

#include "sunfall/angle.h"
#include "sunfall/light.h"

namespace sunfall {

// The hour angle of sunset of the sun's centre, 0 (polar night) to 180 degrees (midnight sun).
Angle sunset_hour_angle(Angle latitude, Angle declination);

// Diffuse part of the monthly mean of global radiation by clearness, Erbs, Klein and Duffie (1982).
// Published for clearness 0.3 to 0.8: below, the polynomial goes on and is capped at 1, which it
// meets near 0.13; above, its value at 0.8 is held.
double erbs_monthly_diffuse_part(double clearness, Angle sunset_hour_angle);

// The same by Collares-Pereira and Rabl (1979), with angles in radians:
// 0.775 + 0.347 (ws − π/2) − [0.505 + 0.261 (ws − π/2)] cos(2 (K − 0.9)).
double collares_pereira_monthly_diffuse_part(double clearness, Angle sunset_hour_angle);

// Diffuse part of one day's global radiation by its clearness, Erbs, Klein and Duffie (1982), for sunset
// before and after 81.4 degrees. The second polynomial rises to 1.008 at a clearness of 0.06 and is capped.
double erbs_daily_diffuse_part(double clearness, Angle sunset_hour_angle);

// The same by Collares-Pereira and Rabl (1979), all seasons alike. Of the two values in print for the cubic
// coefficient, −21.856 is the one that meets the next piece at 0.75.
double collares_pereira_daily_diffuse_part(double clearness);

double daily_diffuse_part(DaySplit split, double clearness, Angle sunset_hour_angle);
double monthly_diffuse_part(DaySplit split, double clearness, Angle sunset_hour_angle);
const char* name_of(DaySplit split);  // "Erbs, Klein and Duffie (1982)"

// By how much global radiation at an hour angle exceeds, relative to the day, a course that follows
// the sine of the sun's elevation: Collares-Pereira and Rabl (1979), a + b cos ω. Their hourly ratio
// is r_t = (a + b cos ω) r_d with the r_d of Liu and Jordan (1960), which follows the sine. It does not
// integrate to 1 (0.99 to 1.01): renormalise.
double collares_pereira_rabl(Angle hour_angle, Angle sunset_hour_angle);

}  // namespace sunfall

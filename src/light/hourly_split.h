#pragma once
// Beam and sky of an hour of which only the global radiation is known.

#include "sunfall/angle.h"

namespace sunfall {

// Diffuse part of an hour's global radiation by clearness, Erbs, Klein and Duffie (1982).
double erbs_hourly_diffuse_part(double clearness);

// What the model of Boland, Ridley and Lauret looks at.
struct HourOfDay {
  double clearness = 0.0;
  double day_clearness = 0.0;  // of the whole day
  double neighbours_clearness =
      0.0;                     // mean of the hours before and after; the one there is at the day's ends
  double solar_time_h = 12.0;  // apparent
  Angle elevation;
};

// The same by Ridley, Boland and Lauret (2010), Renewable Energy 35:478. Between 0 and 1.
double brl_diffuse_part(const HourOfDay& hour);

}  // namespace sunfall

#pragma once
// The source "sunshine": hours of bright sunshine of each day.

#include "light/open_series.h"

namespace sunfall {

// Clearness of a day by the part n/N of its length that the sun shone: Angstrom and Prescott, FAO-56 (Allen
// and others 1998) eq. 35 over the light above the air, a_s + b_s n/N.
double clearness_of_sunshine(double part_of_day, double a_s, double b_s);

// The day's length N by FAO-56 eq. 34: 24 ω_s / π, of the sun's centre and without refraction.
double day_length_h(Angle sunset_hour_angle);

// How much longer than from the first to the last of the sun's rim a day's sunshine may be: rounding, and a
// horizon below the level one.
inline constexpr double kSunshineAllowance_h = 0.2;

// Throws Error(data) for sunshine that is negative or longer than the day, and for values that are no hours.
LightSeries make_series(const SunshineSource& source, const LightRequest& request);

}  // namespace sunfall

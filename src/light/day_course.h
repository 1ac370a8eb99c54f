#pragma once
// From a day's sums to its ten-minute steps.

#include <vector>

#include "light/series_steps.h"
#include "sunfall/angle.h"

namespace sunfall {

// Steps of which nothing is known yet.
StepLight unknown_steps(const LightSeries& series);

// Declination in the middle of a day of the series, taken at its highest sun, where refraction matters least.
Angle declination_of_day(const LightSeries& series, std::size_t day);
// The hour angle of sunset of a day of the series, of the sun's centre and without refraction.
Angle sunset_of_day(const LightSeries& series, std::size_t day);

// What comes in above the air on a level plane on a day of the series: the sum of its steps' W m-2.
double above_air_of_day(const LightSeries& series, std::size_t day);
// The same sum of the global of known steps.
double global_of_day(const StepLight& steps, std::size_t day);

// Lays a day's global over its steps with the sun up, along the course of Collares-Pereira and Rabl (1979),
// scaled so that the steps sum to `global`. A day without sun takes nothing.
void lay_global(StepLight& steps, const LightSeries& series, std::size_t day, double global);

// Splits the global of a day's known steps: its sky sums to `sky` (as far as the global allows) and follows
// the sun's sine (Liu and Jordan 1960) as far as each step can hold it; no beam exceeds the sun above the
// air.
void lay_sky(StepLight& steps, const LightSeries& series, std::size_t day, double sky);

}  // namespace sunfall

#pragma once
// The source "temperature": lowest and highest air temperature of each day.

#include "light/open_series.h"

namespace sunfall {

// Clearness of a day by the range of its temperature: Hargreaves, FAO-56 (Allen and others 1998) eq. 50 over
// the light above the air, k_Rs sqrt(t_max − t_min).
double clearness_of_range(double t_min_c, double t_max_c, double k_rs);

// The clearness of a cloudless day at a height, FAO-56 eq. 37: 0.75 + 2e-5 z. No day is made clearer.
double cloudless_clearness(double height_m);

// Throws Error(data) for a highest temperature below the lowest, and for values that are no degrees Celsius.
LightSeries make_series(const TemperatureSource& source, const LightRequest& request);

}  // namespace sunfall

#pragma once
// The source "grid": a gridded weather file at the farm's place, read by what LightOptions hands in.

#include "light/open_series.h"

namespace sunfall {

// Throws Error(data) for units that are not those of light or not the plan's, for steps that are unequal or
// longer than an hour, for sums that are not what the plan says they are, and as a record does (series.h).
LightSeries make_series(const GridSource& source, const LightRequest& request);

}  // namespace sunfall

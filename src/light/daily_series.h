#pragma once
// The source "series" with stamp = "day": a station's or a sensor's daily sums or means.

#include "light/open_series.h"

namespace sunfall {

// Throws Error(data) for what read_days() refuses, for values that do not fit the unit, and for months of
// which more than a tenth is missing. A day that cannot be counts as missing.
LightSeries make_daily_series(const SeriesSource& source, const LightRequest& request);

}  // namespace sunfall

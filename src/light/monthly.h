#pragma once
// The source "monthly_global": twelve monthly means of daily global radiation.

#include "light/open_series.h"

namespace sunfall {

// Throws Error(plan) for a value that is negative, not a number, or above the extraterrestrial of
// its month. Values that look odd are used and noted.
LightSeries make_series(const MonthlyGlobalSource& source, const LightRequest& request);

}  // namespace sunfall

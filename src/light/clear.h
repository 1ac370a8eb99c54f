#pragma once
// The source "clear": a cloudless year.

#include <array>

#include "light/open_series.h"

namespace sunfall {

// Throws Error(plan) for a turbidity outside 1 to 12.
LightSeries make_series(const ClearSource& source, const LightRequest& request);

// Fills beam_w and sky_w of every step of an open series. A month's turbidity holds from its first
// day to its last.
void fill_clear_sky(LightSeries& series, const std::array<double, 12>& linke_turbidity);

}  // namespace sunfall

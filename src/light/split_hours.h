#pragma once
// Beam and sky of the steps of which only the global is known, hour by hour.

#include "light/series_steps.h"

namespace sunfall {

// Fills steps.sky where the global is known. Hours begin `phase` after the full hour of UTC, as the
// record's own do. Within an hour the sky follows the sun's sine (Liu and Jordan 1960), clouds make the
// beam come and go; sky and beam stay non-negative, the beam below the sun above the air. Returns the
// number of hours that were split.
long split_hours(StepLight& steps, const LightSeries& series, SeriesSource::Split model,
                 std::chrono::seconds phase);

}  // namespace sunfall

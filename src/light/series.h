#pragma once
// The source "series": a station's or a quantum sensor's record in a CSV file.

#include "light/open_series.h"

namespace sunfall {

// Throws Error(data) for a file that is no such record, whose unit or clock is wrong, or of which too much is
// missing; the messages of its parts tell which.
LightSeries make_series(const SeriesSource& source, const LightRequest& request);

}  // namespace sunfall

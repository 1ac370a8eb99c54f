#pragma once
// The source "series": a station's or a quantum sensor's record in a CSV file.

#include "light/open_series.h"
#include "light/readings.h"

namespace sunfall {

// Throws Error(data) for a file that is no such record, whose unit or clock is wrong, or of which too much is
// missing; the messages of its parts tell which.
LightSeries make_series(const SeriesSource& source, const LightRequest& request);

// Throws Error(plan) for quantities that do not make a light: beam and diffuse together give the global; a
// quantum sensor faces the sky.
void check_columns(const SeriesSource& source, const std::string& where);

// The same from readings that were taken elsewhere; `source` tells how they are to be understood.
LightSeries series_of(Readings readings, const SeriesSource& source, const LightRequest& request);

}  // namespace sunfall

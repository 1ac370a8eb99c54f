#pragma once
// Whether a surface can belong to a ground: both must count heights from the same zero.

#include <string>
#include <vector>

#include "geo/raster_source.h"

namespace sunfall {

// What looks odd, one sentence each, from patches spread over the map: a surface below the ground (it
// holds heights above the ground, or is 0 where nothing stands), or one that covers most of it (another
// zero of height, or a wood). The grids must agree.
std::vector<std::string> surface_oddities(const RasterSource& ground, const RasterSource& surface,
                                          double receiver_height_m);

}  // namespace sunfall

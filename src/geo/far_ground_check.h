#pragma once
// Whether the coarse terrain around counts heights from the ground's own zero.

#include <filesystem>
#include <string>
#include <vector>

#include "geo/raster_source.h"

namespace sunfall {

// One sentence where the far ground lies more than 20 m above or below the ground in the middle of
// their differences over the map: left alone such a step stands around the map as a ring of hills, or
// sinks those that are there. Nothing where the two do not meet.
std::vector<std::string> far_ground_oddities(const RasterSource& ground,
                                             const std::filesystem::path& far_ground);

}  // namespace sunfall

#pragma once
// Where gridded weather meets the light: geo reads columns, light understands them.

#include "sunfall/light.h"

namespace sunfall {

// The LightOptions::read_point of the program. Throws Error as read_point_series() does (geo/point_series.h).
PointRecord read_point(const GridSource& source, const Place& place);

}  // namespace sunfall

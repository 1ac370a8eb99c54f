#pragma once
// Whether a map's metres are metres on the ground.

#include <string>

#include "geo/geodesy.h"
#include "sunfall/grid.h"

namespace sunfall {

// Throws Error(data) where the map's metres differ from the ground's by more than 2 %, as those of
// the web maps' Mercator do away from the equator: every slope, horizon and area would be off by as
// much. `where` names the raster.
void require_true_metres(const GridFrame& frame, const GeoPlace& middle, const std::string& where);

}  // namespace sunfall

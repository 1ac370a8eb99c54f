#pragma once
// One plot out of a vector layer: all polygons that a filter selects.

#include <filesystem>
#include <string>
#include <vector>

#include "sunfall/grid.h"

namespace sunfall {

struct AreaRequest {
  std::filesystem::path file;
  std::string layer;                // empty: the file's only layer
  std::string filter;               // in the words of SQL's WHERE; empty: all features
  std::string table = "rows.area";  // the plan's, for remedies
};

struct PlotArea {
  std::vector<std::vector<MapPoint>> rings;  // outer rings counter-clockwise, holes clockwise
  double area_m2 = 0.0;
  std::vector<std::string> notes;  // a layer carried over from another CRS
};

// On the frame's CRS. Throws Error(data): a missing layer (names those that exist), a filter that cannot be
// read (names the fields) or selects nothing, a polygon that is none, is invalid, or overlaps another of the
// plot, a plot wholly or partly off the frame, or smaller than a cell.
PlotArea read_area(const AreaRequest& request, const GridFrame& frame);

}  // namespace sunfall

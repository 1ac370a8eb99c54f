#pragma once
// Plots: the polygons of a vector layer, in and out.

#include <filesystem>
#include <map>
#include <optional>
#include <string>
#include <vector>

#include "sunfall/grid.h"

namespace sunfall {

struct Plot {
  std::string id;
  std::string crop;                          // empty where not given
  std::vector<std::vector<MapPoint>> rings;  // outer rings counter-clockwise, holes clockwise
  double area_m2 = 0.0;
};

struct PlotsRequest {
  std::filesystem::path file;
  std::string layer;  // empty: the only layer
  std::string id_field = "id";
  std::optional<std::string> crop_field;
};

// Polygons and multipolygons, reprojected to the frame's CRS. Throws Error(data): a missing layer
// or field (names those that exist), an invalid polygon (names the plot and the fault), a repeated
// or empty id, a plot that lies wholly or partly off the frame, no plots at all.
std::vector<Plot> read_plots(const PlotsRequest& request, const GridFrame& frame);

// For each plot, the cells whose centre lies inside it; a plot that holds no centre gets the
// cells that it touches. Sorted by row, then column.
std::vector<std::vector<CellIndex>> cells_of_plots(const std::vector<Plot>& plots, const GridFrame& frame);

// One row of numbers and texts per plot, written with the polygons as GeoPackage. Whole or not at
// all, as with rasters.
struct PlotColumn {
  std::string name;
  std::vector<double> numbers;     // one per plot; NaN is written as null
  std::vector<std::string> texts;  // used when numbers is empty
};
void write_plots_gpkg(const std::filesystem::path& file, const std::vector<Plot>& plots,
                      const std::vector<PlotColumn>& columns, const GridFrame& frame);

}  // namespace sunfall

#pragma once
// Leaves given cell by cell: each of top, base and leaf density a number or a raster on the map's grid.

#include <filesystem>
#include <memory>
#include <optional>
#include <string>
#include <vector>

#include "geo/canopy_source.h"
#include "geo/raster_source.h"

namespace sunfall {

struct GridValue {
  double number = 0.0;
  std::optional<std::filesystem::path> file;  // in place of the number
};

struct GridCanopyRequest {
  GridValue top_m;         // above the ground
  GridValue base_m;        // above the ground
  GridValue leaf_density;  // m2 m-3
  std::string where;       // "farm.toml:30 canopy", for what no one raster is at fault for
};

// Reads every raster once to check it, and by window afterwards. A cell holds leaves where top and density
// have values above 0 and the top stands above the base. Throws Error(data): a raster off the ground's grid
// (tells how to align it), a value that cannot be, a base above its top where a raster gives it, or none
// where leaves are (each names the cell), no leaves at all. Adds to `notes` where tops do not reach above a
// base that is one number.
std::unique_ptr<CanopySource> open_grid_canopy(const GridCanopyRequest& request, const RasterSource& ground,
                                               std::vector<std::string>& notes);

}  // namespace sunfall

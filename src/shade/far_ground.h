#pragma once
// Coarser terrain around the map, for the far horizon.

#include <filesystem>
#include <vector>

#include "sunfall/grid.h"

namespace sunfall {

// The map's outermost cells of ground: one row or column each.
struct MapEdges {
  Grid<float> north, south, west, east;
};

class FarGround {
 public:
  // Resampled once onto the level whose cells are nearest to the raster's own, as far as `reach_m`
  // beyond the map. Throws Error(data) where it lies away from the map.
  FarGround(const std::filesystem::path& file, const GridFrame& map, double reach_m);

  // Where two terrain models meet they differ by some metres; left alone that would stand as a wall
  // along the map's edge. The step is taken off the far ground, fading out over a few of its cells.
  void join(const MapEdges& edges);

  // The height of a cell of any level: between its own cells' centres below its level, the highest
  // above; kNothing where unknown.
  float height(int level, int column, int row) const;
  // All of it, in map cells.
  CellWindow box() const;

 private:
  float between(double x, double y) const;
  float edge_step(double x, double y) const;

  GridFrame map_;
  int first_level_ = 1;
  std::vector<CellWindow> windows_;         // of each level from the first on, in its cells
  std::vector<std::vector<float>> levels_;  // heights, row by row
  // Ground minus far ground along the map's edges: by column, by column, by row, by row.
  std::vector<float> north_step_, south_step_, west_step_, east_step_;
};

}  // namespace sunfall

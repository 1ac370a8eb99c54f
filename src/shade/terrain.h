#pragma once
// The solid scene: ground to stand on, and whatever of ground and surface hides the sky, at full
// resolution nearby and coarser with distance. Coarser levels keep the highest of the cells that
// they cover, so that a far hedge keeps its height; at their distance that errs by less than a
// hundredth of the ground's slope.

#include <filesystem>
#include <memory>
#include <mutex>
#include <optional>
#include <vector>

#include "geo/raster_source.h"
#include "shade/far_ground.h"
#include "sunfall/grid.h"
#include "sunfall/progress.h"

namespace sunfall {

// Level n has cells of 2^n map cells, on a lattice that starts at the map's north-west corner.
struct LevelGrid {
  int level = 0;
  CellWindow window;           // in cells of this level
  std::vector<float> heights;  // row by row; kNothing where nothing is known
};

// What a tile needs to see its horizon.
struct TerrainTile {
  CellWindow window;  // map cells of the tile
  int map_columns = 0, map_rows = 0;
  std::vector<LevelGrid> levels;  // level 0 first, each reaching farther
  CellWindow receiver_window;     // the tile with kReceiverMargin cells of margin
  std::vector<float> receivers;   // receiver heights over receiver_window, gaps filled in
  std::vector<char> usable;       // tile cells: 1 where a receiver stands in known ground, not under solid
};

class Terrain {
 public:
  struct Inputs {
    RasterSource ground;
    std::optional<RasterSource> surface;
    std::optional<std::filesystem::path> far_ground;
    double receiver_height_m = 0.5;
    double reach_m = 60'000.0;  // nothing beyond is looked at
  };
  // Reads the rasters once, checking every height, and builds the coarser levels.
  Terrain(Inputs inputs, Progress& progress);

  const GridFrame& frame() const { return frame_; }
  double valid_fraction() const { return valid_fraction_; }
  double receiver_height_m() const { return inputs_.receiver_height_m; }
  float lowest_m() const { return lowest_m_; }
  float highest_m() const { return highest_m_; }
  // Level of the coarsest grid, and the box of all data in map cells (may reach outside the map).
  int top_level() const { return top_level_; }
  CellWindow known_box() const { return known_box_; }

  // May be called from several threads.
  TerrainTile tile(const CellWindow& window) const;

  // The hiding heights of one level; kNothing where unknown.
  LevelGrid level_grid(int level, const CellWindow& window) const;
  // Receiver heights; missing where the ground is.
  Grid<float> ground(const CellWindow& window) const;

 private:
  struct Level {
    int columns = 0;
    int rows = 0;
    std::vector<float> heights;
  };
  void read_all(Progress& progress);
  void hiding_heights(const CellWindow& window, float* out) const;
  CellWindow box_at(int level) const;

  Inputs inputs_;
  GridFrame frame_;
  mutable std::mutex reading_;
  std::vector<Level> levels_;  // levels_[n] is level n + 1 of the map itself
  std::optional<FarGround> far_;
  int top_level_ = 0;
  CellWindow known_box_;
  double valid_fraction_ = 0.0;
  float lowest_m_ = 0.0F;
  float highest_m_ = 0.0F;
};

// Full resolution reaches this many cells around a tile; level n reaches 2^n times as far.
inline constexpr int kFullReach = 128;

}  // namespace sunfall

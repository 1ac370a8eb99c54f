#include "shade/canopy.h"

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

#include "shade/canopy_tile.h"
#include "shade/level_cells.h"

namespace sunfall {
namespace {

constexpr int kStripRows = 256;  // read at once

// The part of a window that lies on the map.
CellWindow within(const CellWindow& window, const GridFrame& frame) {
  const int west = std::max(window.column, 0), north = std::max(window.row, 0);
  const int east = std::min(window.column + window.columns, frame.columns);
  const int south = std::min(window.row + window.rows, frame.rows);
  return {west, north, std::max(east - west, 0), std::max(south - north, 0)};
}

// Bins of the sweep for rays that hardly rise: fine enough for crowns of the canopy's size.
float bin_for(float highest_top_m) { return std::max(0.125F, highest_top_m / 60.0F); }

}  // namespace

Canopy::Canopy(std::shared_ptr<const CanopySource> source, const Terrain& terrain,
               const CanopyOptions& options)
    : source_(std::move(source)),
      terrain_(terrain),
      options_(options),
      depth_(options.leaves),
      bin_m_(bin_for(source_->highest_top_m())) {
  const double rise_m =
      static_cast<double>(terrain.highest_m() - terrain.lowest_m()) + source_->highest_top_m();
  const double rows = std::ceil(rise_m / (tan(Angle::degrees(kLowestCanopyDeg)) * terrain.frame().cell_m));
  reach_ = static_cast<int>(std::clamp(rows, 1.0, double{kCanopyReach}));
}

std::unique_ptr<CasterTile> Canopy::tile(const TerrainTile& tile) const {
  if (std::find(tile.usable.begin(), tile.usable.end(), 1) == tile.usable.end()) return nullptr;
  const CellWindow window = within(grown(tile.window, reach_ + 2), terrain_.frame());
  LeafLines leaves(window.row, window.rows, window.column, window.columns);
  const float zero_m = terrain_.lowest_m();
  for (int row = 0; row < window.rows; row += kStripRows) {
    const CellWindow strip{window.column, window.row + row, window.columns,
                           std::min(kStripRows, window.rows - row)};
    const CanopyCells cells = source_->read(strip);
    // What is missing compares false.
    const auto holds = [&](std::size_t i) {
      return cells.leaf_density[i] > 0.0F && cells.top_m[i] > cells.base_m[i];
    };
    const std::size_t size = cells.leaf_density.size();
    std::size_t next = 0;
    while (next < size && !holds(next)) ++next;
    if (next == size) continue;
    const Grid<float> ground = terrain_.ground(strip);
    for (; next < size; ++next) {
      const float height = ground.values()[next] - zero_m;
      if (!holds(next) || std::isnan(height)) continue;
      const int line = static_cast<int>(next / static_cast<std::size_t>(strip.columns));
      const int cell = static_cast<int>(next % static_cast<std::size_t>(strip.columns));
      leaves.append(strip.row + line, strip.column + cell,
                    {height + cells.base_m[next], height + cells.top_m[next], cells.leaf_density[next]});
    }
  }
  if (leaves.empty()) return nullptr;
  leaves.finish();
  CanopyScene scene;
  scene.cell_m = terrain_.frame().cell_m;
  scene.zero_m = zero_m;
  scene.bin_m = bin_m_;
  scene.reach = reach_;
  return std::make_unique<CanopyTile>(tile, std::move(leaves), scene, depth_);
}

}  // namespace sunfall

#include "shade/far_ground.h"

#include <algorithm>
#include <cmath>

#include "geo/raster_source.h"
#include "shade/horizon_kernel.h"
#include "shade/level_cells.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr double kMostCells = 16e6;

}  // namespace

FarGround::FarGround(const std::filesystem::path& file, const GridFrame& map, double reach_m) : map_(map) {
  const MapBox box = extent_in(file, "far_ground", map);
  const double west = std::max(box.west, map.west - reach_m);
  const double east = std::min(box.east, map.west + map.columns * map.cell_m + reach_m);
  const double north = std::min(box.north, map.north + reach_m);
  const double south = std::max(box.south, map.north - map.rows * map.cell_m - reach_m);
  if (east <= west || north <= south) {
    throw Error(ErrorKind::data, {"far_ground lies away from the ground that it should surround",
                                  file.string(), "", "Give terrain around the plot"});
  }
  first_level_ = std::max(1, static_cast<int>(std::lround(std::log2(box.cell_m / map.cell_m))));
  // Finer cells than these would take memory and show nothing more at their distance.
  const auto cells = [&] {
    const double per_cell = map.cell_m * std::exp2(first_level_);
    return (east - west) / per_cell * ((north - south) / per_cell);
  };
  while (cells() > kMostCells) ++first_level_;
  const double size = map.cell_m * std::exp2(first_level_);
  CellWindow window;
  window.column = static_cast<int>(std::floor((west - map.west) / size));
  window.row = static_cast<int>(std::floor((map.north - north) / size));
  window.columns = static_cast<int>(std::ceil((east - map.west) / size)) - window.column;
  window.rows = static_cast<int>(std::ceil((map.north - south) / size)) - window.row;
  GridFrame target = map;
  target.columns = window.columns;
  target.rows = window.rows;
  target.cell_m = size;
  target.west = map.west + window.column * size;
  target.north = map.north - window.row * size;
  Grid<float> grid = resample(file, "far_ground", target);
  for (float& height : grid.values()) height = std::isnan(height) ? kNothing : height;
  levels_.push_back(std::move(grid.values()));
  windows_.push_back(window);
  while (windows_.back().columns > 2 || windows_.back().rows > 2) {
    const CellWindow fine = windows_.back(), coarse = covering(fine, 1);
    levels_.push_back(halved(levels_.back(), fine, coarse));
    windows_.push_back(coarse);
  }
}

CellWindow FarGround::box() const {
  const int cells = 1 << first_level_;
  const CellWindow& window = windows_.front();
  return {window.column * cells, window.row * cells, window.columns * cells, window.rows * cells};
}

// Far ground between its cells' centres, at map cells from the map's corner.
float FarGround::between(double x, double y) const {
  const double scale = std::exp2(-first_level_);
  const double column = x * scale - 0.5 - windows_[0].column, row = y * scale - 0.5 - windows_[0].row;
  const int c = static_cast<int>(std::floor(column)), r = static_cast<int>(std::floor(row));
  if (c < 0 || r < 0 || c + 1 >= windows_[0].columns || r + 1 >= windows_[0].rows) return kNothing;
  const float* above = levels_[0].data() + static_cast<std::size_t>(r) * windows_[0].columns + c;
  const float* below = above + windows_[0].columns;
  if (above[0] == kNothing || above[1] == kNothing || below[0] == kNothing || below[1] == kNothing)
    return kNothing;
  const float fx = static_cast<float>(column - c), fy = static_cast<float>(row - r);
  return (above[0] * (1 - fx) + above[1] * fx) * (1 - fy) + (below[0] * (1 - fx) + below[1] * fx) * fy;
}

void FarGround::join(const MapEdges& edges) {
  const auto step = [&](float ground, int column, int row) {
    const float far = between(column + 0.5, row + 0.5);
    return std::isnan(ground) || far == kNothing ? 0.0F : ground - far;
  };
  for (int column = 0; column < map_.columns; ++column) {
    north_step_.push_back(step(edges.north.at(column, 0), column, 0));
    south_step_.push_back(step(edges.south.at(column, 0), column, map_.rows - 1));
  }
  for (int row = 0; row < map_.rows; ++row) {
    west_step_.push_back(step(edges.west.at(0, row), 0, row));
    east_step_.push_back(step(edges.east.at(0, row), map_.columns - 1, row));
  }
}

float FarGround::edge_step(double x, double y) const {
  constexpr double kFarCells = 4.0;
  const double inside_x = std::clamp(x, 0.0, map_.columns - 0.5),
               inside_y = std::clamp(y, 0.0, map_.rows - 0.5);
  const double away = std::hypot(x - inside_x, y - inside_y) / (kFarCells * std::exp2(first_level_));
  if (away >= 1.0) return 0.0F;
  const auto column = static_cast<std::size_t>(inside_x), row = static_cast<std::size_t>(inside_y);
  const float step = y < 0.0         ? north_step_[column]
                     : y > map_.rows ? south_step_[column]
                     : x < 0.0       ? west_step_[row]
                                     : east_step_[row];
  return step * static_cast<float>(1.0 - away);
}

// Far ground under a cell of any level: between its cells below its own level, the highest above.
float FarGround::height(int level, int column, int row) const {
  if (level >= first_level_) {
    const std::size_t n = std::min<std::size_t>(level - first_level_, levels_.size() - 1);
    const int extra = level - first_level_ - static_cast<int>(n);
    const CellWindow& window = windows_[n];
    const int c = column * (1 << extra) - window.column, r = row * (1 << extra) - window.row;
    if (c < 0 || r < 0 || c >= window.columns || r >= window.rows) return kNothing;
    return levels_[n][static_cast<std::size_t>(r) * window.columns + c];
  }
  const double size = 1 << level;
  const double x = (column + 0.5) * size, y = (row + 0.5) * size;
  const float height = between(x, y);
  if (height == kNothing) return kNothing;
  const bool outside = x < 0.0 || y < 0.0 || x > map_.columns || y > map_.rows;
  return outside ? height + edge_step(x, y) : height;
}

}  // namespace sunfall

#include "map/sight.h"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "shade/horizon_kernel.h"

namespace sunfall {
namespace {

constexpr int kDirections = 36;

// Sight is found on a lattice of cells and read between. It changes over distances like that of the
// unseen obstacle's height; half of that, in cells, is fine enough.
int lattice_of(double cell_m) {
  return std::clamp(static_cast<int>(std::lround(0.5 * kUnseenObstacle_m / cell_m)), 1, 16);
}

// Whether any level knows the height at a place, counted in map cells from the map's corner. The
// finest level that reaches the place answers.
bool known(const TerrainTile& tile, double x, double y) {
  for (const LevelGrid& grid : tile.levels) {
    const double size = 1 << grid.level;
    const int column = static_cast<int>(std::floor(x / size)) - grid.window.column;
    const int row = static_cast<int>(std::floor(y / size)) - grid.window.row;
    if (column < 0 || row < 0 || column >= grid.window.columns || row >= grid.window.rows) continue;
    return grid.heights[static_cast<std::size_t>(row) * grid.window.columns + column] != kNothing;
  }
  return false;
}

// Map cells from a place to where the data end in a direction. Steps grow with distance, as the
// grids do, and stop where an obstacle past the edge no longer counts.
double reach(const TerrainTile& tile, double x, double y, double east, double south, double most) {
  double distance = 0.5;
  while (distance < most) {
    if (!known(tile, x + east * distance, y + south * distance)) return distance;
    distance += std::max(1.0, distance / 16.0);
  }
  return most;
}

double sight_at(const TerrainTile& tile, double x, double y, double cell_m) {
  double sum = 0.0;
  const double unseen = kUnseenObstacle_m / cell_m;
  const double most = 100.0 * unseen;  // covered to 0.9999
  for (int k = 0; k < kDirections; ++k) {
    const double azimuth = 2.0 * std::numbers::pi * (k + 0.5) / kDirections;
    const double distance = reach(tile, x, y, std::sin(azimuth), -std::cos(azimuth), most);
    sum += distance >= most ? 1.0 : distance * distance / (distance * distance + unseen * unseen);
  }
  return sum / kDirections;
}

}  // namespace

std::vector<float> tile_sight(const TerrainTile& tile, double cell_m) {
  const CellWindow& window = tile.window;
  const int lattice_cells = lattice_of(cell_m);
  const int columns = (window.columns - 1) / lattice_cells + 2, rows = (window.rows - 1) / lattice_cells + 2;
  std::vector<double> lattice(static_cast<std::size_t>(columns) * rows);
  for (int row = 0; row < rows; ++row) {
    for (int column = 0; column < columns; ++column) {
      // The last lattice lines stand on the tile's last cells.
      const int c = std::min(column * lattice_cells, window.columns - 1),
                r = std::min(row * lattice_cells, window.rows - 1);
      lattice[static_cast<std::size_t>(row) * columns + column] =
          sight_at(tile, window.column + c + 0.5, window.row + r + 0.5, cell_m);
    }
  }
  std::vector<float> sight(static_cast<std::size_t>(window.columns) * window.rows);
  for (int row = 0; row < window.rows; ++row) {
    for (int column = 0; column < window.columns; ++column) {
      const int c = column / lattice_cells, r = row / lattice_cells;
      const double fx = double(column % lattice_cells) /
                        std::max(1, std::min(lattice_cells, window.columns - 1 - c * lattice_cells));
      const double fy = double(row % lattice_cells) /
                        std::max(1, std::min(lattice_cells, window.rows - 1 - r * lattice_cells));
      const double* at = lattice.data() + static_cast<std::size_t>(r) * columns + c;
      const double above = at[0] + fx * (at[1] - at[0]);
      const double below = at[columns] + fx * (at[columns + 1] - at[columns]);
      sight[static_cast<std::size_t>(row) * window.columns + column] =
          static_cast<float>(above + fy * (below - above));
    }
  }
  return sight;
}

}  // namespace sunfall

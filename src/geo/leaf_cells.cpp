#include "geo/leaf_cells.h"

#include <algorithm>
#include <cmath>

namespace sunfall {
LeafCells::LeafCells(const CellWindow& window)
    : window_(window),
      cells_(static_cast<std::size_t>(window.columns) * static_cast<std::size_t>(window.rows)) {}

void LeafCells::add(int column, int row, double leaf_area_index, double base_m, double top_m) {
  if (!(leaf_area_index > 0.0)) return;
  Cell& cell =
      cells_[static_cast<std::size_t>(row - window_.row) * static_cast<std::size_t>(window_.columns) +
             static_cast<std::size_t>(column - window_.column)];
  cell.lowest_m = cell.leaves > 0.0 ? std::min(cell.lowest_m, base_m) : base_m;
  cell.highest_m = cell.leaves > 0.0 ? std::max(cell.highest_m, top_m) : top_m;
  cell.leaves += leaf_area_index;
  // Means of z and z² from base to top.
  cell.leaves_height += leaf_area_index * (base_m + top_m) / 2.0;
  cell.leaves_height_square += leaf_area_index * (base_m * base_m + base_m * top_m + top_m * top_m) / 3.0;
}

CanopyCells LeafCells::cells() const {
  CanopyCells out{window_, std::vector<float>(cells_.size(), 0.0F), std::vector<float>(cells_.size(), 0.0F),
                  std::vector<float>(cells_.size(), 0.0F)};
  for (std::size_t i = 0; i < cells_.size(); ++i) {
    const Cell& cell = cells_[i];
    if (cell.leaves <= 0.0) continue;
    const double mean = cell.leaves_height / cell.leaves;
    const double variance = std::max(0.0, cell.leaves_height_square / cell.leaves - mean * mean);
    // An even layer h deep has the variance h² / 12. It may not reach beyond any leaf, on neither side, or
    // its mean would move.
    const double reach = std::min({std::sqrt(3.0 * variance), mean - cell.lowest_m, cell.highest_m - mean});
    const double half = std::max(reach, kThinnest_m / 2.0);
    const double low = std::max(0.0, mean - half);
    const double high = std::max(mean + half, low + kThinnest_m);
    out.base_m[i] = static_cast<float>(low);
    out.top_m[i] = static_cast<float>(high);
    out.leaf_density[i] = static_cast<float>(cell.leaves / (double(out.top_m[i]) - double(out.base_m[i])));
  }
  return out;
}

}  // namespace sunfall

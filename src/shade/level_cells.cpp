#include "shade/level_cells.h"

#include <algorithm>

#include "shade/horizon_kernel.h"

namespace sunfall {

CellWindow covering(const CellWindow& window, int level) {
  const int size = 1 << level;
  CellWindow out;
  out.column = floor_div(window.column, size);
  out.row = floor_div(window.row, size);
  out.columns = ceil_div(window.column + window.columns, size) - out.column;
  out.rows = ceil_div(window.row + window.rows, size) - out.row;
  return out;
}

CellWindow joined(const CellWindow& a, const CellWindow& b) {
  const int west = std::min(a.column, b.column), north = std::min(a.row, b.row);
  const int east = std::max(a.column + a.columns, b.column + b.columns);
  const int south = std::max(a.row + a.rows, b.row + b.rows);
  return {west, north, east - west, south - north};
}

CellWindow grown(const CellWindow& window, int margin) {
  return {window.column - margin, window.row - margin, window.columns + 2 * margin, window.rows + 2 * margin};
}

std::vector<float> halved(const std::vector<float>& heights, const CellWindow& fine,
                          const CellWindow& coarse) {
  std::vector<float> out(static_cast<std::size_t>(coarse.columns) * coarse.rows, kNothing);
  for (int row = 0; row < fine.rows; ++row) {
    const int to_row = floor_div(fine.row + row, 2) - coarse.row;
    const float* from = heights.data() + static_cast<std::size_t>(row) * fine.columns;
    float* to = out.data() + static_cast<std::size_t>(to_row) * coarse.columns;
    for (int column = 0; column < fine.columns; ++column) {
      float& cell = to[floor_div(fine.column + column, 2) - coarse.column];
      cell = std::max(cell, from[column]);
    }
  }
  return out;
}

}  // namespace sunfall

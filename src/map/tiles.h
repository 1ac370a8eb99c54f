#pragma once
// The map cut into tiles, row by row.

#include <algorithm>
#include <vector>

#include "sunfall/grid.h"

namespace sunfall {

inline std::vector<CellWindow> tiles_of(const GridFrame& frame, int size) {
  std::vector<CellWindow> tiles;
  for (int row = 0; row < frame.rows; row += size) {
    for (int column = 0; column < frame.columns; column += size) {
      tiles.push_back(
          {column, row, std::min(size, frame.columns - column), std::min(size, frame.rows - row)});
    }
  }
  return tiles;
}

}  // namespace sunfall

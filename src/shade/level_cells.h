#pragma once
// Cells of the coarser levels: level n has cells of 2^n map cells, on a lattice that starts at the
// map's north-west corner.

#include <vector>

#include "sunfall/grid.h"

namespace sunfall {

constexpr int floor_div(int a, int b) { return a >= 0 ? a / b : -((-a + b - 1) / b); }
constexpr int ceil_div(int a, int b) { return -floor_div(-a, b); }

// The cells, 2^level times as large, that cover a rectangle of cells.
CellWindow covering(const CellWindow& window, int level);
// The smallest rectangle that holds both.
CellWindow joined(const CellWindow& a, const CellWindow& b);
CellWindow grown(const CellWindow& window, int margin);

// Halves a grid that stands at `fine` onto the cells `coarse`, keeping the highest of the (up to
// four) cells below each; kNothing where there are none.
std::vector<float> halved(const std::vector<float>& heights, const CellWindow& fine,
                          const CellWindow& coarse);

}  // namespace sunfall

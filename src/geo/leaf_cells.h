#pragma once
// Leaves of many crowns and hedges, gathered cell by cell into one layer each. Leaf areas add up; the layer
// keeps their amount, their mean height and their spread about it, so nothing hangs on the order, nor leaf
// area on the size of cells.

#include "geo/canopy_source.h"

namespace sunfall {

class LeafCells {
 public:
  // A thinner layer would hold its leaves at a density that floats cannot tell.
  static constexpr double kThinnest_m = 0.01;

  explicit LeafCells(const CellWindow& window);

  const CellWindow& window() const { return window_; }
  // Leaves spread evenly from base to top over a cell: m2 of leaf per m2 of the whole cell. The cell, in the
  // map's count, must lie in the window.
  void add(int column, int row, double leaf_area_index, double base_m, double top_m);
  CanopyCells cells() const;

 private:
  struct Cell {
    double leaves = 0.0;
    double leaves_height = 0.0;         // leaves · height, m
    double leaves_height_square = 0.0;  // leaves · height², m2
    double lowest_m = 0.0;
    double highest_m = 0.0;
  };
  CellWindow window_;
  std::vector<Cell> cells_;
};

}  // namespace sunfall

#pragma once
// Leaves on the map's grid, wherever they come from: rasters, numbers, trees and hedges of a vector layer.

#include <vector>

#include "sunfall/grid.h"

namespace sunfall {

// Row by row over the window; cells outside the map hold nothing. A cell without leaves has density 0.
struct CanopyCells {
  CellWindow window;
  std::vector<float> top_m;         // above the ground
  std::vector<float> base_m;        // above the ground, at most top_m
  std::vector<float> leaf_density;  // m2 of leaf (one side) per m3 between base and top
};

class CanopySource {
 public:
  virtual ~CanopySource() = default;
  // No leaf of it stands higher above its ground.
  virtual float highest_top_m() const = 0;
  // May be called from several threads.
  virtual CanopyCells read(const CellWindow& window) const = 0;
};

}  // namespace sunfall

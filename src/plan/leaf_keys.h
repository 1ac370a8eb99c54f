#pragma once
// What [[rows]] and [[canopy]] say of leaves in the same words.

#include <vector>

#include "plan/key_shapes.h"
#include "plan/table_reader.h"

namespace sunfall {

struct LeafKeys {
  double leaf_angle = 1.0;
  double clumping = 1.0;
  double absorptance = 0.85;
  std::array<double, 12> leafing = {1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1};
};

// Of leaf_density, wherever it stands, m2 m-3.
Bounds leaf_density_bounds();

// `keys` and those of leaves behind them.
std::vector<KeyNote> with_leaf_keys(std::vector<KeyNote> keys);
LeafKeys read_leaf_keys(TableReader& table);

}  // namespace sunfall

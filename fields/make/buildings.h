#pragma once
// Everything solid that stands on the farm.

#include <functional>
#include <optional>
#include <string>
#include <vector>

#include "shapes.h"

namespace alder_reach {

struct Solid {
  std::string name;
  // Height of its top above its foot at a point; nothing beside it.
  std::function<std::optional<double>(Point)> top_m;
  // Where its level foot is; without one it follows the ground.
  std::optional<Point> foot;
};

std::vector<Solid> farm_solids();

// Top of ground and solids, metres.
double surface_height(Point point, const std::vector<Solid>& solids);

}  // namespace alder_reach

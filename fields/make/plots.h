#pragma once
// The farm's plots.

#include <string>
#include <vector>

#include "shapes.h"

namespace alder_reach {

struct FarmPlot {
  std::string id;
  std::string name;
  std::string crop;
  Path outline;  // counter-clockwise, not closed
};

std::vector<FarmPlot> farm_plots();

}  // namespace alder_reach

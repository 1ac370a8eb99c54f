#pragma once
// From the plan's [[canopy]] to leaves on the grid.

#include <memory>
#include <string>
#include <vector>

#include "geo/canopy_source.h"
#include "geo/raster_source.h"
#include "sunfall/plan.h"

namespace sunfall {

// Leaf density, m2 m-3, of leaves through which `optical_porosity` of what lies behind is seen, looking level
// and straight through: Beer and Lambert's law, porosity = exp(-G · clumping · density · width), with G that
// of level light. 0 where the porosity is 1.
double windbreak_leaf_density(const WindbreakPlan& windbreak, double leaf_angle, double clumping);

// Opens and checks what the canopy names. Throws Error(data), and Error(plan) for a windbreak so dense that
// it cannot be leaves. Adds to `notes` what was read and assumed.
std::unique_ptr<CanopySource> open_canopy(const CanopyPlan& canopy, const RasterSource& ground,
                                          std::vector<std::string>& notes);

}  // namespace sunfall

#pragma once
// The plan's casters that let light through. Another kind is one file pair in src/shade and one line here.

#include "map/caster_tables.h"
#include "shade/terrain.h"
#include "sunfall/plan.h"

namespace sunfall {

// They keep `terrain` by reference. Throws Error(plan) or Error(data).
Casters make_casters(const Plan& plan, const Terrain& terrain);

}  // namespace sunfall

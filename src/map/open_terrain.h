#pragma once
// From the plan's [site] to the solid scene.

#include "shade/terrain.h"
#include "sunfall/plan.h"

namespace sunfall {

// Opens the rasters that the site names. Throws Error(data).
Terrain::Inputs open_terrain(const SitePlan& site);

}  // namespace sunfall

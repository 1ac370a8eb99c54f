#pragma once
// The plan's casters that let light through. Another kind is one file pair in src/shade and one line in
// make_casters().

#include <string>
#include <vector>

#include "map/caster_tables.h"
#include "shade/terrain.h"
#include "sunfall/plan.h"

namespace sunfall {

struct PlanCasters {
  Casters casters;
  std::vector<std::string> notes;  // assumptions that were made for the user
};

// They keep `terrain` by reference. Throws Error(plan) or Error(data).
PlanCasters make_casters(const Plan& plan, const Terrain& terrain);

// The files that they are read from.
std::vector<std::filesystem::path> files_of_casters(const Plan& plan);

}  // namespace sunfall

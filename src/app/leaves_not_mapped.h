#pragma once
// Plans hold leaves before maps can. Gone, with its one call, once maps have casters.

#include "sunfall/error.h"
#include "sunfall/plan.h"

namespace sunfall {

// A map that left the leaves out would be too bright.
inline void refuse_leaves_not_mapped(const Plan& plan) {
  if (plan.canopy.empty() && plan.rows.empty()) return;
  throw Error(ErrorKind::plan, {"leaves are read, but this version cannot map their shade yet",
                                plan.canopy.empty() ? plan.rows.front().where : plan.canopy.front().where, "",
                                "Remove the table to run without, or use a later version"});
}

}  // namespace sunfall

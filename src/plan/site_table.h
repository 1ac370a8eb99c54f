#pragma once
// [site]: the ground, what stands on it, where light is wanted, and the clock.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

TableShape site_shape();
void read_site_table(TableReader& table, Plan& plan);

}  // namespace sunfall

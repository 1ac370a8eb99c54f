#pragma once
// [light]: where the light of the open field comes from. Exactly one source.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

TableShape light_shape();
void read_light_table(TableReader& table, Plan& plan);

}  // namespace sunfall

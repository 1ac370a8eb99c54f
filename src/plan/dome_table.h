#pragma once
// [dome]: how finely the sky is cut, and how its light is spread.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

TableShape dome_shape();
void read_dome_table(TableReader& table, Plan& plan);

}  // namespace sunfall

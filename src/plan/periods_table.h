#pragma once
// [periods]: the stretches of the year that get a map.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

TableShape periods_shape();
void read_periods_table(TableReader& table, Plan& plan);

}  // namespace sunfall

#pragma once
// [plots]: the polygons that get a row of their own in the tables.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

TableShape plots_shape();
void read_plots_table(TableReader& table, Plan& plan);

}  // namespace sunfall

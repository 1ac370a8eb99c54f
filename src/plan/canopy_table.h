#pragma once
// [[canopy]]: porous leaves as grids, numbers, or trees and hedges of a vector layer.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

TableShape canopy_shape();
// Once for each table of the array.
void read_canopy_table(TableReader& table, Plan& plan);

}  // namespace sunfall

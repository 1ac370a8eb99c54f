#pragma once
// [[rows]]: plots of parallel crop rows.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

TableShape rows_shape();
// Once for each table of the array.
void read_rows_table(TableReader& table, Plan& plan);

}  // namespace sunfall

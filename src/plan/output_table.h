#pragma once
// [output]: layers that are written on request.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

TableShape output_shape();
void read_output_table(TableReader& table, Plan& plan);

}  // namespace sunfall

#pragma once
// [plan]: what the plan is called.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

TableShape plan_shape();
void read_plan_table(TableReader& table, Plan& plan);

}  // namespace sunfall

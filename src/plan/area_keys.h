#pragma once
// Features of a vector layer, as inner tables of the plan name them: file, layer, where.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

// The three keys and `more` behind them.
std::vector<KeyNote> area_keys(const std::vector<KeyNote>& more = {});
AreaPlan read_area_keys(TableReader& table);

}  // namespace sunfall

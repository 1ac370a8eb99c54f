#pragma once
// [light.grid]: the light of a gridded weather file.

#include "plan/table_reader.h"
#include "sunfall/light.h"

namespace sunfall {

TableShape grid_shape();
GridSource read_grid_table(TableReader& table);

}  // namespace sunfall

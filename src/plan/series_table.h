#pragma once
// [light.series]: a station's or a quantum sensor's record.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/light.h"

namespace sunfall {

TableShape series_shape();
SeriesSource read_series_table(TableReader& table);

}  // namespace sunfall

#pragma once
// [light.sunshine] and [light.temperature]: daily records from which radiation is estimated.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/light.h"

namespace sunfall {

TableShape sunshine_shape();
SunshineSource read_sunshine_table(TableReader& table);

TableShape temperature_shape();
TemperatureSource read_temperature_table(TableReader& table);

}  // namespace sunfall

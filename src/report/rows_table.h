#pragma once
// What the plan's crop rows take, as a table.

#include <filesystem>

#include "sunfall/map.h"
#include "sunfall/plan.h"

namespace sunfall {

// A row per plot of rows and period: light at the tops of the rows, what their leaves take of it, by the side
// that it comes from.
void write_rows_csv(const std::filesystem::path& file, const Plan& plan, const MapResult& maps);

// "pears", or "rows 2" where the plan gives no name.
std::string rows_name(const Plan& plan, std::size_t number);

}  // namespace sunfall

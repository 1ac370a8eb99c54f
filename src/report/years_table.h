#pragma once
// The years of a series as a table, and percentiles over them as summaries tell them.

#include <filesystem>
#include <vector>

#include "map/years.h"
#include "report/tables.h"

namespace sunfall {

// A row per year and period, the year itself last. `shares` are those of a place (beam of every period,
// then sky), or empty for the open field.
void write_years_csv(const std::filesystem::path& file, const OpenField& open,
                     const std::vector<Period>& periods, const std::vector<double>& shares = {});

// "P10 over the years (mol m-2 d-1)" and so on; `fields` has the numbers of one row, or blanks.
std::vector<std::string> percentile_headings();
void add_percentiles(std::vector<std::string>& fields, const YearPercentiles& percentiles);

}  // namespace sunfall

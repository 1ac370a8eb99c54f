#pragma once
// A general reader to measure against: a CSV file by OGR.

#include <filesystem>

namespace sunfall {

struct TableSums {
  long rows = 0;
  long letters = 0;  // of the first column
  double sum = 0.0;  // of all others
};

// Reads every row with every field, the first as text, the others as numbers.
TableSums read_table_by_ogr(const std::filesystem::path& file);

}  // namespace sunfall

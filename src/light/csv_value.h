#pragma once
// Numbers in the fields of a record.

#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "light/csv_file.h"

namespace sunfall {

// What loggers and archives write for "none": nothing, NaN, -9999 and the like.
bool is_missing(std::string_view text);
bool is_missing(double value);

// The number that the whole of a text is, with the given decimal mark, a plus sign allowed; nothing where
// it is none.
std::optional<double> number_in(std::string_view text, char decimal);

// Why a text may not be a number, as advice.
const char* number_remedy(std::string_view text, char decimal);

// Throws Error(data) where the decimal mark also parts the columns.
void check_decimal(const CsvFile& csv, char decimal, const std::string& file);

// Units and the like may stand between names and values, on so many lines.
inline constexpr long kMostLinesBelowHeader = 4;
// Says how many lines below the header had no time stamp, and how many repeated the one before.
void note_lines_left_out(long below_header, long repeated, std::vector<std::string>& notes);

}  // namespace sunfall

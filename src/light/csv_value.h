#pragma once
// Numbers in the fields of a record.

#include <optional>
#include <string_view>

namespace sunfall {

// What loggers and archives write for "none": nothing, NaN, -9999 and the like.
bool is_missing(std::string_view text);
bool is_missing(double value);

// The number that the whole of a text is, with the given decimal mark, a plus sign allowed; nothing where
// it is none.
std::optional<double> number_in(std::string_view text, char decimal);

// Why a text may not be a number, as advice.
const char* number_remedy(std::string_view text, char decimal);

}  // namespace sunfall

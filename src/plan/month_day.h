#pragma once
// Days of any year, as a plan writes them.

#include <chrono>
#include <optional>
#include <string_view>

namespace sunfall {

// "MM-DD"; nothing for any other form and for days that no year has. 02-29 is a day.
std::optional<std::chrono::month_day> month_day_of(std::string_view text);

}  // namespace sunfall

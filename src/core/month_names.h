#pragma once
#include <array>
#include <cstddef>

namespace sunfall {

inline constexpr std::array<const char*, 12> kMonthNames = {"January",   "February", "March",    "April",
                                                            "May",       "June",     "July",     "August",
                                                            "September", "October",  "November", "December"};

// "January" for 0.
constexpr const char* month_name(std::size_t month) { return kMonthNames.at(month); }

}  // namespace sunfall

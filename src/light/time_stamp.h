#pragma once
// Time stamps by ISO 8601, as loggers write them.

#include <chrono>
#include <optional>
#include <string_view>

namespace sunfall {

struct TimeStamp {
  // The clock's reading as if it were UTC; with an offset, UTC itself.
  std::chrono::sys_seconds time{};
  bool has_offset = false;
};

// "2025-06-01T12:00", with " " for "T", with seconds (a fraction is cut off), with "Z" or "+02:00",
// "+0200", "+02"; without the "-" and ":" too. "24:00" is the next day's midnight. Nothing for any
// other form (other orders of day and month are ambiguous) and for days and times that no calendar has.
std::optional<TimeStamp> parse_time_stamp(std::string_view text);

// "2025-06-01" or "20250601", and the same with a midnight behind it, "2025-06-01T00:00:00", as programs
// write dates. Nothing for other times of the day and for stamps with an offset.
std::optional<std::chrono::sys_days> parse_date(std::string_view text);

}  // namespace sunfall

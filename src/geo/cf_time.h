#pragma once
// Time axes as the Climate and Forecast (CF) conventions write them, section 4.4: "hours since 1900-01-01".

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

namespace sunfall {

struct CfTime {
  std::int64_t epoch_s = 0;  // seconds of UTC since 1970
  double unit_s = 1.0;
};

// Units in seconds, minutes, hours or days (months and years have no fixed length); an epoch without a zone
// is UTC. Nothing for any other text, for days that no calendar has, and for epochs before 1583, whose day
// depends on the calendar.
std::optional<CfTime> parse_cf_time(std::string_view units);

// Whether the calendar is that of the world; an empty one is.
bool is_world_calendar(const std::string& calendar);

}  // namespace sunfall

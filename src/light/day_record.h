#pragma once
// A daily record as its file has it.

#include <chrono>
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "core/globe.h"
#include "light/open_series.h"
#include "sunfall/light.h"

namespace sunfall {

struct DayRecord {
  std::string file;
  std::vector<std::chrono::sys_days> date;  // increasing
  std::vector<std::int32_t> line;           // of the file
  std::vector<std::vector<double>> value;   // one a column, NaN where missing
  std::optional<LonLat> station;            // where the file says that it stands
  std::vector<std::string> notes;

  std::size_t size() const { return date.size(); }
  std::string where(std::size_t i) const;  // "station.csv:12", for messages
};

// Throws Error(data) for dates that cannot be read, come twice with other values, go backward or are not
// those of days in a row (with gaps), for a station far from `place`, and for values that are no numbers.
DayRecord read_days(const DaysFile& file, const std::vector<std::string>& columns, const Place& place);

// An empty series of all years that the record touches.
LightSeries open_years(const DayRecord& record, const LightRequest& request);
// The day of that series that a date is.
std::size_t day_of_series(const LightSeries& series, std::chrono::sys_days date);

}  // namespace sunfall

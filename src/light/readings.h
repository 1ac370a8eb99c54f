#pragma once
// A record as its file has it: what was read, when, and on which line.

#include <array>
#include <chrono>
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "core/globe.h"
#include "sunfall/light.h"
#include "sunfall/time.h"

namespace sunfall {

enum : std::size_t { kGlobal, kDiffuse, kBeam, kQuantities };

struct Readings {
  std::string file;
  std::chrono::seconds step{3600};
  std::vector<std::int64_t> begin_s;  // of each interval, seconds of UTC since 1970, increasing
  std::vector<std::int32_t> line;     // of the file; empty where it has no lines
  bool zone_known = false;            // the file itself says how its times stand to UTC
  // In the file's unit, NaN where missing; without elements where the file has no such column.
  std::array<std::vector<float>, kQuantities> value;
  std::optional<LonLat> station;  // where the file says that it stands
  std::vector<std::string> notes;

  std::size_t size() const { return begin_s.size(); }
  bool has(std::size_t quantity) const { return !value[quantity].empty(); }
};

// The name of a quantity's column, empty where it is not there; of all that are there, in order; and the
// table that they stand in.
template <typename Source>
const std::string& column_of(const Source& source, std::size_t quantity) {
  return quantity == kGlobal ? source.global : quantity == kDiffuse ? source.diffuse : source.beam;
}
std::vector<std::string> value_columns(const SeriesSource& source);
DaysFile table_of(const SeriesSource& source);

// "global, diffuse".
std::string quantities_text(const Readings& readings);

// Throws Error(data) for stamps that cannot be read, come twice with different values, go backward,
// follow daylight saving time or are not equally spaced, and for values that are no numbers.
Readings read_readings(const SeriesSource& source, const Clock& clock);

}  // namespace sunfall

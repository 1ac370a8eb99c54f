#pragma once
// Whether a record's clock agrees with the sun: on clear days as much light comes before noon as after.

#include <array>
#include <optional>
#include <string>
#include <vector>

#include "light/interval_sun.h"
#include "light/readings.h"

namespace sunfall {

// Minutes by which the light of a month's clear days comes later than the sun; none for a month with too
// few of them. January to December, of all years together.
using ClockShifts = std::array<std::optional<double>, 12>;
ClockShifts clock_shifts_min(const Readings& readings, const std::vector<IntervalSun>& suns,
                             const LightSeries& series);

// Throws Error(data) for a clock that is wrong by 40 minutes or more, all year or as daylight saving time
// makes it; otherwise a note, or nothing.
std::string check_clock(const ClockShifts& shifts_min, const Readings& readings, const SeriesSource& source,
                        std::chrono::seconds utc_offset);

}  // namespace sunfall

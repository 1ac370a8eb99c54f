#pragma once
// Whether a record's values can be of the unit that the plan gives them.

#include <string>
#include <vector>

#include "light/interval_sun.h"
#include "light/readings.h"

namespace sunfall {

// Throws Error(data) where the values as a whole, or those of some months, do not fit the unit, naming the
// one that they fit. A note where they are oddly low; else nothing.
std::string check_unit(const Readings& readings, const std::vector<IntervalSun>& suns,
                       SeriesSource::Unit unit);

}  // namespace sunfall

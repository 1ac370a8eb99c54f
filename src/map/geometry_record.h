#pragma once
// All that a run's shares hang on besides its light, in words: kept in its summary, and compared when the
// shares are to be used again.

#include <string>
#include <utility>
#include <vector>

#include "sunfall/plan.h"

namespace sunfall {

// Key of the plan and value; for a file its SHA-256. Whatever comes to take light away adds its line here.
using GeometryRecord = std::vector<std::pair<std::string, std::string>>;

// Reads the files through. Throws Error(io).
GeometryRecord geometry_of(const Plan& plan);

// "04-15"
std::string day_key(std::chrono::month_day day);

}  // namespace sunfall

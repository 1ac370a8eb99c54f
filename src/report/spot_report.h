#pragma once
// One place on paper: sun path with its horizon, months, a day's curve.

#include <filesystem>
#include <string>
#include <vector>

#include "map/site.h"
#include "map/spot.h"
#include "sunfall/plan.h"

namespace sunfall {

// Writes sun-path.png, sun-path.svg, months.csv, day-<day>.csv and, of several years, years.csv into
// `folder`.
void write_spot(const Plan& plan, const Site& site, const Spot& spot, const std::vector<SpotStep>& steps,
                const std::string& day, const std::filesystem::path& folder);

}  // namespace sunfall

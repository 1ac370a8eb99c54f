#pragma once
// What accompanies the layers of a run: tables, pictures, style, and the summary that says a run is
// whole.

#include <filesystem>
#include <string>
#include <vector>

#include "geo/plots.h"
#include "map/site.h"
#include "sunfall/map.h"
#include "sunfall/plan.h"
#include "sunfall/progress.h"

namespace sunfall {

// Reads the plan's plots, if it has any. Throws Error(data).
std::vector<Plot> plots_of(const Plan& plan, const GridFrame& frame);

// Reads the finished layers in `folder` and writes the rest of the run beside them, the summary
// last. `options` are those of the maps. Throws Error.
void write_run(const Plan& plan, const Site& site, const MapResult& maps, const std::vector<Plot>& plots,
               const std::filesystem::path& folder, const MapOptions& options, Progress& progress);

}  // namespace sunfall

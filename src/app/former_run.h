#pragma once
// What an earlier run left in its folder, and what a run must not touch there.

#include <filesystem>
#include <string>
#include <vector>

#include "sunfall/plan.h"

namespace sunfall {

// Names of the files that the finished run in `folder` made, as its summary tells; nothing where there
// is no such run. A layer that the next run does not make would otherwise stand beside it as if it
// belonged to it.
std::vector<std::string> files_of_former_run(const std::filesystem::path& folder);

// A run that wrote into the folder of its own inputs could replace them: a plan's plots.gpkg has the
// name of a result. Throws Error(plan).
void require_apart_from_inputs(const Plan& plan, const std::filesystem::path& folder);

}  // namespace sunfall

#pragma once
// Paths of input files, as a plan writes them.

#include <filesystem>
#include <string>

#include "plan/plan_file.h"

namespace sunfall {

// `written` resolved against the plan's folder. Throws Error(plan) for what is no path to a file on
// disk (a URL, a /vsi path of GDAL, control characters), Error(data) where no such file exists.
// `where` begins the message.
std::filesystem::path input_path(const PlanFile& file, const std::string& written, const std::string& where);

// A sentence for a file that does not exist: the folder that is missing, or the most similar name
// in it, or that none is similar.
std::string similar_file_hint(const std::filesystem::path& missing);

}  // namespace sunfall

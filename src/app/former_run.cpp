#include "app/former_run.h"

#include <fstream>
#include <nlohmann/json.hpp>

#include "map/casters.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;

// Not every run makes these, and the summary does not list them.
constexpr const char* kCompanions[] = {"plots.csv", "plots.gpkg", "years.csv", "rows.csv", "page.html"};

// A summary may come from anywhere: only plain names of rasters are taken from it.
bool is_layer_name(const std::string& name) {
  return !name.empty() && name.front() != '.' && name.find('/') == std::string::npos &&
         name.find('\0') == std::string::npos && fs::path(name).extension() == ".tif";
}

}  // namespace

std::vector<std::string> files_of_former_run(const fs::path& folder) {
  std::ifstream in(folder / "summary.json");
  const nlohmann::json summary = nlohmann::json::parse(in, nullptr, false);
  if (!summary.is_object() || !summary.contains("layers") || !summary["layers"].is_array()) return {};
  std::vector<std::string> names(std::begin(kCompanions), std::end(kCompanions));
  for (const nlohmann::json& layer : summary["layers"]) {
    if (!layer.is_object() || !layer.contains("file") || !layer["file"].is_string()) continue;
    const auto name = layer["file"].get<std::string>();
    if (is_layer_name(name)) names.push_back(name);
  }
  return names;
}

void require_apart_from_inputs(const Plan& plan, const fs::path& folder) {
  std::vector<fs::path> inputs{plan.site.ground};
  for (const auto& input : {plan.site.surface, plan.site.far_ground}) {
    if (input) inputs.push_back(*input);
  }
  for (const fs::path& file : files_of(plan.light)) inputs.push_back(file);
  if (plan.plots) inputs.push_back(plan.plots->file);
  for (const fs::path& file : files_of_casters(plan)) inputs.push_back(file);
  std::error_code ignored;
  const fs::path there = fs::weakly_canonical(folder, ignored);
  for (const fs::path& input : inputs) {
    const fs::path folder_named = fs::weakly_canonical(fs::absolute(input), ignored).parent_path();
    const fs::path folder_written = fs::weakly_canonical(fs::absolute(input).parent_path(), ignored);
    if (folder_named != there && folder_written != there) continue;
    throw Error(ErrorKind::plan,
                {"the run's folder holds an input of the plan, which a result could replace", folder.string(),
                 input.filename().string(), "Give the run a folder of its own with -o"});
  }
}

}  // namespace sunfall

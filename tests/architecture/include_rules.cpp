#include "architecture/include_rules.h"

#include <algorithm>
#include <regex>

namespace sunfall::architecture {
namespace {

const FolderRule* find_rule(const std::string& folder) {
  const std::vector<FolderRule>& rules = folder_rules();
  const auto found =
      std::find_if(rules.begin(), rules.end(), [&](const FolderRule& rule) { return rule.folder == folder; });
  return found == rules.end() ? nullptr : &*found;
}

bool is_geo_library(const std::string& target) {
  static const std::regex pattern("(gdal/)?(gdal|ogr|cpl|proj)[_a-z0-9]*\\.h(pp)?");
  return std::regex_match(target, pattern);
}
bool is_embree(const std::string& target) { return target.rfind("embree", 0) == 0; }

// The folder of ours that `target` belongs to; nothing for libraries and for files named without
// a folder.
std::optional<std::string> owner_of(const std::string& target) {
  const std::size_t slash = target.find('/');
  if (slash == std::string::npos) return std::nullopt;
  const std::string first = target.substr(0, slash);
  if (first == "sunfall") return owner_of_public_header(target.substr(slash + 1));
  if (find_rule(first)) return first;
  return std::nullopt;
}

}  // namespace

const std::vector<FolderRule>& folder_rules() {
  // sun's Place stands in geo's contract; the plan is written in the terms of light and dome; the map
  // is the main job, which starts from a plan and brings its light; a report names what the plan chose.
  static const std::vector<FolderRule> rules = {
      {"core", {}},
      {"sun", {}},
      {"geo", {"sun"}},
      {"light", {"sun"}},
      {"dome", {"sun", "light"}},
      {"plan", {"sun", "geo", "light", "dome"}},
      {"shade", {"geo", "dome"}},
      {"map", {"sun", "geo", "light", "dome", "plan", "shade"}},
      {"advise", {"light", "plan", "map"}},
      {"report", {"sun", "geo", "light", "dome", "plan", "map", "advise"}},
      {"app", {"sun", "geo", "light", "dome", "plan", "shade", "map", "advise", "report"}},
  };
  return rules;
}

std::string owner_of_public_header(const std::string& file_name) {
  const std::string stem = file_name.substr(0, file_name.find('.'));
  if (stem == "rows") return "shade";
  return find_rule(stem) ? stem : "core";
}

std::optional<std::string> included_file(const std::string& line) {
  static const std::regex pattern("^\\s*#\\s*include\\s*[<\"]([^>\"]+)[>\"].*");
  std::smatch match;
  if (!std::regex_match(line, match, pattern)) return std::nullopt;
  return match[1].str();
}

std::optional<std::string> include_fault(const std::string& folder, const std::string& target) {
  if (is_geo_library(target) && folder != "geo") return "only src/geo sees GDAL, OGR and PROJ";
  if (is_embree(target) && folder != "shade") return "only src/shade sees Embree";
  const std::optional<std::string> owner = owner_of(target);
  if (!owner || *owner == folder || *owner == "core") return std::nullopt;
  const FolderRule* rule = find_rule(folder);
  if (!rule) return "the folder has no row in folder_rules()";
  if (rule->may_use.count(*owner)) return std::nullopt;
  return folder + " may not use " + *owner;
}

std::optional<std::string> test_include_fault(const std::string& folder, const std::string& target) {
  if (is_geo_library(target) && folder != "geo") return "only src/geo and tests/geo see GDAL, OGR and PROJ";
  return std::nullopt;
}

}  // namespace sunfall::architecture

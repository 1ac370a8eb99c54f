#include "plan/area_keys.h"

namespace sunfall {
namespace {

const PathKey kFile{"file", ""};
const TextKey kLayer{"layer", std::nullopt, "the file's only layer"};
const TextKey kWhere{"where", std::nullopt, "all features of the layer"};

}  // namespace

std::vector<KeyNote> area_keys(const std::vector<KeyNote>& more) {
  std::vector<KeyNote> keys = {kFile, kLayer, kWhere};
  keys.insert(keys.end(), more.begin(), more.end());
  return keys;
}

AreaPlan read_area_keys(TableReader& table) {
  AreaPlan area;
  area.file = table.path(kFile);
  area.layer = table.optional_text(kLayer).value_or("");
  area.where = table.optional_text(kWhere).value_or("");
  return area;
}

}  // namespace sunfall

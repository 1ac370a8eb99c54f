#pragma once
// Leaves of a vector layer: points are trees with ellipsoids for crowns, polygons hedges and belts.

#include <filesystem>
#include <memory>
#include <optional>
#include <string>
#include <vector>

#include "geo/canopy_source.h"

namespace sunfall {

// The same for all features, or the field that has each one's.
struct FeatureValue {
  double number = 0.0;
  std::string field;  // empty: the number
};

struct TreesRequest {
  std::filesystem::path file;
  std::string layer;   // empty: the file's only layer
  std::string filter;  // in the words of SQL's WHERE; empty: all features
  FeatureValue height_m;
  FeatureValue crown_base_m;
  std::optional<FeatureValue> crown_width_m;  // of points
  FeatureValue leaf_density;                  // m2 m-3
  std::string species;                        // field of labels; empty: none
};

// Reads all features and adds to `notes` what they are. Throws Error(data): a missing layer or field (names
// those that exist), a filter that cannot be read or selects nothing, a geometry that is neither point nor
// polygon, an invalid polygon, a value that is missing or cannot be (names the feature), nothing on the
// frame.
std::unique_ptr<CanopySource> read_tree_canopy(const TreesRequest& request, const GridFrame& frame,
                                               std::vector<std::string>& notes);

}  // namespace sunfall

#include "map/open_canopy.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <optional>

#include "geo/grid_canopy.h"
#include "geo/tree_canopy.h"
#include "shade/leaf_angles.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr double kDensest = 20.0;  // m2 m-3, as leaf_density itself

FeatureValue value_of(const NumberOrField& value) { return {value.number, value.field}; }
GridValue value_of(const NumberOrFile& value) { return {value.number, value.file}; }

// Nothing where the plan gives the density itself.
std::optional<double> density_by_porosity(const CanopyPlan& canopy, std::vector<std::string>& notes) {
  if (!canopy.windbreak) return std::nullopt;
  const WindbreakPlan& windbreak = *canopy.windbreak;
  const double density = windbreak_leaf_density(windbreak, canopy.leaf_angle, canopy.clumping);
  if (density > kDensest) {
    throw Error(ErrorKind::plan,
                {"no leaves stand so densely", windbreak.where,
                 fmt::format("porosity {:g} over {:g} m makes {:.1f} m2 m-3, more than {:g}",
                             windbreak.optical_porosity, windbreak.width_m, density, kDensest),
                 "Check width, the way through the leaves in metres, and leaf_angle and clumping"});
  }
  notes.push_back(fmt::format("{}: an optical porosity of {:g} over {:g} m makes {:.3g} m2 of leaf per m3.",
                              windbreak.where, windbreak.optical_porosity, windbreak.width_m, density));
  return density;
}

}  // namespace

double windbreak_leaf_density(const WindbreakPlan& windbreak, double leaf_angle, double clumping) {
  const double shadow = LeafAngles(leaf_angle).projection(0.0);
  return std::max(0.0, -std::log(windbreak.optical_porosity)) / (shadow * clumping * windbreak.width_m);
}

std::unique_ptr<CanopySource> open_canopy(const CanopyPlan& canopy, const RasterSource& ground,
                                          std::vector<std::string>& notes) {
  const std::optional<double> density = density_by_porosity(canopy, notes);
  if (!canopy.trees) {
    return open_grid_canopy(
        {value_of(canopy.top_m), value_of(canopy.base_m),
         density ? GridValue{*density, {}} : value_of(canopy.leaf_density.value()), canopy.where},
        ground, notes);
  }
  const TreesPlan& trees = *canopy.trees;
  TreesRequest request{trees.layer.file,
                       trees.layer.layer,
                       trees.layer.where,
                       value_of(trees.height_m),
                       value_of(trees.crown_base_m),
                       {},
                       density ? FeatureValue{*density, ""} : value_of(trees.leaf_density.value()),
                       trees.species};
  if (trees.crown_width_m) request.crown_width_m = value_of(*trees.crown_width_m);
  return read_tree_canopy(request, ground.frame(), notes);
}

}  // namespace sunfall

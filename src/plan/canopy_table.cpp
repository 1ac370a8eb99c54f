#include "plan/canopy_table.h"

#include <fmt/format.h>

#include "plan/area_keys.h"
#include "plan/leaf_keys.h"
#include "plan/words.h"

namespace sunfall {
namespace {

using Text = NumberOrTextKey::Text;

// The tallest trees on Earth reach 116 m.
const Bounds kHeights{0.0, 120.0, "m", "Heights count from the ground, not from the sea"};

const TextKey kName{"name", std::nullopt, "none (messages count the canopies)"};
const NumberOrTextKey kTop{"top", Text::path, kHeights, std::nullopt, "none (trees must be given)"};
const NumberOrTextKey kBase{"base", Text::path, kHeights, 0.0, ""};
const NumberOrTextKey kLeafDensity{"leaf_density", Text::path, leaf_density_bounds(), std::nullopt,
                                   "none (optical_porosity and width must be given)"};
const TableKey kTrees{"trees", "none (top must be given)"};
const NumberKey kPorosity{
    "optical_porosity", {0.01, 1.0, "", "What lets nothing through is solid and belongs into site.surface"}};
const NumberKey kWidth{"width",
                       {0.1, 200.0, "m", "From one side of the leaves to the other, straight through"}};

const NumberOrTextKey kTreeHeight{"height", Text::field, kHeights, std::nullopt, ""};
const NumberOrTextKey kCrownBase{"crown_base", Text::field, kHeights, 0.0, ""};
const NumberOrTextKey kCrownWidth{
    "crown_width", Text::field, {0.1, 60.0, "m", ""}, std::nullopt, "none (points need it)"};
const NumberOrTextKey kTreeDensity{"leaf_density", Text::field, leaf_density_bounds(), std::nullopt,
                                   "none (optical_porosity and width must be given)"};
const TextKey kSpecies{"species", std::nullopt, "none (no species is named)"};

const char* const kDensityRemedy =
    "Give leaf_density, or optical_porosity and width of a windbreak, from which it is reckoned";

// Porosity stands in the notes without a default: it is asked for only where leaf_density is missing.
KeyNote without_default(const NumberKey& key) {
  KeyNote note = key;
  note.fallback = "none (leaf_density must be given)";
  return note;
}

TableShape trees_shape() {
  return {"canopy.trees", area_keys({kTreeHeight, kCrownBase, kCrownWidth, kTreeDensity, kSpecies})};
}

bool is_number(const NumberOrFile& value) { return !value.file; }
bool is_number(const NumberOrField& value) { return value.field.empty(); }

// What two numbers must be to each other; what rasters and fields hold is looked at where they are read.
template <typename Value>
void require_base_below_top(TableReader& table, const std::string& base_key, const Value& base,
                            const Value& top) {
  if (!is_number(base) || !is_number(top) || base.number < top.number) return;
  table.refuse(base_key, "the leaves begin at or above the height where they end",
               fmt::format("base {:g} m, top {:g} m", base.number, top.number), "Both count from the ground");
}

std::optional<WindbreakPlan> read_windbreak(TableReader& table) {
  const std::optional<double> porosity = table.number_if_given(kPorosity);
  const std::optional<double> width = table.number_if_given(kWidth);
  if (porosity.has_value() != width.has_value()) {
    const NumberKey& missing = porosity ? kWidth : kPorosity;
    const NumberKey& given = porosity ? kPorosity : kWidth;
    table.refuse(
        given.name, "goes together with " + missing.name + ", which is missing", "",
        "A windbreak is given by both: what is seen straight through, and how wide its leaves stand");
  }
  if (!porosity) return std::nullopt;
  return WindbreakPlan{*porosity, *width, table.where(kPorosity.name)};
}

TreesPlan read_trees(TableReader& trees) {
  TreesPlan plan;
  plan.layer = read_area_keys(trees);
  const auto height = trees.number_or_field(kTreeHeight);
  if (!height) {
    trees.refuse(kTreeHeight.name, "missing; the plan must give it", "",
                 "Give a number in metres, or the name of the layer's field, in quotes");
  }
  plan.height_m = *height;
  plan.crown_base_m = trees.number_or_field(kCrownBase).value();
  plan.crown_width_m = trees.number_or_field(kCrownWidth);
  plan.leaf_density = trees.number_or_field(kTreeDensity);
  plan.species = trees.optional_text(kSpecies).value_or("");
  require_base_below_top(trees, kCrownBase.name, plan.crown_base_m, plan.height_m);
  trees.finish();
  return plan;
}

// Either a density or a windbreak. `key` is where a density would stand.
void require_one_density(TableReader& table, const std::string& key, bool density, bool windbreak) {
  if (density && windbreak) {
    table.refuse(kPorosity.name, "leaf density is given twice, by leaf_density and by optical_porosity", "",
                 kDensityRemedy);
  }
  if (!density && !windbreak) table.refuse(key, "no leaf density is given", "", kDensityRemedy);
}

void read_grids(TableReader& table, CanopyPlan& canopy) {
  const auto top = table.number_or_file(kTop);
  if (!top) {
    table.refuse(kTop.name, "neither top nor trees is given", "",
                 "Give top, a number or a raster, or trees = { file = \"trees.gpkg\", … }");
  }
  canopy.top_m = *top;
  canopy.base_m = table.number_or_file(kBase).value();
  canopy.leaf_density = table.number_or_file(kLeafDensity);
  require_base_below_top(table, kBase.name, canopy.base_m, canopy.top_m);
  require_one_density(table, kLeafDensity.name, canopy.leaf_density.has_value(),
                      canopy.windbreak.has_value());
}

void refuse_grids(TableReader& table) {
  for (const auto& [key, home] :
       {std::pair(kTop.name, "trees.height"), std::pair(kBase.name, "trees.crown_base"),
        std::pair(kLeafDensity.name, "trees.leaf_density")}) {
    if (table.has(key))
      table.refuse(key, "is for rasters and numbers, and trees are given", "",
                   std::string("Write it as ") + home);
  }
}

}  // namespace

TableShape canopy_shape() {
  TableShape shape{"canopy", with_leaf_keys({kName, kTop, kBase, kLeafDensity, kTrees,
                                             without_default(kPorosity), without_default(kWidth)})};
  shape.inner = {trees_shape()};
  return shape;
}

void read_canopy_table(TableReader& table, Plan& plan) {
  CanopyPlan canopy;
  canopy.where = table.where("");
  canopy.name = table.optional_text(kName).value_or("");
  canopy.windbreak = read_windbreak(table);
  if (std::optional<TableReader> trees = table.table_if_given(kTrees, trees_shape())) {
    refuse_grids(table);
    canopy.trees = read_trees(*trees);
    require_one_density(table, kTrees.name, canopy.trees->leaf_density.has_value(),
                        canopy.windbreak.has_value());
  } else {
    read_grids(table, canopy);
  }
  const LeafKeys leaves = read_leaf_keys(table);
  canopy.leaf_angle = leaves.leaf_angle;
  canopy.clumping = leaves.clumping;
  canopy.absorptance = leaves.absorptance;
  canopy.leafing = leaves.leafing;
  plan.canopy.push_back(std::move(canopy));
}

}  // namespace sunfall

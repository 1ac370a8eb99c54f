#include "plan/rows_table.h"

#include "plan/area_keys.h"
#include "plan/leaf_keys.h"

namespace sunfall {
namespace {

// Bounds are those of CropRows; what two numbers must be to each other is fault_of()'s to say.
const TextKey kName{"name", std::nullopt, "none (messages count the rows)"};
const TableKey kArea{"area", ""};
const NumberKey kAzimuth{"azimuth", {0.0, 360.0, "°", "Degrees clockwise from true north"}, 0.0, true};
const NumberKey kSpacing{"spacing", {0.1, 100.0, "m", ""}, 0.0, true};
const NumberKey kHeight{"height", {0.05, 50.0, "m", ""}, 0.0, true};
const NumberKey kWidth{"width", {0.05, 100.0, "m", ""}, 0.0, true};
const NumberKey kBase{"base", {0.0, 50.0, "m", ""}, 0.0};
const ChoiceKey<RowSection> kSection{
    "section",
    {{"box", RowSection::box}, {"ellipse", RowSection::ellipse}, {"wedge", RowSection::wedge}},
    RowSection::box};
const NumberKey kLeafDensity{"leaf_density", leaf_density_bounds(), 0.0, true};

TableShape area_shape() { return {"rows.area", area_keys()}; }

}  // namespace

TableShape rows_shape() {
  TableShape shape{"rows", with_leaf_keys({kName, kArea, kAzimuth, kSpacing, kHeight, kWidth, kBase, kSection,
                                           kLeafDensity})};
  shape.inner = {area_shape()};
  return shape;
}

void read_rows_table(TableReader& table, Plan& plan) {
  if (!table.given()) return;
  RowsPlan rows;
  rows.where = table.where("area");
  rows.name = table.optional_text(kName).value_or("");
  std::optional<TableReader> area = table.table_if_given(kArea, area_shape());
  if (!area) table.refuse("area", "required key missing", "", "Give area = { file = \"plots.gpkg\", … }");
  rows.area = read_area_keys(*area);
  area->finish();
  rows.azimuth = {Angle::degrees(table.number(kAzimuth))};
  rows.rows.spacing_m = table.number(kSpacing);
  rows.rows.height_m = table.number(kHeight);
  rows.rows.width_m = table.number(kWidth);
  rows.rows.base_m = table.number(kBase);
  rows.rows.section = table.choice(kSection);
  rows.rows.leaf_density = table.number(kLeafDensity);
  const LeafKeys leaves = read_leaf_keys(table);
  rows.rows.leaf_angle = leaves.leaf_angle;
  rows.rows.clumping = leaves.clumping;
  rows.rows.absorptance = leaves.absorptance;
  rows.leafing = leaves.leafing;
  if (const auto fault = fault_of(rows.rows)) {
    table.refuse(fault->key, fault->what, fault->found, fault->remedy);
  }
  plan.rows.push_back(rows);
}

}  // namespace sunfall

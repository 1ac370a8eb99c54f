#include "plan/rows_table.h"

#include "plan/words.h"

namespace sunfall {
namespace {

// Bounds are those of CropRows; what two numbers must be to each other is fault_of()'s to say.
const TextKey kName{"name", std::nullopt, "none (messages count the rows)"};
const TableKey kArea{"area", ""};
const PathKey kFile{"file", ""};
const TextKey kLayer{"layer", std::nullopt, "the file's only layer"};
const TextKey kWhere{"where", std::nullopt, "all polygons of the layer"};
const NumberKey kAzimuth{"azimuth", {0.0, 360.0, "°", "Degrees clockwise from true north"}, 0.0, true};
const NumberKey kSpacing{"spacing", {0.1, 100.0, "m", ""}, 0.0, true};
const NumberKey kHeight{"height", {0.05, 50.0, "m", ""}, 0.0, true};
const NumberKey kWidth{"width", {0.05, 100.0, "m", ""}, 0.0, true};
const NumberKey kBase{"base", {0.0, 50.0, "m", ""}, 0.0};
const ChoiceKey<RowSection> kSection{
    "section",
    {{"box", RowSection::box}, {"ellipse", RowSection::ellipse}, {"wedge", RowSection::wedge}},
    RowSection::box};
const NumberKey kLeafDensity{"leaf_density",
                             {0.0, 20.0, "m2 m-3", "One side of the leaves in a cubic metre of the section"},
                             0.0,
                             true};
const NumberKey kLeafAngle{"leaf_angle", {0.1, 10.0, "", ""}, 1.0};
const NumberKey kClumping{"clumping", {0.05, 1.0, "", ""}, 1.0};
const NumberKey kAbsorptance{"absorptance", {0.05, 1.0, "", ""}, 0.85};
const MonthsKey kLeafing{"leafing", {0.0, 1.0, "", "Share of the full leaf, by month"}, false, "1 all year"};

TableShape area_shape() { return {"rows.area", {kFile, kLayer, kWhere}}; }

}  // namespace

TableShape rows_shape() {
  TableShape shape{"rows",
                   {kName, kArea, kAzimuth, kSpacing, kHeight, kWidth, kBase, kSection, kLeafDensity,
                    kLeafAngle, kClumping, kAbsorptance, kLeafing}};
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
  rows.area.file = area->path(kFile);
  rows.area.layer = area->optional_text(kLayer).value_or("");
  rows.area.where = area->optional_text(kWhere).value_or("");
  area->finish();
  rows.azimuth = {Angle::degrees(table.number(kAzimuth))};
  rows.rows.spacing_m = table.number(kSpacing);
  rows.rows.height_m = table.number(kHeight);
  rows.rows.width_m = table.number(kWidth);
  rows.rows.base_m = table.number(kBase);
  rows.rows.section = table.choice(kSection);
  rows.rows.leaf_density = table.number(kLeafDensity);
  rows.rows.leaf_angle = table.number(kLeafAngle);
  rows.rows.clumping = table.number(kClumping);
  rows.rows.absorptance = table.number(kAbsorptance);
  if (const auto months = table.months_if_given(kLeafing)) rows.leafing = *months;
  if (const auto fault = fault_of(rows.rows)) {
    table.refuse(fault->key, fault->what, fault->found, fault->remedy);
  }
  plan.rows.push_back(rows);
}

}  // namespace sunfall

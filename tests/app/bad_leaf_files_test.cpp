// Files of leaves that cannot be used, met through the program.

#include <gmock/gmock.h>

#include <fmt/format.h>

#include "app/small_farm.h"
#include "geo/vector_file.h"

namespace sunfall::test {
namespace {

// The farm's corner lies at 690000, 5759000; its map is 128 m wide.
std::string at(double east, double south) {
  return fmt::format("POINT({} {})", 690000 + east, 5759000 - south);
}

std::string box(double west, double north, double east, double south) {
  return fmt::format("POLYGON(({0} {1},{2} {1},{2} {3},{0} {3},{0} {1}))", 690000 + west, 5759000 - south,
                     690000 + east, 5759000 - north);
}

const std::string kTrees =
    "[[canopy]]\ntrees = { file = 'trees.gpkg', height = 'height', crown_base = 1, crown_width = 4, "
    "leaf_density = 0.9 }\n";

void expect_trees_refused(const std::vector<TestFeature>& features, const std::vector<std::string>& parts,
                          const std::string& table = kTrees) {
  const SmallFarm farm;
  make_things(farm / "trees.gpkg", features, "EPSG:25831");
  farm.write_plan("", table);
  expect_all_refuse(farm, 3, parts);
}

void expect_plot_refused(const std::vector<TestFeature>& features, const std::string& filter,
                         const std::vector<std::string>& parts) {
  const SmallFarm farm;
  make_things(farm / "beds.gpkg", features, "EPSG:25831");
  farm.write_plan(
      "", fmt::format("[[rows]]\narea = {{ file = 'beds.gpkg', where = \"{}\" }}\nazimuth = 12\nspacing = 3\n"
                      "height = 2\nwidth = 1\nleaf_density = 1.6\n",
                      filter));
  expect_all_refuse(farm, 3, parts);
}

TEST(BadLeafFiles, NoHeightField) {
  std::string table = kTrees;
  table.replace(table.find("'height'"), 8, "'heigth'");
  expect_trees_refused({{at(20, 20), {{"height", 8.0}}, ""}},
                       {"trees.gpkg layer 'things': there is no field 'heigth'",
                        "height, base, width, lad, kind", "canopy.trees.height; did you mean 'height'?"},
                       table);
}

TEST(BadLeafFiles, ATreeWithoutAHeight) {
  expect_trees_refused({{at(20, 20), {{"height", 8.0}}, ""}, {at(30, 20), {}, ""}},
                       {"feature 2: a tree has no height", "field 'height' is empty", "height IS NOT NULL"});
  expect_trees_refused(
      {{at(20, 20), {{"height", 0.5}}, ""}},
      {"feature 1: the leaves of a tree begin at or above its height", "crown base 1 m, height 0.5 m"});
}

TEST(BadLeafFiles, ALineIsNoHedge) {
  expect_trees_refused({{"LINESTRING(690010 5758990,690060 5758990)", {{"height", 8.0}}, ""}},
                       {"feature 1: neither a point nor a polygon", "LINESTRING", "as wide as their leaves"});
}

TEST(BadLeafFiles, AllTreesOffTheMap) {
  expect_trees_refused({{at(-200, 20), {{"height", 8.0}}, ""}},
                       {"all trees and hedges lie off the map", "coordinate reference system"});
}

TEST(BadLeafFiles, RastersOfLeaves) {
  const SmallFarm farm;
  RasterOrder tops = farm_ground();
  tops.values.assign(tops.values.size(), 4.0);
  RasterOrder bases = tops;
  bases.values[65] = 4.5;
  make_raster(farm / "base.tif", bases);
  make_raster(farm / "top.tif", tops);
  farm.write_plan("", "[[canopy]]\ntop = 'top.tif'\nbase = 'base.tif'\nleaf_density = 1\n");
  expect_all_refuse(farm, 3,
                    {"base.tif (canopy.base), column 1, row 1", "the base of the leaves lies above their top",
                     "base 4.5 m, top 4 m"});
  tops.transform[0] += 1.0;
  make_raster(farm / "shifted.tif", tops);
  farm.write_plan("", "[[canopy]]\ntop = 'shifted.tif'\nleaf_density = 1\n");
  expect_all_refuse(
      farm, 3, {"shifted.tif (canopy.top): the raster is not on the grid of ground", "Align it: gdalwarp"});
  bases.values.assign(bases.values.size(), 1.0);
  bases.values[0] = 30.0;
  make_raster(farm / "dense.tif", bases);
  farm.write_plan("", "[[canopy]]\ntop = 4\nleaf_density = 'dense.tif'\n");
  expect_all_refuse(
      farm, 3, {"dense.tif (canopy.leaf_density), column 0, row 0", "a leaf density cannot be", "30 m2 m-3"});
}

TEST(BadLeafFiles, AWindbreakTooDense) {
  const SmallFarm farm;
  farm.write_plan("", "[[canopy]]\ntop = 4\noptical_porosity = 0.02\nwidth = 0.3\n");
  expect_all_refuse(farm, 2,
                    {"farm.toml:8 canopy.optical_porosity: no leaves stand so densely", "26.1 m2 m-3"});
}

TEST(BadLeafFiles, PlotsOfRows) {
  const std::vector<TestFeature> beds = {{box(20, 20, 60, 60), {}, "pears"},
                                         {box(80, 20, 81, 22), {}, "tiny"},
                                         {box(100, 20, 140, 60), {}, "edge"},
                                         {at(20, 20), {}, "dot"}};
  expect_plot_refused(beds, "kind = 'plums'",
                      {"the filter selects nothing", "none of 4 features", "rows.area.where"});
  expect_plot_refused(beds, "sort = 'pears'", {"the filter cannot be read", "the fields are height, base"});
  expect_plot_refused(beds, "kind = 'tiny'",
                      {"the plot is smaller than a cell of the map", "2.00 m2, a cell has 4.00 m2"});
  expect_plot_refused(beds, "kind = 'edge'", {"feature 3: a plot lies partly off the map", "70.0 % of it"});
  expect_plot_refused(beds, "kind = 'dot'", {"feature 4: a plot is not a polygon", "Draw plots as polygons"});
}

// Holes and parts are no faults.
TEST(BadLeafFiles, WhatIsNoFault) {
  const SmallFarm farm;
  make_things(farm / "beds.gpkg",
              {{"MULTIPOLYGON(((690020 5758980,690020 5758940,690060 5758940,690060 5758980,690020 5758980),"
                "(690030 5758970,690050 5758970,690050 5758950,690030 5758950,690030 5758970)),"
                "((690080 5758980,690080 5758960,690090 5758960,690080 5758980)))",
                {},
                ""}},
              "EPSG:25831");
  farm.write_plan(
      "",
      "[[rows]]\narea = { file = 'beds.gpkg' }\nazimuth = 12\nspacing = 3\nheight = 2\nwidth = 1\n"
      "leaf_density = 1.6\n");
  const Outcome outcome = farm.run({"vet", "farm.toml", "--dome", "draft"});
  EXPECT_EQ(outcome.status, 0) << outcome.err;
}

}  // namespace
}  // namespace sunfall::test

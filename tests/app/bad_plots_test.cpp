// Plots that cannot be used. spot does not read them.

#include <gmock/gmock.h>

#include <fmt/format.h>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

void expect_plots_refused(const SmallFarm& farm, const std::vector<std::string>& parts) {
  farm.write_plan("", kPlotsTable);
  const std::vector<std::string> before = farm.names();
  for (const char* command : {"vet", "map"}) {
    SCOPED_TRACE(command);
    expect_refused(farm.run({command, "farm.toml", "--dome", "draft"}), 3, parts);
    EXPECT_EQ(farm.names(), before);
  }
}

std::string polygon(const std::string& id, const std::string& corners) {
  return fmt::format(R"({{"type":"Feature","properties":{{"id":"{}"}},)"
                     R"("geometry":{{"type":"Polygon","coordinates":[[{}]]}}}})",
                     id, corners);
}

TEST(BadPlots, FileIsMissing) {
  const SmallFarm farm;
  expect_plots_refused(farm,
                       {"farm.toml:7 plots.file: the file does not exist", "plots.geojson", "similar name"});
}

TEST(BadPlots, FileIsNoVectorFile) {
  const SmallFarm farm;
  write_text(farm / "plots.geojson", "no polygons here\n");
  expect_plots_refused(farm,
                       {"plots.geojson: this is not a vector file that can be read", "Give a GeoPackage"});
}

TEST(BadPlots, OffTheMap) {
  const SmallFarm farm;
  farm.write_plots(polygon("away", "[700000,5758900],[700020,5758900],[700020,5758920],[700000,5758900]"));
  expect_plots_refused(
      farm, {"plot 'away': a plot lies off the map", "0.0 % of it is on the map", "Give a ground"});
}

TEST(BadPlots, PartlyOffTheMap) {
  const SmallFarm farm;
  farm.write_plots(polygon(
      "edge", "[690118,5758900],[690138,5758900],[690138,5758920],[690118,5758920],[690118,5758900]"));
  expect_plots_refused(farm, {"plot 'edge': a plot lies partly off the map", "50.0 % of it is on the map"});
}

// Degrees in a layer that says metres: far away, not near the map's corner.
TEST(BadPlots, DegreesReadAsMetres) {
  const SmallFarm farm;
  farm.write_plots(polygon("degrees", "[5.77,51.9],[5.78,51.9],[5.78,51.91],[5.77,51.9]"));
  expect_plots_refused(farm, {"plot 'degrees': a plot lies off the map", "check the layer's CRS"});
}

TEST(BadPlots, CrossedPolygon) {
  const SmallFarm farm;
  farm.write_plots(
      polygon("bow", "[690010,5758900],[690030,5758920],[690030,5758900],[690010,5758920],[690010,5758900]"));
  expect_plots_refused(
      farm, {"plot 'bow': a plot's polygon is invalid", "Self-intersection", "ogr2ogr -makevalid"});
}

TEST(BadPlots, NotAPolygonOrWithoutIdOrTwice) {
  const SmallFarm farm;
  farm.write_plots(R"({"type":"Feature","properties":{"id":"dot"},"geometry":{"type":"Point",)"
                   R"("coordinates":[690010,5758900]}})");
  expect_plots_refused(farm, {"plot 'dot': a plot is not a polygon", "POINT", "Draw plots as polygons"});
  const std::string corners = "[690010,5758900],[690030,5758900],[690030,5758920],[690010,5758900]";
  farm.write_plots(polygon("", corners));
  expect_plots_refused(farm, {"a plot has no id", "Give each plot an id of its own"});
  farm.write_plots(polygon("A", corners));
  expect_plots_refused(farm, {"two plots have the same id", "'A'", "Give each plot an id of its own"});
}

TEST(BadPlots, UnknownFieldNamesTheNearest) {
  const SmallFarm farm;
  farm.write_plots();
  farm.write_plan("", kPlotsTable + "id = 'di'\n");
  expect_refused(farm.map(), 3, {"there is no field 'di'", "id", "did you mean 'id'?"});
  EXPECT_FALSE(std::filesystem::exists(farm / "run"));
}

}  // namespace
}  // namespace sunfall::test

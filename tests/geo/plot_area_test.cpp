// The plot that rows stand in.

#include "geo/plot_area.h"

#include <gmock/gmock.h>
#include <ogr_spatialref.h>

#include "geo/geo_support.h"
#include "geo/vector_file.h"

namespace sunfall::test {
namespace {

using testing::AllOf;
using testing::HasSubstr;

PlotArea read(const std::vector<TestFeature>& features, const std::string& filter = "", double cell_m = 1.0,
              const std::string& crs = "EPSG:32631") {
  const TempFolder folder;
  make_things(folder / "plots.gpkg", features, crs);
  const int side = static_cast<int>(100.0 / cell_m);
  return read_area({folder / "plots.gpkg", "", filter, "rows.area"}, utm_frame(side, side, cell_m));
}

Error::Parts refused(const std::vector<TestFeature>& features, const std::string& filter = "",
                     double cell_m = 1.0) {
  const Error::Parts parts = refusal(ErrorKind::data, [&] { read(features, filter, cell_m); });
  EXPECT_THAT(parts.where, HasSubstr("plots.gpkg layer 'things'"));
  EXPECT_FALSE(parts.remedy.empty());
  return parts;
}

TestFeature plot(const std::string& wkt, const std::string& kind = "P1") { return {wkt, {}, kind}; }

TEST(PlotArea, HolesAndPartsOfAllThatTheFilterSelects) {
  const std::string with_hole =
      "POLYGON((600010 5799990,600010 5799960,600050 5799960,600050 5799990,600010 5799990),"
      "(600020 5799980,600020 5799970,600030 5799970,600030 5799980,600020 5799980))";
  const std::string parts =
      "MULTIPOLYGON(((600060 5799990,600070 5799990,600070 5799980,600060 5799990)),"
      "((600080 5799990,600090 5799990,600090 5799980,600080 5799990)))";
  const PlotArea area =
      read({plot(with_hole), plot(parts), plot(rectangle(10, 50, 20, 60), "P2")}, "kind = 'P1'");
  ASSERT_EQ(area.rings.size(), 4U);
  EXPECT_NEAR(area.area_m2, 40 * 30 - 10 * 10 + 2 * 50, 1e-6);
  EXPECT_NEAR(signed_area_m2(area.rings[0]), 1200.0, 1e-6);
  EXPECT_NEAR(signed_area_m2(area.rings[1]), -100.0, 1e-6);
  EXPECT_NEAR(signed_area_m2(area.rings[3]), 50.0, 1e-6);
  EXPECT_TRUE(area.notes.empty());
}

TEST(PlotArea, NeighboursMayTouch) {
  EXPECT_NEAR(read({plot(rectangle(10, 10, 20, 20)), plot(rectangle(20, 10, 30, 20))}).area_m2, 200.0, 1e-6);
  const Error::Parts parts = refused({plot(rectangle(10, 10, 20, 20)), plot(rectangle(19, 10, 30, 20))});
  EXPECT_EQ(parts.what, "polygons of the plot overlap");
  EXPECT_THAT(parts.where, HasSubstr("feature 2"));
  EXPECT_THAT(parts.found, HasSubstr("10.00 m2"));
}

TEST(PlotArea, AFilterThatSelectsNothing) {
  const Error::Parts parts = refused({plot(rectangle(10, 10, 20, 20))}, "kind = 'P9'");
  EXPECT_EQ(parts.what, "the filter selects nothing");
  EXPECT_EQ(parts.found, "none of 1 features has kind = 'P9'");
  EXPECT_THAT(parts.remedy, HasSubstr("rows.area.where"));
  EXPECT_THAT(refused({plot(rectangle(10, 10, 20, 20))}, "sort = 'P9'").remedy,
              AllOf(HasSubstr("rows.area.where"), HasSubstr("kind")));
  EXPECT_THAT(refused({}).what, HasSubstr("no plots"));
}

TEST(PlotArea, SmallerThanACell) {
  const std::vector<TestFeature> small = {plot(rectangle(10, 10, 13, 13))};
  EXPECT_NEAR(read(small, "", 2.0).area_m2, 9.0, 1e-6);
  const Error::Parts parts = refused(small, "", 5.0);
  EXPECT_EQ(parts.what, "the plot is smaller than a cell of the map");
  EXPECT_EQ(parts.found, "9.00 m2, a cell has 25.00 m2");
}

TEST(PlotArea, OffTheMapOrNoPolygon) {
  EXPECT_EQ(refused({plot(rectangle(500, 10, 520, 20))}).what, "a plot lies off the map");
  EXPECT_EQ(refused({plot(rectangle(90, 10, 130, 20))}).what, "a plot lies partly off the map");
  EXPECT_THAT(refused({plot(point(10, 10))}).remedy, HasSubstr("Draw plots as polygons"));
}

TEST(PlotArea, AnotherCrsIsSaid) {
  // Corners of the map's zone 31, written in zone 32.
  OGRSpatialReference from, to;
  from.SetFromUserInput("EPSG:32631");
  to.SetFromUserInput("EPSG:32632");
  const std::unique_ptr<OGRCoordinateTransformation> there(OGRCreateCoordinateTransformation(&from, &to));
  std::string corners;
  for (const auto& [x, y] :
       {std::pair(20.0, 20.0), std::pair(20.0, 60.0), std::pair(70.0, 60.0), std::pair(20.0, 20.0)}) {
    double east = 600000 + x, north = 5800000 - y;
    ASSERT_NE(there->Transform(1, &east, &north), 0);
    corners += (corners.empty() ? "" : ",") + std::to_string(east) + " " + std::to_string(north);
  }
  const PlotArea area = read({plot("POLYGON((" + corners + "))")}, "", 1.0, "EPSG:32632");
  // 1e-6 m of six decimals, over sides of 50 m.
  EXPECT_NEAR(area.area_m2, 1000.0, 1e-3);
  ASSERT_EQ(area.notes.size(), 1U);
  EXPECT_THAT(area.notes[0], HasSubstr("EPSG:32632"));
}

}  // namespace
}  // namespace sunfall::test

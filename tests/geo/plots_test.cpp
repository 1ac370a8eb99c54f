// Plots in and out.

#include "geo/plots.h"

#include <gmock/gmock.h>
#include <ogrsf_frmts.h>

#include <cmath>
#include <limits>

#include <fmt/format.h>

#include "geo/geo_support.h"
#include "geo/geodesy.h"
#include "geo/layer_writer.h"
#include "geo/vector_file.h"

namespace sunfall::test {
namespace {

using testing::AllOf;
using testing::HasSubstr;

// A hundred metres square, its corner at 600000, 5800000.
GridFrame field() { return utm_frame(100, 100, 1.0); }

struct Shape {
  std::string id;
  std::string wkt;
  std::string crop = "pears";
};

// A rectangle in metres east and south of the field's corner.
std::string box(double west, double north, double east, double south) {
  return fmt::format("POLYGON(({0} {1},{2} {1},{2} {3},{0} {3},{0} {1}))", 600000 + west, 5800000 - south,
                     600000 + east, 5800000 - north);
}

struct VectorOrder {
  std::string driver = "GPKG";
  std::string crs = "EPSG:32631";
  std::vector<std::string> layers{"plots"};
};

void make_vector(const std::filesystem::path& file, const std::vector<Shape>& shapes,
                 const VectorOrder& order = {}) {
  start_geo();
  auto* driver = GetGDALDriverManager()->GetDriverByName(order.driver.c_str());
  GDALDatasetUniquePtr dataset(driver->Create(file.c_str(), 0, 0, 0, GDT_Unknown, nullptr));
  ASSERT_NE(dataset, nullptr);
  OGRSpatialReference crs;
  if (!order.crs.empty()) crs.SetFromUserInput(order.crs.c_str());
  crs.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
  for (const std::string& name : order.layers) {
    OGRLayer* layer =
        dataset->CreateLayer(name.c_str(), order.crs.empty() ? nullptr : &crs, wkbUnknown, nullptr);
    ASSERT_NE(layer, nullptr);
    OGRFieldDefn id("id", OFTString);
    OGRFieldDefn crop("crop", OFTString);
    layer->CreateField(&id);
    layer->CreateField(&crop);
    for (const Shape& shape : shapes) {
      OGRFeature feature(layer->GetLayerDefn());
      if (!shape.id.empty()) feature.SetField("id", shape.id.c_str());
      feature.SetField("crop", shape.crop.c_str());
      OGRGeometry* geometry = nullptr;
      if (!shape.wkt.empty()) {
        ASSERT_EQ(OGRGeometryFactory::createFromWkt(shape.wkt.c_str(), nullptr, &geometry), OGRERR_NONE);
        feature.SetGeometryDirectly(geometry);
      }
      ASSERT_EQ(layer->CreateFeature(&feature), OGRERR_NONE);
    }
  }
}

std::vector<Plot> read_shapes(const std::vector<Shape>& shapes, const VectorOrder& order = {}) {
  const TempFolder folder;
  make_vector(folder / "plots.gpkg", shapes, order);
  return read_plots({folder / "plots.gpkg", "", "id", "crop"}, field());
}

Error::Parts refused(const std::vector<Shape>& shapes, const VectorOrder& order = {}) {
  const Error::Parts parts = refusal(ErrorKind::data, [&] { read_shapes(shapes, order); });
  EXPECT_THAT(parts.where, HasSubstr("plots.gpkg"));
  EXPECT_FALSE(parts.remedy.empty());
  return parts;
}

TEST(Plots, PolygonsWithHolesAndParts) {
  const std::string with_hole =
      "POLYGON((600010 5799990,600010 5799960,600050 5799960,600050 5799990,600010 5799990),"
      "(600020 5799980,600020 5799970,600030 5799970,600030 5799980,600020 5799980))";
  const std::string parts =
      "MULTIPOLYGON(((600060 5799990,600070 5799990,600070 5799980,600060 5799990)),"
      "((600080 5799990,600090 5799990,600090 5799980,600080 5799990)))";
  const std::vector<Plot> plots = read_shapes({{"A", with_hole}, {"B", parts, "apples"}});
  ASSERT_EQ(plots.size(), 2U);
  EXPECT_EQ(plots[0].id, "A");
  EXPECT_EQ(plots[0].crop, "pears");
  EXPECT_NEAR(plots[0].area_m2, 40 * 30 - 10 * 10, 1e-6);
  ASSERT_EQ(plots[0].rings.size(), 2U);
  EXPECT_NEAR(signed_area_m2(plots[0].rings[0]), 1200.0, 1e-6);  // counter-clockwise
  EXPECT_NEAR(signed_area_m2(plots[0].rings[1]), -100.0, 1e-6);  // clockwise
  EXPECT_EQ(plots[1].crop, "apples");
  EXPECT_NEAR(plots[1].area_m2, 100.0, 1e-6);
  ASSERT_EQ(plots[1].rings.size(), 2U);
  for (const auto& ring : plots[1].rings) EXPECT_NEAR(signed_area_m2(ring), 50.0, 1e-6);
}

TEST(Plots, EveryFormatAndNumbersAsIds) {
  for (const auto& [driver, name] :
       {std::pair{"GPKG", "plots.gpkg"}, std::pair{"ESRI Shapefile", "plots.shp"},
        std::pair{"FlatGeobuf", "plots.fgb"}}) {
    const TempFolder folder;
    make_vector(folder / name, {{"7", box(10, 10, 20, 30)}}, {driver, "EPSG:32631", {"plots"}});
    const std::vector<Plot> plots = read_plots({folder / name, "", "id", "crop"}, field());
    ASSERT_EQ(plots.size(), 1U) << driver;
    EXPECT_EQ(plots[0].id, "7");
    EXPECT_NEAR(plots[0].area_m2, 200.0, 1e-6) << driver;
  }
}

TEST(Plots, GeoJsonInDegreesIsReprojected) {
  const TempFolder folder;
  const GridFrame frame = field();
  std::string ring;
  for (const MapPoint point : {MapPoint{600010, 5799910}, MapPoint{600060, 5799910},
                               MapPoint{600060, 5799960}, MapPoint{600010, 5799910}}) {
    const Place place = geo_place(frame, point).place;
    ring += fmt::format("{}[{:.12f},{:.12f}]", ring.empty() ? "" : ",", place.longitude.degrees(),
                        place.latitude.degrees());
  }
  write_text(
      folder / "plots.geojson",
      fmt::format(R"({{"type":"FeatureCollection","features":[{{"type":"Feature","properties":{{"id":3}},)"
                  R"("geometry":{{"type":"Polygon","coordinates":[[{}]]}}}}]}})",
                  ring));
  const std::vector<Plot> plots = read_plots({folder / "plots.geojson", "", "id", {}}, frame);
  ASSERT_EQ(plots.size(), 1U);
  EXPECT_EQ(plots[0].id, "3");
  EXPECT_EQ(plots[0].crop, "");
  // GeoJSON carries 1e-12 degrees (1e-7 m) here; over 50 m that is 1e-5 m2.
  EXPECT_NEAR(plots[0].area_m2, 1250.0, 1e-3);
  EXPECT_NEAR(plots[0].rings[0][0].east, 600010.0, 1e-4);
}

TEST(Plots, MissingLayersAndFieldsNameThoseThatExist) {
  const TempFolder folder;
  make_vector(folder / "plots.gpkg", {{"A", box(10, 10, 20, 20)}},
              {"GPKG", "EPSG:32631", {"beds", "fields"}});
  const auto read = [&](const std::string& layer, const std::string& id, std::optional<std::string> crop) {
    return refusal(ErrorKind::data, [&] { read_plots({folder / "plots.gpkg", layer, id, crop}, field()); });
  };
  Error::Parts parts = read("feilds", "id", {});
  EXPECT_THAT(parts.found, AllOf(HasSubstr("beds"), HasSubstr("fields")));
  EXPECT_THAT(parts.remedy, HasSubstr("'fields'"));
  EXPECT_THAT(read("", "id", {}).what, HasSubstr("several layers"));
  parts = read("beds", "name", {});
  EXPECT_THAT(parts.what, HasSubstr("'name'"));
  EXPECT_THAT(parts.found, AllOf(HasSubstr("id"), HasSubstr("crop")));
  EXPECT_THAT(read("beds", "id", "krop").remedy, HasSubstr("plots.crop"));
  EXPECT_NO_THROW(read_plots({folder / "plots.gpkg", "beds", "id", "crop"}, field()));
}

TEST(Plots, MissingFilesAndRastersAreRefused) {
  const TempFolder folder;
  refusal(ErrorKind::data, [&] { read_plots({folder / "none.gpkg", "", "id", {}}, field()); });
  make_raster(folder / "plots.gpkg", {});
  EXPECT_THAT(refusal(ErrorKind::data,
                      [&] {
                        read_plots({folder / "plots.gpkg", "", "id", {}}, field());
                      })
                  .what,
              HasSubstr("not a vector file"));
}

TEST(Plots, AnEmptyLayerIsRefused) { EXPECT_THAT(refused({}).what, HasSubstr("no plots")); }

TEST(Plots, ALayerWithoutCrsIsRefused) {
  const TempFolder folder;
  make_vector(folder / "plots.shp", {{"A", box(10, 10, 20, 20)}}, {"ESRI Shapefile", "", {"plots"}});
  EXPECT_THAT(refusal(ErrorKind::data,
                      [&] {
                        read_plots({folder / "plots.shp", "", "id", {}}, field());
                      })
                  .what,
              HasSubstr("no coordinate reference system"));
}

TEST(Plots, ASelfCrossingPolygonIsNamedWithItsFault) {
  const Error::Parts parts = refused(
      {{"good", box(10, 10, 20, 20)},
       {"bow", "POLYGON((600010 5799990,600030 5799970,600030 5799990,600010 5799970,600010 5799990))"}});
  EXPECT_THAT(parts.where, HasSubstr("'bow'"));
  EXPECT_THAT(parts.found, AllOf(HasSubstr("Self-intersection"), HasSubstr("600020")));
}

TEST(Plots, PointsAndEmptyGeometriesAreRefused) {
  EXPECT_THAT(refused({{"A", "POINT(600010 5799990)"}}).found, HasSubstr("POINT"));
  EXPECT_THAT(refused({{"A", "POLYGON EMPTY"}}).what, HasSubstr("no polygon"));
  EXPECT_THAT(refused({{"A", ""}}).what, HasSubstr("no polygon"));
}

TEST(Plots, RepeatedAndEmptyIdsAreRefused) {
  const Error::Parts parts = refused({{"A", box(10, 10, 20, 20)}, {"A", box(30, 30, 40, 40)}});
  EXPECT_THAT(parts.what, HasSubstr("same id"));
  EXPECT_THAT(parts.found, HasSubstr("'A'"));
  EXPECT_THAT(refused({{"", box(10, 10, 20, 20)}}).what, HasSubstr("no id"));
  EXPECT_THAT(refused({{"  ", box(10, 10, 20, 20)}}).what, HasSubstr("no id"));
}

TEST(Plots, OffTheMapWhollyOrPartly) {
  Error::Parts parts = refused({{"A", box(10, 10, 20, 20)}, {"far", box(500, 10, 520, 20)}});
  EXPECT_EQ(parts.what, "a plot lies off the map");
  EXPECT_THAT(parts.where, HasSubstr("'far'"));
  // A quarter of this one's width lies inside.
  parts = refused({{"edge", box(90, 10, 130, 20)}});
  EXPECT_EQ(parts.what, "a plot lies partly off the map");
  EXPECT_THAT(parts.found, HasSubstr("25.0 %"));
  EXPECT_NO_THROW(read_shapes({{"all", box(0, 0, 100, 100)}}));
}

TEST(Plots, ArcsBecomeStraightEdges) {
  const std::vector<Plot> plots = read_shapes({{"round",
                                                "CURVEPOLYGON(CIRCULARSTRING(600040 5799950,600050 "
                                                "5799960,600060 5799950,600050 5799940,600040 5799950))"}});
  // GDAL's arcs have a corner every 4 degrees: the area falls short of π r² by (4°)²/6 = 0.08 %.
  EXPECT_NEAR(plots[0].area_m2, std::numbers::pi * 100.0, 0.3);
}

class PlotsOut : public testing::Test {
 protected:
  void write(const std::string& name) {
    write_plots_gpkg(
        folder_ / name, plots_,
        {{"dli_01", {2.25, std::numeric_limits<double>::quiet_NaN()}, {}}, {"note", {}, {"fine", "dark"}}},
        field());
  }
  TempFolder folder_;
  std::vector<Plot> plots_ =
      read_shapes({{"A",
                    "POLYGON((600010 5799990,600050 5799990,600050 5799960,600010 5799960,600010 5799990),"
                    "(600020 5799980,600020 5799970,600030 5799970,600030 5799980,600020 5799980))"},
                   {"B",
                    "MULTIPOLYGON(((600060 5799990,600070 5799990,600070 5799980,600060 5799990)),"
                    "((600080 5799990,600090 5799990,600090 5799980,600080 5799990)))",
                    "apples"}});
};

TEST_F(PlotsOut, ReadBackAsWritten) {
  write("out.gpkg");
  EXPECT_EQ(folder_.names(), std::vector<std::string>{"out.gpkg"});
  const std::vector<Plot> back = read_plots({folder_ / "out.gpkg", "plots", "id", "crop"}, field());
  ASSERT_EQ(back.size(), 2U);
  for (std::size_t i = 0; i < 2; ++i) {
    EXPECT_EQ(back[i].id, plots_[i].id);
    EXPECT_EQ(back[i].crop, plots_[i].crop);
    EXPECT_EQ(back[i].area_m2, plots_[i].area_m2);
    ASSERT_EQ(back[i].rings.size(), plots_[i].rings.size());
  }
  GDALDatasetUniquePtr dataset(GDALDataset::Open((folder_ / "out.gpkg").c_str(), GDAL_OF_VECTOR));
  OGRLayer* layer = dataset->GetLayerByName("plots");
  const OGRFeatureUniquePtr first(layer->GetNextFeature());
  const OGRFeatureUniquePtr second(layer->GetNextFeature());
  EXPECT_EQ(first->GetFieldAsDouble("dli_01"), 2.25);
  EXPECT_STREQ(second->GetFieldAsString("note"), "dark");
  EXPECT_TRUE(second->IsFieldNull(second->GetFieldIndex("dli_01")));
}

TEST_F(PlotsOut, TheSameBytesTwice) {
  write("one.gpkg");
  write("two.gpkg");
  EXPECT_TRUE(content_of(folder_ / "one.gpkg") == content_of(folder_ / "two.gpkg"));
}

TEST_F(PlotsOut, AMissingFolderIsRefused) {
  refusal(ErrorKind::io, [&] { write_plots_gpkg(folder_ / "none/out.gpkg", plots_, {}, field()); });
}

}  // namespace
}  // namespace sunfall::test

#include "geo/vector_file.h"

#include <gtest/gtest.h>
#include <ogrsf_frmts.h>

#include <fmt/format.h>

#include "geo/layer_writer.h"

namespace sunfall::test {

void make_things(const std::filesystem::path& file, const std::vector<TestFeature>& features,
                 const std::string& crs_name) {
  start_geo();
  auto* driver = GetGDALDriverManager()->GetDriverByName("GPKG");
  const GDALDatasetUniquePtr dataset(driver->Create(file.c_str(), 0, 0, 0, GDT_Unknown, nullptr));
  ASSERT_NE(dataset, nullptr);
  OGRSpatialReference crs;
  ASSERT_EQ(crs.SetFromUserInput(crs_name.c_str()), OGRERR_NONE);
  crs.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
  OGRLayer* layer = dataset->CreateLayer("things", &crs, wkbUnknown, nullptr);
  ASSERT_NE(layer, nullptr);
  for (const char* name : {"height", "base", "width", "lad"}) {
    OGRFieldDefn field(name, OFTReal);
    layer->CreateField(&field);
  }
  OGRFieldDefn kind("kind", OFTString);
  layer->CreateField(&kind);
  for (const TestFeature& thing : features) {
    OGRFeature feature(layer->GetLayerDefn());
    for (const auto& [name, value] : thing.numbers) feature.SetField(name.c_str(), value);
    if (!thing.label.empty()) feature.SetField("kind", thing.label.c_str());
    if (!thing.wkt.empty()) {
      OGRGeometry* geometry = nullptr;
      ASSERT_EQ(OGRGeometryFactory::createFromWkt(thing.wkt.c_str(), nullptr, &geometry), OGRERR_NONE);
      feature.SetGeometryDirectly(geometry);
    }
    ASSERT_EQ(layer->CreateFeature(&feature), OGRERR_NONE);
  }
}

std::string point(double east, double south) {
  return fmt::format("POINT({} {})", 600000 + east, 5800000 - south);
}

std::string rectangle(double west, double north, double east, double south) {
  return fmt::format("POLYGON(({0} {1},{2} {1},{2} {3},{0} {3},{0} {1}))", 600000 + west, 5800000 - south,
                     600000 + east, 5800000 - north);
}

double signed_area_m2(const std::vector<MapPoint>& ring) {
  double twice = 0.0;
  for (std::size_t i = 0; i < ring.size(); ++i) {
    const MapPoint a = ring[i];
    const MapPoint b = ring[(i + 1) % ring.size()];
    twice += (a.east - 6e5) * (b.north - 5.8e6) - (b.east - 6e5) * (a.north - 5.8e6);
  }
  return twice / 2.0;
}

}  // namespace sunfall::test

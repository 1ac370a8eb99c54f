// Maps whose metres are not those of the ground. The point scale of Mercator on a sphere is 1 / cos
// latitude (Snyder 1987, Map Projections: a Working Manual, eq. 7-3); that of UTM is 0.9996 on its
// central meridian and 1.0010 at the zone's edge on the equator.

#include <gmock/gmock.h>

#include "geo/geo_support.h"
#include "geo/map_scale.h"

namespace sunfall::test {
namespace {

void check(const char* crs, double longitude_deg, double latitude_deg) {
  GridFrame frame = utm_frame(10, 10);
  frame.crs_wkt = wkt(crs);
  const MapPoint point = map_point(frame, Angle::degrees(longitude_deg), Angle::degrees(latitude_deg));
  require_true_metres(frame, geo_place(frame, point), "ground.tif (ground)");
}

TEST(MapScale, WebMercatorIsRefusedAwayFromTheEquator) {
  const Error::Parts parts = refusal(ErrorKind::data, [] { check("EPSG:3857", 5.78, 51.95); });
  EXPECT_EQ(parts.where, "ground.tif (ground)");
  // 1 / cos 51.95° = 1.6225 on the sphere; the ellipsoid takes off up to 0.4 %.
  EXPECT_THAT(parts.found, testing::HasSubstr("EPSG:3857, in which a metre on the ground measures 1.62"));
  EXPECT_THAT(parts.remedy, testing::HasSubstr("gdalwarp -t_srs EPSG:32631"));
  refusal(ErrorKind::data, [] { check("EPSG:3857", 174.8, -36.9); });
}

TEST(MapScale, MapsMadeForTheirRegionPass) {
  check("EPSG:3857", -78.5, -0.2);   // Mercator at the equator is true
  check("EPSG:32631", 3.0, 52.0);    // UTM
  check("EPSG:32631", 0.0, 0.0);     // the zone's edge
  check("EPSG:2154", 9.5, 42.0);     // France, conic, its far corner
  check("EPSG:2193", 174.8, -36.9);  // New Zealand
  check("EPSG:28992", 5.4, 52.2);    // the Netherlands
}

}  // namespace
}  // namespace sunfall::test

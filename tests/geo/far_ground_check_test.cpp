// Far ground that counts heights from another zero than the ground.

#include <gmock/gmock.h>

#include "geo/far_ground_check.h"
#include "geo/geo_support.h"

namespace sunfall::test {
namespace {

// A ground of 40 × 20 m within far ground of 12 × 12 cells of 90 m, `rise_m` a metre to the east in both.
std::vector<std::string> oddities(double far_above_m, double rise_m, double far_west = 599500.0) {
  const TempFolder folder;
  RasterOrder ground;
  ground.columns = 40;
  ground.rows = 20;
  ground.transform = {600000.0, 1.0, 0.0, 5800000.0, 0.0, -1.0};
  for (int i = 0; i < 40 * 20; ++i) ground.values.push_back(100.0 + rise_m * (i % 40 + 0.5));
  make_raster(folder / "ground.tif", ground);
  RasterOrder far;
  far.columns = far.rows = 12;
  far.transform = {far_west, 90.0, 0.0, 5800500.0, 0.0, -90.0};
  for (int i = 0; i < 12 * 12; ++i) {
    far.values.push_back(100.0 + rise_m * (far_west - 600000.0 + 90.0 * (i % 12 + 0.5)) + far_above_m);
  }
  make_raster(folder / "far.tif", far);
  return far_ground_oddities(RasterSource::open(folder / "ground.tif", "ground"), folder / "far.tif");
}

TEST(FarGroundCheck, TheSameZeroIsFine) {
  EXPECT_THAT(oddities(0.0, 0.0), testing::IsEmpty());
  EXPECT_THAT(oddities(-8.0, 0.3), testing::IsEmpty());
  EXPECT_THAT(oddities(43.0, 0.0, 700000.0), testing::IsEmpty());  // away from the ground
}

TEST(FarGroundCheck, AnotherZeroIsNoted) {
  EXPECT_THAT(oddities(43.0, 0.0), testing::ElementsAre(testing::HasSubstr("43 m above ground")));
  EXPECT_THAT(oddities(-43.0, 0.3), testing::ElementsAre(testing::HasSubstr("43 m below ground")));
}

}  // namespace
}  // namespace sunfall::test

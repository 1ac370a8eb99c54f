// Surfaces that cannot belong to their ground.

#include <gmock/gmock.h>

#include "geo/geo_support.h"
#include "geo/surface_check.h"

namespace sunfall::test {
namespace {

constexpr int kSide = 60;

// A ground at 40 m; a surface of `open_m`, and `built_m` on the western third.
std::vector<std::string> oddities(double open_m, double built_m) {
  const TempFolder folder;
  RasterOrder order;
  order.columns = order.rows = kSide;
  order.transform = {600000.0, 1.0, 0.0, 5800000.0, 0.0, -1.0};
  order.values.assign(kSide * kSide, 40.0);
  make_raster(folder / "ground.tif", order);
  for (std::size_t i = 0; i < order.values.size(); ++i) {
    order.values[i] = i % kSide < kSide / 3 ? built_m : open_m;
  }
  make_raster(folder / "surface.tif", order);
  return surface_oddities(RasterSource::open(folder / "ground.tif", "ground"),
                          RasterSource::open(folder / "surface.tif", "surface"), 0.5);
}

TEST(SurfaceCheck, HeightsAboveTheSameZeroAreFine) { EXPECT_THAT(oddities(40.0, 48.0), testing::IsEmpty()); }

TEST(SurfaceCheck, HeightsAboveTheGroundAreNoted) {
  EXPECT_THAT(oddities(0.0, 8.0),
              testing::ElementsAre(testing::HasSubstr("surface lies more than 2 m below ground in 100 %")));
}

TEST(SurfaceCheck, ZeroWhereNothingStandsIsNoted) {
  EXPECT_THAT(oddities(0.0, 48.0), testing::ElementsAre(testing::HasSubstr("below ground in")));
}

// The geoid lies some 43 m above the ellipsoid in the Netherlands.
TEST(SurfaceCheck, AnotherZeroOfHeightIsNoted) {
  EXPECT_THAT(oddities(83.0, 91.0),
              testing::ElementsAre(testing::HasSubstr("surface stands above the receiver in 100 %")));
}

}  // namespace
}  // namespace sunfall::test

// Whether leaves stand in the surface already.

#include "geo/canopy_check.h"

#include <gmock/gmock.h>

#include "geo/geo_support.h"
#include "geo/grid_canopy.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

class CanopyCheck : public testing::Test {
 protected:
  RasterSource raster(const std::string& name, std::vector<double> values) {
    RasterOrder order;
    order.values = std::move(values);
    order.nodata = -9999.0;
    make_raster(folder_ / name, order);
    return RasterSource::open(folder_ / name, name);
  }
  TempFolder folder_;
  std::vector<std::string> notes_;
};

TEST_F(CanopyCheck, CountsCellsWhoseSurfaceReachesTheLeaves) {
  const RasterSource ground = raster("ground.tif", std::vector<double>(12, 40.0));
  raster("top.tif", {8, 8, 8, 8, 1.5, 1.5, 0, 0, 8, 8, 8, 8});
  // In reach of 1 m, just short of it, bare; the low leaves and those without a surface are not counted.
  const RasterSource surface =
      raster("surface.tif", {48, 47, 46.9, 40, 41.5, 41.5, 60, 40, 49, -9999, 40, 47.2});
  const auto canopy =
      open_grid_canopy({{0, folder_ / "top.tif"}, {0.5, {}}, {1, {}}, "canopy"}, ground, notes_);
  const CanopyInSurface found = canopy_in_surface(*canopy, ground, surface);
  EXPECT_EQ(found.leafy, 7U);
  EXPECT_EQ(found.shared, 4U);
  EXPECT_DOUBLE_EQ(found.fraction(), 4.0 / 7.0);
  EXPECT_THAT(canopy_in_surface_note(found, "canopy 'lane'").value(),
              testing::AllOf(HasSubstr("canopy 'lane': in 57 %"), HasSubstr("shade twice")));
}

TEST_F(CanopyCheck, LeavesOverBareGroundAreFine) {
  const RasterSource ground = raster("ground.tif", std::vector<double>(12, 40.0));
  const RasterSource surface = raster("surface.tif", std::vector<double>(12, 40.3));
  const auto canopy = open_grid_canopy({{6, {}}, {0.5, {}}, {1, {}}, "canopy"}, ground, notes_);
  const CanopyInSurface found = canopy_in_surface(*canopy, ground, surface);
  EXPECT_EQ(found.leafy, 12U);
  EXPECT_EQ(found.shared, 0U);
  EXPECT_FALSE(canopy_in_surface_note(found, "canopy"));
  EXPECT_FALSE(canopy_in_surface_note({}, "canopy"));
}

}  // namespace
}  // namespace sunfall::test

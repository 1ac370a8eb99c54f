// Two rasters on one grid, or a message that puts them there.

#include <gmock/gmock.h>

#include <cstdlib>

#include "geo/geo_support.h"
#include "geo/raster_source.h"

namespace sunfall::test {
namespace {

using testing::AllOf;
using testing::HasSubstr;

class GridAgreement : public testing::Test {
 protected:
  void SetUp() override { make_raster(folder_ / "ground.tif", {}); }

  void require(const RasterOrder& order) {
    make_raster(folder_ / "surface.tif", order);
    require_same_grid(RasterSource::open(folder_ / "surface.tif", "surface"),
                      RasterSource::open(folder_ / "ground.tif", "ground"));
  }
  Error::Parts refused(const RasterOrder& order) {
    const Error::Parts parts = refusal(ErrorKind::data, [&] { require(order); });
    EXPECT_THAT(parts.where, HasSubstr("surface.tif (surface)"));
    // The grid of ground: 4 x 3 cells of 10 m with their corner at 600000, 5800000.
    EXPECT_THAT(parts.found,
                HasSubstr("needed EPSG:32631, 4 x 3 cells of 10 m from 600000 east, 5800000 north"));
    EXPECT_THAT(parts.remedy,
                HasSubstr("gdalwarp -t_srs EPSG:32631 -te 600000 5799970 600040 5800000 -tr 10 10"));
    return parts;
  }

  TempFolder folder_;
};

TEST_F(GridAgreement, EqualGridsAgree) { EXPECT_NO_THROW(require({})); }

TEST_F(GridAgreement, CornersMayDifferByAHundredthOfACell) {
  RasterOrder order;
  order.transform[0] += 0.09;
  EXPECT_NO_THROW(require(order));
  order.transform[0] += 0.02;
  EXPECT_THAT(refused(order).what, HasSubstr("extent"));
}

TEST_F(GridAgreement, AnotherExtent) {
  RasterOrder order;
  order.columns = 5;
  EXPECT_THAT(refused(order).what, HasSubstr("extent"));
  order.columns = 4;
  order.transform[3] += 10.0;
  EXPECT_THAT(refused(order).what, HasSubstr("extent"));
}

TEST_F(GridAgreement, AnotherCellSize) {
  RasterOrder order;
  order.columns = 8;
  order.rows = 6;
  order.transform[1] = 5.0;
  order.transform[5] = -5.0;
  EXPECT_THAT(refused(order).what, HasSubstr("cell size"));
}

TEST_F(GridAgreement, AnotherCrs) {
  RasterOrder order;
  order.crs = "EPSG:32632";
  const Error::Parts parts = refused(order);
  EXPECT_THAT(parts.what, HasSubstr("coordinate reference system"));
  EXPECT_THAT(parts.found, HasSubstr("EPSG:32632"));
}

// The same CRS written in another way is the same CRS.
TEST_F(GridAgreement, TheSameCrsInOtherWords) {
  RasterOrder order;
  order.crs =
      R"(PROJCS["Zone 31",GEOGCS["WGS 84",DATUM["WGS_1984",SPHEROID["WGS 84",6378137,298.257223563]],)"
      R"(PRIMEM["Greenwich",0],UNIT["degree",0.0174532925199433]],PROJECTION["Transverse_Mercator"],)"
      R"(PARAMETER["latitude_of_origin",0],PARAMETER["central_meridian",3],PARAMETER["scale_factor",0.9996],)"
      R"(PARAMETER["false_easting",500000],PARAMETER["false_northing",0],UNIT["metre",1]])";
  EXPECT_NO_THROW(require(order));
}

// The command in the message is run as it stands, with GDAL's own program.
TEST_F(GridAgreement, TheAdviceWorks) {
  RasterOrder order;
  order.columns = 40;
  order.rows = 40;
  order.transform = {599900.0, 7.0, 0.0, 5800100.0, 0.0, -7.0};
  std::string command = refused(order).remedy;
  command = command.substr(command.find("gdalwarp"));
  ASSERT_EQ(std::system(("cd " + folder_.path().string() + " && " + command + " > log.txt 2>&1").c_str()), 0)
      << content_of(folder_ / "log.txt");
  EXPECT_NO_THROW(require_same_grid(RasterSource::open(folder_ / "aligned.tif", "surface"),
                                    RasterSource::open(folder_ / "ground.tif", "ground")));
}

}  // namespace
}  // namespace sunfall::test

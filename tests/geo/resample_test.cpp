// Rasters carried onto another grid.

#include <gmock/gmock.h>

#include <cmath>

#include "geo/geo_support.h"
#include "geo/geodesy.h"
#include "geo/raster_source.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

// A plane of heights; bilinear interpolation gives it back exactly.
double plane(double east, double north) {
  return 50.0 + 0.01 * (east - 600000.0) + 0.02 * (north - 5800000.0);
}

RasterOrder plane_order(int columns, int rows, double west, double north, double cell_m) {
  RasterOrder order;
  order.columns = columns;
  order.rows = rows;
  order.transform = {west, cell_m, 0.0, north, 0.0, -cell_m};
  for (int row = 0; row < rows; ++row) {
    for (int column = 0; column < columns; ++column) {
      order.values.push_back(plane(west + (column + 0.5) * cell_m, north - (row + 0.5) * cell_m));
    }
  }
  return order;
}

GridFrame frame_at(double west, double north, int columns, int rows, double cell_m) {
  return {columns, rows, west, north, cell_m, wkt("EPSG:32631")};
}

// Heights near 60 m as floats are exact to 4e-6 m; weights in double, sums in float: 2e-5 m.
constexpr double kFloatTolerance_m = 2e-5;

// Resamples a plane onto `frame` and compares each cell with the plane at its centre.
void expect_plane(const RasterOrder& source, const GridFrame& frame, double tolerance_m) {
  const TempFolder folder;
  make_raster(folder / "far.tif", source);
  const Grid<float> grid = resample(folder / "far.tif", "far_ground", frame);
  for (int row = 0; row < frame.rows; ++row) {
    for (int column = 0; column < frame.columns; ++column) {
      const MapPoint point = frame.centre({column, row});
      ASSERT_NEAR(grid.at(column, row), plane(point.east, point.north), tolerance_m) << column << ' ' << row;
    }
  }
}

TEST(Resample, APlaneStaysAPlaneOnAFinerGrid) {
  expect_plane(plane_order(60, 50, 599000.0, 5801000.0, 30.0), frame_at(599300.0, 5800700.0, 200, 150, 5.0),
               kFloatTolerance_m);
}

// Coarser, the kernel is symmetric, so a plane stays a plane there too. It sums some 250 weighted
// floats of 60 m, each to half a unit in the last place.
TEST(Resample, APlaneStaysAPlaneOnACoarserGrid) {
  expect_plane(plane_order(400, 400, 599000.0, 5801000.0, 5.0), frame_at(599500.0, 5800500.0, 25, 20, 40.0),
               5 * kFloatTolerance_m);
}

TEST(Resample, OutsideTheSourceIsMissing) {
  const TempFolder folder;
  make_raster(folder / "far.tif", plane_order(10, 10, 600000.0, 5800000.0, 10.0));
  const Grid<float> grid =
      resample(folder / "far.tif", "far_ground", frame_at(599950.0, 5800050.0, 20, 20, 10.0));
  for (int row = 0; row < 20; ++row) {
    for (int column = 0; column < 20; ++column) {
      const bool inside = column >= 5 && column < 15 && row >= 5 && row < 15;
      EXPECT_EQ(std::isnan(grid.at(column, row)), !inside) << column << ' ' << row;
    }
  }
}

TEST(Resample, MissingCellsDoNotBleed) {
  const TempFolder folder;
  RasterOrder order = plane_order(10, 10, 600000.0, 5800000.0, 10.0);
  order.nodata = -9999.0;
  order.values[55] = -9999.0;
  make_raster(folder / "far.tif", order);
  const Grid<float> grid =
      resample(folder / "far.tif", "far_ground", frame_at(600000.0, 5800000.0, 20, 20, 5.0));
  for (const float value : grid.values()) {
    if (std::isnan(value)) continue;
    EXPECT_GT(value, 45.0F);
  }
}

// The neighbouring zone: each target cell's centre, carried there point by point with PROJ, must
// hold the plane's height at that place.
TEST(Resample, ReprojectsExactly) {
  const TempFolder folder;
  GridFrame frame = frame_at(199500.0, 5801000.0, 100, 100, 20.0);
  frame.crs_wkt = wkt("EPSG:32632");
  const GridFrame source = frame_at(0, 0, 1, 1, 10.0);
  const GeoPlace middle = geo_place(frame, frame.middle());
  const MapPoint there = map_point(source, middle.place.longitude, middle.place.latitude);
  const double west = std::round(there.east) - 2000.0;
  const double north = std::round(there.north) + 2000.0;
  make_raster(folder / "far.tif", plane_order(400, 400, west, north, 10.0));
  const Grid<float> grid = resample(folder / "far.tif", "far_ground", frame);
  for (int row = 0; row < frame.rows; row += 9) {
    for (int column = 0; column < frame.columns; column += 9) {
      const GeoPlace place = geo_place(frame, frame.centre({column, row}));
      const MapPoint point = map_point(source, place.place.longitude, place.place.latitude);
      // Target cells are a shade larger than source cells here, so the kernel is widened; on a
      // plane that changes nothing. Slopes of 0.02 m per m turn 1 mm of place into 2e-5 m.
      ASSERT_NEAR(grid.at(column, row), plane(point.east, point.north), 5e-4) << column << ' ' << row;
    }
  }
}

TEST(Resample, DegreesWillDoForTheFarGround) {
  const TempFolder folder;
  RasterOrder order;
  order.crs = "EPSG:4326";
  order.columns = 100;
  order.rows = 100;
  order.transform = {4.4, 0.001, 0.0, 52.4, 0.0, -0.001};
  order.values = std::vector<double>(10000, 12.5);
  make_raster(folder / "far.tif", order);
  const Grid<float> grid =
      resample(folder / "far.tif", "far_ground", frame_at(600000.0, 5800000.0, 10, 10, 50.0));
  for (const float value : grid.values()) EXPECT_EQ(value, 12.5F);
}

TEST(Resample, TheSameTwice) {
  const GridFrame olinda =
      RasterSource::open(SUNFALL_TEST_DATA "/olinda/olinda_dem_utm25s.tif", "far_ground").frame();
  GridFrame frame{200, 200, olinda.west + 500.0, olinda.north - 500.0, 45.0, olinda.crs_wkt};
  const auto once = resample(SUNFALL_TEST_DATA "/olinda/olinda_dem_utm25s.tif", "far_ground", frame);
  const auto again = resample(SUNFALL_TEST_DATA "/olinda/olinda_dem_utm25s.tif", "far_ground", frame);
  EXPECT_THAT(again.values(), testing::Pointwise(testing::NanSensitiveFloatEq(), once.values()));
}

TEST(Resample, RefusesAbsurdHeightsByTheirCell) {
  const TempFolder folder;
  RasterOrder order = plane_order(10, 10, 600000.0, 5800000.0, 10.0);
  order.values[23] = 1e38;
  make_raster(folder / "far.tif", order);
  const Error::Parts parts = refusal(ErrorKind::data, [&] {
    resample(folder / "far.tif", "far_ground", frame_at(600000.0, 5800000.0, 10, 10, 10.0));
  });
  EXPECT_THAT(parts.where, HasSubstr("column 3, row 2"));
}

TEST(Resample, RefusesARasterWithoutCrs) {
  const TempFolder folder;
  RasterOrder order;
  order.crs = "";
  make_raster(folder / "far.tif", order);
  const GridFrame frame = frame_at(600000.0, 5800000.0, 10, 10, 10.0);
  EXPECT_THAT(refusal(ErrorKind::data, [&] { resample(folder / "far.tif", "far_ground", frame); }).where,
              HasSubstr("(far_ground)"));
  refusal(ErrorKind::data, [&] { extent_in(folder / "far.tif", "far_ground", frame); });
}

TEST(Extent, InTheSameCrsItIsTheFrame) {
  const TempFolder folder;
  make_raster(folder / "far.tif", {});
  const MapBox box = extent_in(folder / "far.tif", "far_ground", frame_at(0, 0, 1, 1, 1.0));
  EXPECT_DOUBLE_EQ(box.west, 600000.0);
  EXPECT_DOUBLE_EQ(box.south, 5799970.0);
  EXPECT_DOUBLE_EQ(box.east, 600040.0);
  EXPECT_DOUBLE_EQ(box.north, 5800000.0);
}

// In the next zone edges bend; the box must hold the four corners and the middle of each edge.
TEST(Extent, InAnotherCrsItHoldsTheEdges) {
  const TempFolder folder;
  RasterOrder order;
  order.columns = 1000;
  order.rows = 1000;
  order.transform = {650000.0, 100.0, 0.0, 5850000.0, 0.0, -100.0};
  make_raster(folder / "far.tif", order);
  const GridFrame source{1000, 1000, 650000.0, 5850000.0, 100.0, wkt("EPSG:32631")};
  GridFrame frame = source;
  frame.crs_wkt = wkt("EPSG:32632");
  const MapBox box = extent_in(folder / "far.tif", "far_ground", frame);
  double top = 0.0;
  for (const double x : {0.0, 500.0, 1000.0}) {
    for (const double y : {0.0, 500.0, 1000.0}) {
      const GeoPlace place = geo_place(source, {650000.0 + 100.0 * x, 5850000.0 - 100.0 * y});
      const MapPoint point = map_point(frame, place.place.longitude, place.place.latitude);
      top = std::max(top, point.north);
      EXPECT_LE(box.west, point.east + 0.01);
      EXPECT_GE(box.east, point.east - 0.01);
      EXPECT_LE(box.south, point.north + 0.01);
      EXPECT_GE(box.north, point.north - 0.01);
    }
  }
  EXPECT_NEAR(box.north, top, 200.0);
}

}  // namespace
}  // namespace sunfall::test

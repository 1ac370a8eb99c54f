// Rasters come in with the right numbers, and those that would mislead are refused by name.

#include "geo/raster_source.h"

#include <gmock/gmock.h>

#include <cmath>
#include <limits>

#include "geo/geo_support.h"

namespace sunfall::test {
namespace {

using testing::AllOf;
using testing::HasSubstr;

constexpr double kNan = std::numeric_limits<double>::quiet_NaN();
constexpr double kInfinity = std::numeric_limits<double>::infinity();

Grid<float> read_all(const RasterSource& source) {
  return source.read({0, 0, source.frame().columns, source.frame().rows});
}

struct Figures {
  double sum = 0.0;
  float least = std::numeric_limits<float>::max();
  float most = std::numeric_limits<float>::lowest();
};

Figures figures_of(const Grid<float>& grid) {
  Figures figures;
  for (const float value : grid.values()) {
    figures.sum += value;
    figures.least = std::min(figures.least, value);
    figures.most = std::max(figures.most, value);
  }
  return figures;
}

// Opens and reads the whole of a raster made to order.
Grid<float> read_order(const RasterOrder& order) {
  const TempFolder folder;
  make_raster(folder / "ground.tif", order);
  return read_all(RasterSource::open(folder / "ground.tif", "ground"));
}

Error::Parts refused(const RasterOrder& order, ErrorKind kind = ErrorKind::data) {
  const Error::Parts parts = refusal(kind, [&] { read_order(order); });
  EXPECT_THAT(parts.where, AllOf(HasSubstr("ground.tif"), HasSubstr("(ground)")));
  EXPECT_FALSE(parts.what.empty());
  EXPECT_FALSE(parts.found.empty());
  EXPECT_FALSE(parts.remedy.empty());
  return parts;
}

// Figures of the file by an independent reading (NumPy), as its README.md gives them.
TEST(RasterSource, ReadsTheOlindaModel) {
  const auto source = RasterSource::open(SUNFALL_TEST_DATA "/olinda/olinda_dem_utm25s.tif", "ground");
  EXPECT_EQ(source.frame().columns, 111);
  EXPECT_EQ(source.frame().rows, 111);
  EXPECT_NEAR(source.frame().cell_m, 89.994, 0.0005);
  const Figures figures = figures_of(read_all(source));
  EXPECT_EQ(figures.sum, 266937.0);
  EXPECT_EQ(figures.least, -1.0F);
  EXPECT_EQ(figures.most, 88.0F);
}

TEST(RasterSource, ReadsTheVolcano) {
  const auto source = RasterSource::open(SUNFALL_TEST_DATA "/volcano/volcano.tif", "ground");
  EXPECT_EQ(source.frame().columns, 87);
  EXPECT_EQ(source.frame().rows, 61);
  EXPECT_EQ(source.frame().cell_m, 10.0);
  EXPECT_EQ(source.frame().west, 1756850.0);
  EXPECT_EQ(source.frame().north, 5917655.0);
  const Figures figures = figures_of(read_all(source));
  EXPECT_EQ(figures.sum, 690907.0);
  EXPECT_EQ(figures.least, 94.0F);
  EXPECT_EQ(figures.most, 195.0F);
}

TEST(RasterSource, WindowsMayReachOutside) {
  const TempFolder folder;
  make_raster(folder / "ground.tif", {});
  const auto source = RasterSource::open(folder / "ground.tif", "ground");
  const Grid<float> grid = source.read({-1, 1, 3, 4});
  EXPECT_EQ(grid.frame().west, 599990.0);
  EXPECT_EQ(grid.frame().north, 5799990.0);
  EXPECT_EQ(grid.frame().cell_m, 10.0);
  // Rows 1 and 2 of the raster are 5 6 7 8 and 9 10 11 12.
  const std::vector<float> expected{kMissing, 5,        6,        kMissing, 9,        10,
                                    kMissing, kMissing, kMissing, kMissing, kMissing, kMissing};
  EXPECT_THAT(grid.values(), testing::Pointwise(testing::NanSensitiveFloatEq(), expected));
}

TEST(RasterSource, WindowsWhollyOutsideAreMissing) {
  const TempFolder folder;
  make_raster(folder / "ground.tif", {});
  const auto source = RasterSource::open(folder / "ground.tif", "ground");
  for (const CellWindow& window : {CellWindow{100, 0, 2, 2}, CellWindow{-2, 0, 2, 2}, CellWindow{0, 3, 2, 2},
                                   CellWindow{std::numeric_limits<int>::max() - 1, 0, 2, 2}}) {
    for (const float value : source.read(window).values()) EXPECT_TRUE(std::isnan(value));
  }
}

TEST(RasterSource, NodataScaleAndOffsetOfIntegers) {
  RasterOrder order;
  order.type = GDT_Int16;
  order.nodata = -32768;
  order.scale = 0.1;
  order.offset = 100.0;
  order.columns = 3;
  order.rows = 1;
  order.values = {-32768, 15, -20};
  const Grid<float> grid = read_order(order);
  EXPECT_TRUE(std::isnan(grid.at(0, 0)));
  // Products of floats of this size are within one unit in the last place, 7.6e-6.
  EXPECT_NEAR(grid.at(1, 0), 101.5, 1e-5);
  EXPECT_NEAR(grid.at(2, 0), 98.0, 1e-5);
}

TEST(RasterSource, WideTypesKeepTheirNodata) {
  for (const GDALDataType type : {GDT_Float64, GDT_Int32, GDT_UInt32}) {
    RasterOrder order;
    order.type = type;
    order.nodata = type == GDT_UInt32 ? 4294967295.0 : -2147483647.0;
    order.columns = 2;
    order.rows = 1;
    order.values = {*order.nodata, 12.0};
    const Grid<float> grid = read_order(order);
    EXPECT_TRUE(std::isnan(grid.at(0, 0))) << GDALGetDataTypeName(type);
    EXPECT_EQ(grid.at(1, 0), 12.0F);
  }
}

// A raster of two cells: `nodata`, stored as `stored`, and 3.
void expect_missing(double nodata, double stored) {
  RasterOrder order;
  order.nodata = nodata;
  order.columns = 2;
  order.rows = 1;
  order.values = {stored, 3.0};
  const Grid<float> grid = read_order(order);
  EXPECT_TRUE(std::isnan(grid.at(0, 0)));
  EXPECT_EQ(grid.at(1, 0), 3.0F);
}

// Common in the wild: the lowest float printed with too few digits, which lies beyond float.
TEST(RasterSource, NodataBeyondFloatStillMatches) {
  expect_missing(-3.40282347e+38, std::numeric_limits<float>::lowest());
}

TEST(RasterSource, NanIsMissingWhereDeclared) { expect_missing(kNan, kNan); }

TEST(RasterSource, AllNodataReadsAsAllMissing) {
  RasterOrder order;
  order.nodata = 0.0;
  order.values = std::vector<double>(12, 0.0);
  for (const float value : read_order(order).values()) EXPECT_TRUE(std::isnan(value));
}

TEST(RasterSource, HeightsAtTheLimitsAreRead) {
  RasterOrder order;
  order.columns = 2;
  order.rows = 1;
  order.values = {-500.0, 9000.0};
  EXPECT_EQ(read_order(order).values(), (std::vector<float>{-500.0F, 9000.0F}));
}

TEST(RasterSource, RefusesHeightsThatCannotBe) {
  for (const double wrong : {1e38, -1e38, kInfinity, -kInfinity, -500.5, 9000.5, -9999.0}) {
    for (const GDALDataType type : {GDT_Float32, GDT_Float64}) {
      RasterOrder order;
      order.type = type;
      order.values = {1, 2, 3, 4, 5, 6, wrong, 8, 9, 10, 11, 12};
      const Error::Parts parts = refused(order);
      // The seventh cell: its centre lies 25 m east and 15 m south of the corner.
      EXPECT_THAT(parts.where, AllOf(HasSubstr("column 2, row 1"), HasSubstr("600025.000, 5799985.000")));
      EXPECT_THAT(parts.remedy, HasSubstr("is nodata set?"));
    }
  }
}

TEST(RasterSource, NamesTheFirstWrongHeightAndItsValue) {
  RasterOrder order;
  order.values = {1, 2, 3, 4, -9999, 6, -9999, 8, 9, 10, 11, 12};
  const Error::Parts parts = refused(order);
  EXPECT_THAT(parts.where, HasSubstr("column 0, row 1"));
  EXPECT_EQ(parts.found, "-9999 m");
}

TEST(RasterSource, RefusesNanThatIsNotDeclared) {
  RasterOrder order;
  order.nodata = -9999.0;
  order.values = {1, 2, 3, 4, 5, -9999, 7, 8, 9, 10, kNan, 12};
  const Error::Parts parts = refused(order);
  EXPECT_THAT(parts.what, HasSubstr("NaN"));
  EXPECT_THAT(parts.where, HasSubstr("column 2, row 2"));
}

TEST(RasterSource, RefusesAMissingFile) {
  const Error::Parts parts =
      refusal(ErrorKind::data, [] { RasterSource::open("/nowhere/ground.tif", "ground"); });
  EXPECT_EQ(parts.what, "there is no such file");
  EXPECT_THAT(parts.where, HasSubstr("/nowhere/ground.tif (ground)"));
}

TEST(RasterSource, RefusesWhatIsNoRaster) {
  const TempFolder folder;
  write_text(folder / "ground.tif", "a letter to a friend");
  const Error::Parts parts =
      refusal(ErrorKind::data, [&] { RasterSource::open(folder / "ground.tif", "ground"); });
  EXPECT_THAT(parts.what, HasSubstr("not a raster"));
  EXPECT_FALSE(parts.found.empty());
  refusal(ErrorKind::data, [&] { RasterSource::open(folder.path(), "ground"); });
}

TEST(RasterSource, RefusesSeveralBands) {
  RasterOrder order;
  order.bands = 3;
  EXPECT_EQ(refused(order).found, "3 bands");
}

TEST(RasterSource, RefusesComplexNumbers) {
  RasterOrder order;
  order.type = GDT_CFloat32;
  EXPECT_EQ(refused(order).found, "CFloat32");
}

TEST(RasterSource, RefusesDegreesAndNamesTheZone) {
  RasterOrder order;
  order.crs = "EPSG:4326";
  order.transform = {5.6, 0.001, 0.0, 52.0, 0.0, -0.001};
  Error::Parts parts = refused(order);
  EXPECT_THAT(parts.what, HasSubstr("degrees"));
  EXPECT_EQ(parts.found, "EPSG:4326");
  EXPECT_THAT(parts.remedy, HasSubstr("EPSG:32631"));
  // Zones have six degrees, the southern ones the codes 327xx; polar regions a system of their own.
  order.transform = {-71.0, 0.001, 0.0, -33.0, 0.0, -0.001};
  EXPECT_THAT(refused(order).remedy, HasSubstr("EPSG:32719"));
  order.transform = {179.9, 0.001, 0.0, -17.0, 0.0, -0.001};
  EXPECT_THAT(refused(order).remedy, HasSubstr("EPSG:32760"));
  order.transform = {10.0, 0.001, 0.0, 86.0, 0.0, -0.001};
  EXPECT_THAT(refused(order).remedy, HasSubstr("EPSG:5041"));
}

TEST(RasterSource, RefusesNoCrs) {
  RasterOrder order;
  order.crs = "";
  EXPECT_THAT(refused(order).what, HasSubstr("no coordinate reference system"));
}

TEST(RasterSource, RefusesEarthCentredCrs) {
  RasterOrder order;
  order.crs = "EPSG:4978";
  EXPECT_THAT(refused(order).what, HasSubstr("not a projected one"));
}

TEST(RasterSource, RefusesFeetAndKilometresOnTheMap) {
  RasterOrder order;
  order.crs = "EPSG:2263";  // New York Long Island, US survey feet
  order.transform = {980000.0, 10.0, 0.0, 200000.0, 0.0, -10.0};
  const Error::Parts parts = refused(order);
  EXPECT_THAT(parts.found, AllOf(HasSubstr("EPSG:2263"), HasSubstr("US survey foot")));
  EXPECT_THAT(parts.remedy, HasSubstr("EPSG:32618"));
  order.crs = "+proj=utm +zone=31 +units=km";
  order.transform = {600.0, 0.01, 0.0, 5800.0, 0.0, -0.01};
  EXPECT_THAT(refused(order).found, HasSubstr("1000 m"));
}

TEST(RasterSource, RefusesHeightsInFeet) {
  RasterOrder order;
  order.unit = "ft";
  EXPECT_EQ(refused(order).found, "heights in 'ft'");
  order.unit = "metre";
  EXPECT_NO_THROW(read_order(order));
}

// A compound CRS may hold the unit of heights instead of the band.
TEST(RasterSource, RefusesHeightsInFeetOfACompoundCrs) {
  RasterOrder order;
  order.crs = "EPSG:32618+6360";  // NAVD88 height, US survey feet
  order.transform[0] = 500000.0;
  EXPECT_THAT(refused(order).found, HasSubstr("foot"));
}

TEST(RasterSource, KeepsThePlanePartOfACompoundCrs) {
  const TempFolder folder;
  RasterOrder order;
  order.crs = "EPSG:28992+5709";  // Amersfoort / RD New + NAP height
  make_raster(folder / "ground.tif", order);
  const auto source = RasterSource::open(folder / "ground.tif", "ground");
  EXPECT_THAT(source.frame().crs_wkt, testing::StartsWith("PROJCRS"));
  EXPECT_EQ(read_all(source).at(3, 2), 12.0F);
}

TEST(RasterSource, RefusesRotatedRasters) {
  RasterOrder order;
  const double sine = std::sin(0.1);
  const double cosine = std::cos(0.1);
  order.transform = {600000.0, 10 * cosine, 10 * sine, 5800000.0, 10 * sine, -10 * cosine};
  EXPECT_THAT(refused(order).what, HasSubstr("rotated"));
}

TEST(RasterSource, RefusesSouthUpAndMirroredRasters) {
  RasterOrder order;
  order.transform[5] = 10.0;
  EXPECT_THAT(refused(order).what, HasSubstr("north up"));
  order.transform[5] = -10.0;
  order.transform[1] = -10.0;
  EXPECT_THAT(refused(order).what, HasSubstr("north up"));
}

TEST(RasterSource, RefusesOblongCells) {
  RasterOrder order;
  order.transform[5] = -10.002;  // 2e-4 higher than wide
  EXPECT_THAT(refused(order).found, AllOf(HasSubstr("10 m wide"), HasSubstr("10.002 m high")));
  order.transform[5] = -10.0005;  // 5e-5
  EXPECT_NO_THROW(read_order(order));
}

TEST(RasterSource, RefusesRastersWithoutAPlace) {
  RasterOrder order;
  order.with_transform = false;
  EXPECT_THAT(refused(order).what, HasSubstr("where it lies"));
}

TEST(RasterSource, AnAsciiGridNeedsItsProjectionFile) {
  const TempFolder folder;
  write_text(folder / "ground.asc",
             "ncols 3\nnrows 2\nxllcorner 600000\nyllcorner 5800000\ncellsize 2\nNODATA_value -9999\n"
             "1 2 3\n4 -9999 6\n");
  const auto open = [&] { return RasterSource::open(folder / "ground.asc", "ground"); };
  EXPECT_THAT(refusal(ErrorKind::data, [&] { open(); }).what, HasSubstr("no coordinate reference system"));
  write_text(folder / "ground.prj", wkt("EPSG:32631"));
  const auto source = open();
  EXPECT_EQ(source.frame().north, 5800004.0);
  const Grid<float> grid = read_all(source);
  EXPECT_EQ(grid.at(2, 0), 3.0F);
  EXPECT_TRUE(std::isnan(grid.at(1, 1)));
}

// A mask stored in the file itself marks missing cells as nodata does.
TEST(RasterSource, AMaskInsideTheFileCounts) {
  const TempFolder folder;
  make_raster(folder / "ground.tif", {});
  {
    CPLSetThreadLocalConfigOption("GDAL_TIFF_INTERNAL_MASK", "YES");
    GDALDatasetUniquePtr dataset(
        GDALDataset::Open((folder / "ground.tif").c_str(), GDAL_OF_RASTER | GDAL_OF_UPDATE));
    ASSERT_EQ(dataset->CreateMaskBand(GMF_PER_DATASET), CE_None);
    GByte mask[12] = {255, 255, 255, 255, 255, 255, 255, 255, 255, 255, 255, 0};
    ASSERT_EQ(dataset->GetRasterBand(1)->GetMaskBand()->RasterIO(GF_Write, 0, 0, 4, 3, mask, 4, 3, GDT_Byte,
                                                                 0, 0, nullptr),
              CE_None);
    CPLSetThreadLocalConfigOption("GDAL_TIFF_INTERNAL_MASK", nullptr);
  }
  const Grid<float> grid = read_all(RasterSource::open(folder / "ground.tif", "ground"));
  EXPECT_TRUE(std::isnan(grid.at(3, 2)));
  EXPECT_EQ(grid.at(2, 2), 11.0F);
}

// Tiles that are damaged must not pass as heights.
TEST(RasterSource, ADamagedFileFailsAsReading) {
  const TempFolder folder;
  RasterOrder order;
  order.columns = 64;
  order.rows = 64;
  order.creation = {"COMPRESS=DEFLATE"};
  make_raster(folder / "ground.tif", order);
  std::size_t offset = 0;
  {
    GDALDatasetUniquePtr dataset(GDALDataset::Open((folder / "ground.tif").c_str(), GDAL_OF_RASTER));
    offset = std::stoull(dataset->GetRasterBand(1)->GetMetadataItem("BLOCK_OFFSET_0_0", "TIFF"));
  }
  std::string bytes = content_of(folder / "ground.tif");
  for (std::size_t i = offset; i < offset + 100; ++i) bytes.at(i) = '\x55';
  write_text(folder / "ground.tif", bytes);
  const Error::Parts parts =
      refusal(ErrorKind::io, [&] { read_all(RasterSource::open(folder / "ground.tif", "ground")); });
  EXPECT_THAT(parts.what, HasSubstr("cannot be read"));
  EXPECT_FALSE(parts.found.empty());
}

}  // namespace
}  // namespace sunfall::test

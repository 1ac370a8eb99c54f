// Rasters that cannot be used, met through the program.

#include <gmock/gmock.h>

#include <cmath>
#include <sstream>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

namespace fs = std::filesystem;

// Changes the good ground into a bad one.
template <typename Change>
void expect_ground_refused(Change change, const std::vector<std::string>& parts) {
  const SmallFarm farm;
  RasterOrder order = farm_ground();
  change(order);
  make_raster(farm / "ground.tif", order);
  expect_all_refuse(farm, 3, parts);
}

TEST(BadRaster, Missing) {
  const SmallFarm farm;
  fs::rename(farm / "ground.tif", farm / "grounds.tif");
  expect_all_refuse(
      farm, 3,
      {"farm.toml:2 site.ground: the file does not exist", "ground.tif", R"(Perhaps "grounds.tif")"});
}

TEST(BadRaster, NotARaster) {
  const SmallFarm farm;
  write_text(farm / "ground.tif", "These are notes about the ground.\n");
  expect_all_refuse(farm, 3,
                    {"ground.tif (ground): this is not a raster that can be read", "Give a GeoTIFF"});
  write_text(farm / "ground.tif", "");
  expect_all_refuse(farm, 3,
                    {"ground.tif (ground): this is not a raster that can be read", "Give a GeoTIFF"});
}

TEST(BadRaster, CutShort) {
  const SmallFarm farm;
  fs::resize_file(farm / "ground.tif", fs::file_size(farm / "ground.tif") / 2);
  expect_all_refuse(farm, 3,
                    {"ground.tif (ground): the file is shorter than its header says", "Copy it again"});
}

TEST(BadRaster, InDegrees) {
  expect_ground_refused(
      [](RasterOrder& order) {
        order.crs = "EPSG:4326";
        order.transform = {5.77, 0.00002, 0.0, 51.95, 0.0, -0.00002};
      },
      {"ground.tif (ground): the raster is in degrees", "EPSG:4326", "gdalwarp -t_srs EPSG:32631"});
}

TEST(BadRaster, WithoutCrs) {
  expect_ground_refused([](RasterOrder& order) { order.crs = ""; },
                        {"ground.tif (ground): the raster has no coordinate reference system",
                         "(found: none)", "gdal_edit.py -a_srs EPSG:CODE"});
}

TEST(BadRaster, MapInFeet) {
  expect_ground_refused([](RasterOrder& order) { order.crs = "EPSG:2263"; },  // New York, US survey feet
                        {"ground.tif (ground): the raster's map unit is not the metre", "EPSG:2263",
                         "0.3048006096", "gdalwarp -t_srs EPSG:"});
}

// At 51.95° N a metre on the ground measures 1 / cos 51.95° = 1.62 m in the web maps' Mercator.
TEST(BadRaster, MapMetresThatAreNotOfTheGround) {
  expect_ground_refused(
      [](RasterOrder& order) {
        order.crs = "EPSG:3857";
        order.transform = {643600.0, 2.0, 0.0, 6791000.0, 0.0, -2.0};
      },
      {"ground.tif (ground): the map's metres are not metres on the ground here", "EPSG:3857", "1.62",
       "gdalwarp -t_srs EPSG:32631"});
}

TEST(BadRaster, HeightsInFeet) {
  expect_ground_refused([](RasterOrder& order) { order.unit = "ft"; },
                        {"ground.tif (ground): heights must be in metres", "heights in 'ft'", "A*0.3048"});
}

TEST(BadRaster, Rotated) {
  expect_ground_refused(
      [](RasterOrder& order) { order.transform = {690000.0, 1.9, 0.6, 5759000.0, 0.6, -1.9}; },
      {"ground.tif (ground): the raster is rotated", "0.6", "gdalwarp -tr CELL CELL"});
}

TEST(BadRaster, CellsNotSquare) {
  expect_ground_refused([](RasterOrder& order) { order.transform[5] = -2.5; },
                        {"ground.tif (ground): the raster's cells are not square", "2 m wide, 2.5 m high",
                         "gdalwarp -tr CELL CELL"});
}

TEST(BadRaster, SouthUp) {
  expect_ground_refused([](RasterOrder& order) { order.transform[5] = 2.0; },
                        {"ground.tif (ground): the raster is not north up", "gdalwarp -tr CELL CELL"});
}

TEST(BadRaster, OnlyNodata) {
  expect_ground_refused(
      [](RasterOrder& order) {
        order.nodata = -9999.0;
        for (double& height : order.values) height = -9999.0;
      },
      {"ground.tif", "the raster holds no height at all, only nodata", "Give a raster with known heights"});
}

// Cell 5, 7 has its centre at 690011, 5758985.
TEST(BadRaster, ImpossibleHeights) {
  const auto put = [](double height) {
    return [height](RasterOrder& order) { order.values[7 * kFarmSide + 5] = height; };
  };
  const std::string where = "ground.tif (ground), column 5, row 7, centre 690011.000, 5758985.000: ";
  expect_ground_refused(put(std::nan("")),
                        {where + "a height is NaN", "declared as nodata", "gdal_edit.py -a_nodata nan"});
  expect_ground_refused(put(1e38),
                        {where + "a height cannot be", "e+37 m", "-500 to 9000 m", "gdal_edit.py -a_nodata"});
  expect_ground_refused(put(-1e38),
                        {where + "a height cannot be", "-9.99", "-500 to 9000 m", "gdal_edit.py -a_nodata"});
  expect_ground_refused(
      put(-9999.0), {where + "a height cannot be", "(found: -9999 m)", "gdal_edit.py -a_nodata -9999 FILE"});
}

TEST(BadRaster, ImpossibleHeightsOfTheSurfaceAndFarGround) {
  const SmallFarm farm;
  RasterOrder surface = farm_surface();
  surface.values[0] = 1e38;
  make_raster(farm / "surface.tif", surface);
  farm.write_plan("surface = 'surface.tif'\n");
  expect_all_refuse(farm, 3, {"surface.tif (surface), column 0, row 0", "a height cannot be"});
  farm.write_plan("far_ground = 'surface.tif'\n");
  expect_all_refuse(farm, 3, {"surface.tif (far_ground), column 0, row 0", "a height cannot be"});
}

TEST(BadRaster, FarGroundElsewhere) {
  const SmallFarm farm;
  RasterOrder far = farm_ground();
  far.transform[0] += 500'000.0;
  make_raster(farm / "far.tif", far);
  farm.write_plan("far_ground = 'far.tif'\n");
  expect_all_refuse(farm, 3, {"far.tif", "lies away from the ground", "Give terrain around"});
}

// The words of the command that the message gives, after `start`.
std::vector<std::string> command_in(const std::string& message, const std::string& start) {
  std::string text = message.substr(message.find(start));
  text.erase(text.find_last_not_of(".\n") + 1);
  std::istringstream stream(text);
  std::vector<std::string> words;
  for (std::string word; stream >> word;) words.push_back(word);
  return words;
}

// The message says how to align the surface; who does as it says has a surface that fits.
void expect_alignable(const RasterOrder& order, const std::string& difference) {
  const SmallFarm farm;
  make_raster(farm / "surface.tif", order);
  farm.write_plan("surface = 'surface.tif'\n");
  const std::string fault =
      "surface.tif (surface): the raster is not on the grid of ground: another " + difference;
  expect_all_refuse(farm, 3, {fault, "needed EPSG:25831, 64 x 64 cells of 2 m", "Align it: gdalwarp "});
  const Outcome refused = farm.run({"vet", "farm.toml", "--dome", "draft"});
  std::vector<std::string> words = command_in(refused.err, "gdalwarp");
  RunOptions options;
  options.folder = farm.path();
  ASSERT_EQ(RunningProgram(words, options).wait().status, 0);
  farm.write_plan("surface = 'aligned.tif'\n");
  const Outcome accepted = farm.run({"vet", "farm.toml", "--dome", "draft"});
  EXPECT_EQ(accepted.status, 0) << accepted.err;
}

TEST(BadRaster, SurfaceOnAnotherExtent) {
  RasterOrder order = farm_surface();
  order.transform[0] += 1.0;
  expect_alignable(order, "extent");
}

TEST(BadRaster, SurfaceOfOtherCells) {
  RasterOrder order = farm_surface();
  order.transform[1] = 2.5;
  order.transform[5] = -2.5;
  expect_alignable(order, "cell size");
}

// UTM zone 32 for zone 31; the raster covers the same ground and more.
TEST(BadRaster, SurfaceInAnotherCrs) {
  RasterOrder order = farm_surface();
  order.crs = "EPSG:25832";
  order.transform = {277000.0, 40.0, 0.0, 5762000.0, 0.0, -40.0};
  expect_alignable(order, "coordinate reference system");
}

// A file of a few kilobytes that claims to hold any number of 1 m cells.
void make_boasting_raster(const fs::path& file, const std::string& columns, const std::string& rows) {
  tool_output({"gdal_create", "-q",
               "-of",         "GTiff",
               "-outsize",    columns,
               rows,          "-bands",
               "1",           "-ot",
               "Float32",     "-a_srs",
               "EPSG:25831",  "-a_ullr",
               "500000",      "5900000",
               "690000",      "5710000",
               "-co",         "SPARSE_OK=TRUE",
               "-co",         "COMPRESS=DEFLATE",
               "-co",         "TILED=YES",
               "-co",         "BLOCKXSIZE=4096",
               "-co",         "BLOCKYSIZE=4096",
               "-co",         "BIGTIFF=YES",
               file.string()});
  ASSERT_LT(fs::file_size(file), 1'000'000U);
}

TEST(BadRaster, LargerThanMemory) {
#if defined(__SANITIZE_ADDRESS__) || defined(__SANITIZE_THREAD__)
  GTEST_SKIP() << "sanitizers reserve more address space than the limit leaves";
#endif
  const SmallFarm farm;
  make_boasting_raster(farm / "ground.tif", "190000", "190000");
  RunOptions options;
  options.most_memory_bytes = 8'000'000'000;  // so that the test does not depend on the machine
  for (const std::vector<std::string>& command :
       {std::vector<std::string>{"vet", "farm.toml"},
        {"map", "farm.toml", "-o", "run"},
        {"spot", "farm.toml", "--at", "600000,5800000", "-o", "run"}}) {
    const Outcome outcome = farm.run(command, options);
    expect_refused(outcome, 3,
                   {"ground.tif (ground): the raster is too large for this machine's memory",
                    "190000 x 190000 cells", "gdal_translate -projwin"});
    EXPECT_LT(outcome.peak_mib, 200.0);
  }
  EXPECT_FALSE(fs::exists(farm / "run"));
}

// Beyond belief, whatever the memory.
TEST(BadRaster, SizeBeyondBelief) {
  const SmallFarm farm;
  make_boasting_raster(farm / "ground.tif", "1000000", "160000");
  expect_all_refuse(
      farm, 3, {"ground.tif (ground): the raster's size is not believable", "1000000 columns", "cut out"});
}

// A VRT is a text file that sends its reader to other files; under any name it is not followed.
TEST(BadRaster, FilesThatPointElsewhereAreNotFollowed) {
  const SmallFarm farm;
  fs::rename(farm / "ground.tif", farm / "elsewhere.tif");
  tool_output({"gdal_translate", "-q", "-of", "VRT", (farm / "elsewhere.tif").string(),
               (farm / "ground.vrt").string()});
  fs::rename(farm / "ground.vrt", farm / "ground.tif");
  expect_all_refuse(farm, 3,
                    {"ground.tif (ground): this is not a raster that can be read", "Give a GeoTIFF"});
}

// Beside the ground stand an .aux.xml that moves it and declares its heights to be nodata, an .ovr with
// other heights, a mask and a world file. The map is the same to the byte as without them.
TEST(BadRaster, SideCarsThatPointElsewhereAreNotObeyed) {
  const SmallFarm farm;
  ASSERT_EQ(farm.map({"--quiet"}).status, 0);
  write_text(farm / "ground.tif.aux.xml",
             "<PAMDataset><SRS>EPSG:25832</SRS><GeoTransform>0, 3, 0, 0, 0, -3</GeoTransform><PAMRasterBand "
             "band=\"1\">"
             "<NoDataValue>16</NoDataValue><Offset>100</Offset><UnitType>ft</UnitType></PAMRasterBand></"
             "PAMDataset>");
  RasterOrder overview = farm_ground();
  overview.columns = overview.rows = kFarmSide / 2;
  overview.values.assign(kFarmSide * kFarmSide / 4, 500.0);
  make_raster(farm / "ground.tif.ovr", overview);
  RasterOrder mask = farm_ground();
  mask.type = GDT_Byte;
  mask.values.assign(kFarmSide * kFarmSide, 0.0);
  make_raster(farm / "ground.tif.msk", mask);
  write_text(farm / "ground.tfw", "3\n0\n0\n-3\n0\n0\n");
  ASSERT_EQ(farm.run({"map", "farm.toml", "--dome", "draft", "-o", "again", "--quiet"}).status, 0);
  for (const char* layer : {"dli-06.tif", "dli-12.tif", "dli-year.tif", "sight.tif"}) {
    EXPECT_EQ(content_of(farm / "run" / layer), content_of(farm / "again" / layer)) << layer;
  }
}

}  // namespace
}  // namespace sunfall::test

// Layers on disk hold what was handed over, as clean Cloud Optimized GeoTIFFs.

#include "geo/layer_writer.h"

#include <gmock/gmock.h>

#include <algorithm>
#include <cmath>
#include <thread>

#include "geo/geo_support.h"

namespace sunfall::test {
namespace {

constexpr double kQuantum = 1.0 / 128.0;

LayerSpec dli_spec(const std::string& name = "dli-01.tif") {
  return {name, "Daily light integral, January", "mol m-2 d-1", kQuantum, false, {{"SOURCE_NOTE", "a test"}}};
}

// Something like a map of light: smooth, with edges, and some cells missing.
std::vector<float> light_values(const GridFrame& frame) {
  std::vector<float> values;
  for (int row = 0; row < frame.rows; ++row) {
    for (int column = 0; column < frame.columns; ++column) {
      const double shade = (column / 37 + row / 23) % 3 == 0 ? 0.4 : 1.0;
      const double value = shade * (20.0 + 9.0 * std::sin(0.013 * column) * std::cos(0.011 * row));
      values.push_back((column + 2 * row) % 101 == 0 ? kMissing : static_cast<float>(value));
    }
  }
  return values;
}

// Hands a whole layer over in tiles, in the given order.
void write_tiles(LayerWriter& writer, const GridFrame& frame, const std::vector<float>& values, int tile,
                 bool backwards = false) {
  std::vector<CellWindow> windows;
  for (int row = 0; row < frame.rows; row += tile) {
    for (int column = 0; column < frame.columns; column += tile) {
      windows.push_back(
          {column, row, std::min(tile, frame.columns - column), std::min(tile, frame.rows - row)});
    }
  }
  if (backwards) std::reverse(windows.begin(), windows.end());
  std::vector<float> part;
  for (const CellWindow& window : windows) {
    part.clear();
    for (int row = 0; row < window.rows; ++row) {
      const auto first =
          values.begin() + static_cast<std::ptrdiff_t>(window.row + row) * frame.columns + window.column;
      part.insert(part.end(), first, first + window.columns);
    }
    writer.write(window, part.data());
  }
}

std::filesystem::path write_layer(const TempFolder& folder, const LayerSpec& spec, const GridFrame& frame,
                                  const std::vector<float>& values) {
  LayerWriter writer(folder.path(), spec, frame);
  write_tiles(writer, frame, values, 256);
  writer.finish();
  return writer.final_path();
}

GDALDatasetUniquePtr open_file(const std::filesystem::path& file) {
  return GDALDatasetUniquePtr(GDALDataset::Open(file.c_str(), GDAL_OF_RASTER));
}

TEST(LayerWriter, ReadsBackAsWrittenButRounded) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(1100, 700);
  const std::vector<float> values = light_values(frame);
  const auto file = write_layer(folder, dli_spec(), frame, values);
  EXPECT_EQ(file, folder / "dli-01.tif");
  EXPECT_EQ(folder.names(), std::vector<std::string>{"dli-01.tif"});
  const Grid<float> back = read_layer(file, {0, 0, frame.columns, frame.rows});
  EXPECT_EQ(back.frame().west, frame.west);
  EXPECT_EQ(back.frame().north, frame.north);
  EXPECT_EQ(back.frame().cell_m, frame.cell_m);
  EXPECT_EQ(back.frame().crs_wkt, frame.crs_wkt);
  for (std::size_t i = 0; i < values.size(); ++i) {
    const float found = back.values()[i];
    ASSERT_EQ(std::isnan(found), std::isnan(values[i])) << i;
    if (std::isnan(found)) continue;
    ASSERT_LE(std::abs(found - values[i]), kQuantum / 2.0) << i;
    ASSERT_EQ(found * 128.0F, std::round(found * 128.0F)) << i;
  }
}

TEST(LayerWriter, WithoutQuantumEveryBitStays) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(300, 200);
  const std::vector<float> values = light_values(frame);
  LayerSpec spec = dli_spec();
  spec.quantum = 0.0;
  const Grid<float> back =
      read_layer(write_layer(folder, spec, frame, values), {0, 0, frame.columns, frame.rows});
  for (std::size_t i = 0; i < values.size(); ++i) {
    if (std::isnan(values[i])) continue;
    ASSERT_EQ(back.values()[i], values[i]);
  }
}

TEST(LayerWriter, ReadsWindows) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(600, 600, 2.0);
  const auto file = write_layer(folder, dli_spec(), frame, light_values(frame));
  const Grid<float> whole = read_layer(file, {0, 0, 600, 600});
  const Grid<float> part = read_layer(file, {500, 510, 60, 50});
  EXPECT_EQ(part.frame().west, frame.west + 1000.0);
  EXPECT_EQ(part.frame().north, frame.north - 1020.0);
  for (int row = 0; row < 50; ++row) {
    for (int column = 0; column < 60; ++column) {
      const float expected = whole.at(column + 500, row + 510);
      if (std::isnan(expected)) continue;
      ASSERT_EQ(part.at(column, row), expected);
    }
  }
  refusal(ErrorKind::internal, [&] { read_layer(file, {590, 0, 20, 20}); });
}

TEST(LayerWriter, SaysWhatItIs) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(700, 600);
  const std::vector<float> values = light_values(frame);
  const auto dataset = open_file(write_layer(folder, dli_spec(), frame, values));
  ASSERT_NE(dataset, nullptr);
  GDALRasterBand& band = *dataset->GetRasterBand(1);
  EXPECT_EQ(dataset->GetRasterCount(), 1);
  EXPECT_EQ(band.GetRasterDataType(), GDT_Float32);
  EXPECT_EQ(band.GetNoDataValue(), -9999.0);
  EXPECT_STREQ(band.GetUnitType(), "mol m-2 d-1");
  EXPECT_STREQ(band.GetDescription(), "Daily light integral, January");
  EXPECT_STREQ(dataset->GetMetadataItem("AREA_OR_POINT"), "Area");
  EXPECT_STREQ(dataset->GetMetadataItem("SOURCE_NOTE"), "a test");
  EXPECT_STREQ(dataset->GetMetadataItem("ROUNDED_TO"), "0.0078125");
  EXPECT_STREQ(dataset->GetMetadataItem("COMPRESSION", "IMAGE_STRUCTURE"), "DEFLATE");
  EXPECT_STREQ(dataset->GetMetadataItem("PREDICTOR", "IMAGE_STRUCTURE"), "2");
  EXPECT_STREQ(dataset->GetSpatialRef()->GetAuthorityCode(nullptr), "32631");
}

// GDAL's own statistics of the finished file are the judge. They are printed with 14 digits.
TEST(LayerWriter, StatisticsAgreeWithGdal) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(700, 600);
  const auto dataset = open_file(write_layer(folder, dli_spec(), frame, light_values(frame)));
  GDALRasterBand& band = *dataset->GetRasterBand(1);
  double least = 0.0;
  double most = 0.0;
  double mean = 0.0;
  double deviation = 0.0;
  ASSERT_EQ(band.ComputeStatistics(FALSE, &least, &most, &mean, &deviation, nullptr, nullptr), CE_None);
  const auto dataset_again = open_file(folder / "dli-01.tif");
  GDALRasterBand& written = *dataset_again->GetRasterBand(1);
  const auto item = [&](const char* key) { return std::stod(written.GetMetadataItem(key)); };
  EXPECT_EQ(item("STATISTICS_MINIMUM"), least);
  EXPECT_EQ(item("STATISTICS_MAXIMUM"), most);
  EXPECT_NEAR(item("STATISTICS_MEAN"), mean, 1e-11);
  EXPECT_NEAR(item("STATISTICS_STDDEV"), deviation, 1e-11);
  EXPECT_NEAR(item("STATISTICS_VALID_PERCENT"), std::stod(band.GetMetadataItem("STATISTICS_VALID_PERCENT")),
              0.01);
}

// The rules that make a GeoTIFF cloud optimized: tiles; directories first, the full image's before
// the overviews'; pixels in the opposite order, smallest overview first.
TEST(LayerWriter, IsACloudOptimizedGeoTiff) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(2100, 1300);
  const auto dataset = open_file(write_layer(folder, dli_spec(), frame, light_values(frame)));
  EXPECT_STREQ(dataset->GetMetadataItem("LAYOUT", "IMAGE_STRUCTURE"), "COG");
  std::vector<GDALRasterBand*> bands{dataset->GetRasterBand(1)};
  for (int i = 0; i < bands[0]->GetOverviewCount(); ++i) bands.push_back(bands[0]->GetOverview(i));
  ASSERT_EQ(bands.size(), 4U);  // 2100, 1050, 525, 262: until one tile holds all
  const auto number = [](GDALRasterBand* band, const char* key) {
    const char* text = band->GetMetadataItem(key, "TIFF");
    return text != nullptr ? std::stoull(text) : 0ULL;
  };
  const unsigned long long first_data = number(bands.back(), "BLOCK_OFFSET_0_0");
  for (std::size_t i = 0; i < bands.size(); ++i) {
    int columns = 0;
    int rows = 0;
    bands[i]->GetBlockSize(&columns, &rows);
    EXPECT_EQ(columns, 512);
    EXPECT_EQ(rows, 512);
    EXPECT_LT(number(bands[i], "IFD_OFFSET"), first_data);
    if (i == 0) continue;
    EXPECT_LT(number(bands[i - 1], "IFD_OFFSET"), number(bands[i], "IFD_OFFSET"));
    EXPECT_GT(number(bands[i - 1], "BLOCK_OFFSET_0_0"), number(bands[i], "BLOCK_OFFSET_0_0"));
  }
}

// Light of 2 and 30 with holes, in patches: overviews hold nothing darker than 2, brighter than 30,
// or mixed with nodata.
TEST(LayerWriter, OverviewsNeitherBleedNorOvershoot) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(1030, 1030);
  std::vector<float> values(frame.size());
  for (std::size_t i = 0; i < values.size(); ++i) {
    values[i] = i % 5 == 0 ? kMissing : (i / 9 % 2 == 0 ? 2.0F : 30.0F);
  }
  const auto dataset = open_file(write_layer(folder, dli_spec(), frame, values));
  GDALRasterBand& band = *dataset->GetRasterBand(1);
  ASSERT_GT(band.GetOverviewCount(), 0);
  for (int i = 0; i < band.GetOverviewCount(); ++i) {
    GDALRasterBand& overview = *band.GetOverview(i);
    std::vector<float> seen(static_cast<std::size_t>(overview.GetXSize()) * overview.GetYSize());
    ASSERT_EQ(overview.RasterIO(GF_Read, 0, 0, overview.GetXSize(), overview.GetYSize(), seen.data(),
                                overview.GetXSize(), overview.GetYSize(), GDT_Float32, 0, 0, nullptr),
              CE_None);
    for (const float value : seen)
      ASSERT_TRUE((value >= 2.0F && value <= 30.0F) || value == -9999.0F) << value;
  }
}

TEST(LayerWriter, OverviewsOfClassesHoldOnlyClasses) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(1030, 1030);
  std::vector<float> values(frame.size());
  for (std::size_t i = 0; i < values.size(); ++i) values[i] = i % 7 < 3 ? 1.0F : 12.0F;
  LayerSpec spec = dli_spec("dli-lowest-month.tif");
  spec.integers = true;
  spec.quantum = 1.0;
  const auto file = write_layer(folder, spec, frame, values);
  for (const float value : read_preview(file, 300).values())
    ASSERT_TRUE(value == 1.0F || value == 12.0F) << value;
}

// 1024 = 4 × 256, so each preview cell is the mean of a block of 4 × 4.
TEST(LayerWriter, PreviewsAreMeans) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(1024, 768, 0.5);
  std::vector<float> values = light_values(frame);
  const auto file = write_layer(folder, dli_spec(), frame, values);
  const Grid<float> whole = read_layer(file, {0, 0, 1024, 768});
  const Grid<float> preview = read_preview(file, 256);
  ASSERT_EQ(preview.columns(), 256);
  ASSERT_EQ(preview.rows(), 192);
  EXPECT_EQ(preview.frame().cell_m, 2.0);
  for (int row = 0; row < 192; ++row) {
    for (int column = 0; column < 256; ++column) {
      // Overviews average twice, each time over the cells that are there; so a missing cell of a
      // 2 × 2 block counts its neighbours more.
      double sum = 0.0;
      for (int quarter = 0; quarter < 4; ++quarter) {
        double part = 0.0;
        int count = 0;
        for (int cell = 0; cell < 4; ++cell) {
          const float value =
              whole.at(4 * column + 2 * (quarter % 2) + cell % 2, 4 * row + 2 * (quarter / 2) + cell / 2);
          if (std::isnan(value)) continue;
          part += value;
          ++count;
        }
        sum += part / count;  // no 2 × 2 block is wholly missing here
      }
      ASSERT_NEAR(preview.at(column, row), sum / 4.0, 1e-5) << column << ' ' << row;
    }
  }
}

TEST(LayerWriter, SmallLayersAreTheirOwnPreview) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(30, 20);
  const auto file = write_layer(folder, dli_spec(), frame, light_values(frame));
  const Grid<float> preview = read_preview(file, 800);
  EXPECT_EQ(preview.columns(), 30);
  EXPECT_EQ(preview.rows(), 20);
  EXPECT_EQ(preview.frame().cell_m, 1.0);
}

TEST(LayerWriter, AllMissingAndOneCell) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(40, 30);
  const auto file = write_layer(folder, dli_spec(), frame, std::vector<float>(frame.size(), kMissing));
  for (const float value : read_layer(file, {0, 0, 40, 30}).values()) ASSERT_TRUE(std::isnan(value));
  const GridFrame one = utm_frame(1, 1);
  EXPECT_EQ(read_layer(write_layer(folder, dli_spec(), one, {2.5F}), {0, 0, 1, 1}).at(0, 0), 2.5F);
}

TEST(LayerWriter, ALocalPlaneNeedsNoCrs) {
  const TempFolder folder;
  GridFrame frame = utm_frame(40, 30);
  frame.crs_wkt.clear();
  const auto file = write_layer(folder, dli_spec(), frame, light_values(frame));
  EXPECT_EQ(read_layer(file, {0, 0, 1, 1}).frame().crs_wkt, "");
}

// Neither the order nor the size of tiles may show, nor that other layers are written at once.
TEST(LayerWriter, TheSameBytesHoweverItWasWritten) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(1300, 900);
  const std::vector<float> values = light_values(frame);
  const std::string expected = content_of(write_layer(folder, dli_spec("one.tif"), frame, values));
  std::vector<std::thread> threads;
  for (int i = 0; i < 4; ++i) {
    threads.emplace_back([&, i] {
      LayerWriter writer(folder.path(), dli_spec("layer-" + std::to_string(i) + ".tif"), frame);
      write_tiles(writer, frame, values, 100 + 77 * i, i % 2 == 1);
      writer.finish();
    });
  }
  for (std::thread& thread : threads) thread.join();
  for (int i = 0; i < 4; ++i) {
    EXPECT_TRUE(content_of(folder / ("layer-" + std::to_string(i) + ".tif")) == expected) << i;
  }
}

TEST(LayerWriter, NewerLayersReplaceOlder) {
  const TempFolder folder;
  const GridFrame frame = utm_frame(10, 10);
  write_layer(folder, dli_spec(), frame, std::vector<float>(100, 1.0F));
  const auto file = write_layer(folder, dli_spec(), frame, std::vector<float>(100, 2.0F));
  EXPECT_EQ(read_layer(file, {0, 0, 10, 10}).at(5, 5), 2.0F);
}

TEST(LayerWriter, VersionsNameTheLibraries) {
  EXPECT_THAT(geo_versions(), testing::MatchesRegex("GDAL [0-9.]+.*, PROJ [0-9.]+ \\(database .*[0-9].*\\)"));
}

}  // namespace
}  // namespace sunfall::test

#include "geo/open_dataset.h"

#include <unistd.h>

#include <cstdint>
#include <string_view>

#include <fmt/format.h>

#include "geo/gdal_guard.h"
#include "geo/layer_writer.h"

namespace sunfall {
namespace {

// 40 000 million cells: a whole county at 0.3 m. Anything beyond is a broken or hostile header.
constexpr double kMostCells = 4e10;
// GDAL decodes a compressed block as a whole, so one block must fit into memory.
constexpr double kLargestBlock_bytes = 1024.0 * 1024.0 * 1024.0;

GDALDatasetUniquePtr open_with(const std::string& file, unsigned flags, const char* const* drivers,
                               const char* const* options) {
  return GDALDatasetUniquePtr(
      GDALDataset::Open(file.c_str(), flags | GDAL_OF_READONLY | GDAL_OF_VERBOSE_ERROR, drivers, options));
}

std::string size_text(const GDALDataset& dataset) {
  auto& open = const_cast<GDALDataset&>(dataset);
  return fmt::format("{} columns x {} rows", open.GetRasterXSize(), open.GetRasterYSize());
}

void check_band(GDALDataset& dataset, const std::string& where) {
  if (dataset.GetRasterCount() != 1) {
    throw Error(ErrorKind::data,
                {"the raster must hold one band", where, fmt::format("{} bands", dataset.GetRasterCount()),
                 "Take the band of heights out with: gdal_translate -b 1 IN.tif OUT.tif"});
  }
  const GDALDataType type = dataset.GetRasterBand(1)->GetRasterDataType();
  if (GDALDataTypeIsComplex(type)) {
    throw Error(ErrorKind::data, {"the raster holds complex numbers", where, GDALGetDataTypeName(type),
                                  "Give a raster of heights in metres"});
  }
}

void check_size(GDALDataset& dataset, const std::string& where) {
  const double cells = static_cast<double>(dataset.GetRasterXSize()) * dataset.GetRasterYSize();
  if (cells < 1.0 || cells > kMostCells) {
    throw Error(ErrorKind::data, {"the raster's size is not believable", where, size_text(dataset),
                                  "Check the file, or cut out the part that you need"});
  }
  int block_columns = 0;
  int block_rows = 0;
  GDALRasterBand& band = *dataset.GetRasterBand(1);
  band.GetBlockSize(&block_columns, &block_rows);
  const double block_bytes =
      static_cast<double>(block_columns) * block_rows * GDALGetDataTypeSizeBytes(band.GetRasterDataType());
  if (block_bytes > kLargestBlock_bytes) {
    throw Error(ErrorKind::data, {"the raster is stored in blocks too large to read", where,
                                  fmt::format("{} x {} cells a block", block_columns, block_rows),
                                  "Store it in tiles: gdal_translate -co TILED=YES IN.tif OUT.tif"});
  }
}

// Bits that a cell takes at least in a file of this kind; 0 where compression leaves it open.
double least_bits_per_cell(GDALDataset& dataset) {
  const std::string_view driver = dataset.GetDriverName();
  if (driver == "AAIGrid") return 16.0;  // a digit and a separator
  if (dataset.GetMetadataItem("COMPRESSION", "IMAGE_STRUCTURE") != nullptr) return 0.0;
  GDALRasterBand& band = *dataset.GetRasterBand(1);
  const char* bits = band.GetMetadataItem("NBITS", "IMAGE_STRUCTURE");
  return bits != nullptr ? std::stod(bits) : GDALGetDataTypeSizeBits(band.GetRasterDataType());
}

// A header that promises more than the file holds: cut short, or made to exhaust memory.
void check_file_length(GDALDataset& dataset, const std::string& file, const std::string& where) {
  const double cells = static_cast<double>(dataset.GetRasterXSize()) * dataset.GetRasterYSize();
  const double least_bytes = (cells * least_bits_per_cell(dataset) - 8.0) / 8.0;
  const auto bytes = static_cast<double>(std::filesystem::file_size(file));
  if (bytes < least_bytes) {
    throw Error(ErrorKind::data,
                {"the file is shorter than its header says", where,
                 fmt::format("{} in {} bytes", size_text(dataset), bytes),
                 "Copy it again whole; a sparse file must be filled: gdal_translate IN.tif OUT.tif"});
  }
}

}  // namespace

std::string checked_file(const std::filesystem::path& file, const std::string& where) {
  std::error_code fault;
  const std::string absolute = std::filesystem::absolute(file, fault).string();
  if (fault || absolute.starts_with("/vsi")) {
    throw Error(ErrorKind::data, {"only plain files are read", where, file.string(),
                                  "Give the path of a file on this machine"});
  }
  if (!std::filesystem::exists(absolute, fault)) {
    throw Error(ErrorKind::data, {"there is no such file", where, file.string(),
                                  "Check the path; it is relative to the plan"});
  }
  if (!std::filesystem::is_regular_file(absolute, fault)) {
    throw Error(ErrorKind::data, {"this is not a file", where, file.string(), "Give the path of a file"});
  }
  if (access(absolute.c_str(), R_OK) != 0) {
    throw Error(ErrorKind::io, {"the file may not be read", where, file.string(), "Check its permissions"});
  }
  return absolute;
}

GDALDatasetUniquePtr open_raster(const std::filesystem::path& file, const std::string& where) {
  start_geo();
  const std::string absolute = checked_file(file, where);
  GdalGuard guard;
  static constexpr const char* kDrivers[] = {"GTiff", "AAIGrid", nullptr};
  // A world file or .tab beside a GeoTIFF could move it; only what the file itself says counts.
  static constexpr const char* kOptions[] = {"GEOREF_SOURCES=INTERNAL", nullptr};
  GDALDatasetUniquePtr dataset = open_with(absolute, GDAL_OF_RASTER, kDrivers, kOptions);
  if (!dataset) {
    guard.fail(ErrorKind::data, "this is not a raster that can be read", where,
               "Give a GeoTIFF or an ASCII grid");
  }
  check_band(*dataset, where);
  check_size(*dataset, where);
  check_file_length(*dataset, absolute, where);
  return dataset;
}

GDALDatasetUniquePtr open_vector(const std::filesystem::path& file, const std::string& where) {
  start_geo();
  const std::string absolute = checked_file(file, where);
  GdalGuard guard;
  static constexpr const char* kDrivers[] = {"GPKG", "ESRI Shapefile", "GeoJSON", "FlatGeobuf", nullptr};
  GDALDatasetUniquePtr dataset = open_with(absolute, GDAL_OF_VECTOR, kDrivers, nullptr);
  if (!dataset) {
    guard.fail(ErrorKind::data, "this is not a vector file that can be read", where,
               "Give a GeoPackage, GeoJSON, FlatGeobuf or shapefile");
  }
  return dataset;
}

}  // namespace sunfall

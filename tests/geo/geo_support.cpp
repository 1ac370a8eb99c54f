#include "geo/geo_support.h"

#include <cpl_conv.h>
#include <cpl_string.h>
#include <ogr_spatialref.h>

#include <algorithm>
#include <fstream>
#include <iterator>
#include <numeric>

#include "geo/layer_writer.h"

namespace sunfall::test {

namespace fs = std::filesystem;

TempFolder::TempFolder() {
  start_geo();
  std::string pattern = (fs::path(testing::TempDir()) / "sunfall-geo-XXXXXX").string();
  if (::mkdtemp(pattern.data()) == nullptr) throw std::runtime_error("no temporary folder");
  path_ = pattern;
}

TempFolder::~TempFolder() {
  std::error_code ignored;
  fs::remove_all(path_, ignored);
}

std::vector<std::string> TempFolder::names() const {
  std::vector<std::string> names;
  for (const auto& entry : fs::directory_iterator(path_)) names.push_back(entry.path().filename().string());
  std::sort(names.begin(), names.end());
  return names;
}

std::string wkt(const std::string& crs) {
  OGRSpatialReference reference;
  if (reference.SetFromUserInput(crs.c_str()) != OGRERR_NONE) throw std::runtime_error("bad CRS " + crs);
  char* text = nullptr;
  const char* const options[] = {"FORMAT=WKT2_2019", nullptr};
  reference.exportToWkt(&text, options);
  std::string result = text;
  CPLFree(text);
  return result;
}

std::string content_of(const fs::path& file) {
  std::ifstream in(file, std::ios::binary);
  return {std::istreambuf_iterator<char>(in), {}};
}

void write_text(const fs::path& file, const std::string& text) {
  std::ofstream(file, std::ios::binary) << text;
}

void make_raster(const fs::path& file, const RasterOrder& order) {
  start_geo();
  CPLStringList creation;
  for (const std::string& option : order.creation) creation.AddString(option.c_str());
  auto* driver = GetGDALDriverManager()->GetDriverByName("GTiff");
  GDALDatasetUniquePtr dataset(
      driver->Create(file.c_str(), order.columns, order.rows, order.bands, order.type, creation.List()));
  ASSERT_NE(dataset, nullptr);
  if (!order.crs.empty()) {
    OGRSpatialReference crs;
    ASSERT_EQ(crs.SetFromUserInput(order.crs.c_str()), OGRERR_NONE);
    dataset->SetSpatialRef(&crs);
  }
  if (order.with_transform) {
    auto transform = order.transform;
    dataset->SetGeoTransform(transform.data());
  }
  GDALRasterBand& band = *dataset->GetRasterBand(1);
  if (order.nodata) band.SetNoDataValue(*order.nodata);
  if (order.scale) band.SetScale(*order.scale);
  if (order.offset) band.SetOffset(*order.offset);
  if (!order.unit.empty()) band.SetUnitType(order.unit.c_str());
  std::vector<double> values = order.values;
  if (values.empty()) {
    values.resize(static_cast<std::size_t>(order.columns) * order.rows);
    std::iota(values.begin(), values.end(), 1.0);
  }
  ASSERT_EQ(band.RasterIO(GF_Write, 0, 0, order.columns, order.rows, values.data(), order.columns, order.rows,
                          GDT_Float64, 0, 0, nullptr),
            CE_None);
}

Error::Parts refusal(ErrorKind kind, const std::function<void()>& action) {
  try {
    action();
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), kind) << error.what();
    return error.parts();
  }
  ADD_FAILURE() << "nothing was refused";
  return {};
}

GridFrame utm_frame(int columns, int rows, double cell_m) {
  return {columns, rows, 600000.0, 5800000.0, cell_m, wkt("EPSG:32631")};
}

}  // namespace sunfall::test

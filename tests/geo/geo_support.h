#pragma once
// What the tests of geo share: a folder that goes away, rasters made to order, errors taken apart.

#include <gdal_priv.h>
#include <gtest/gtest.h>

#include <array>
#include <filesystem>
#include <functional>
#include <optional>
#include <string>
#include <vector>

#include "sunfall/error.h"
#include "sunfall/grid.h"

namespace sunfall::test {

class TempFolder {
 public:
  TempFolder();
  ~TempFolder();
  TempFolder(const TempFolder&) = delete;
  TempFolder& operator=(const TempFolder&) = delete;
  const std::filesystem::path& path() const { return path_; }
  std::filesystem::path operator/(const std::string& name) const { return path_ / name; }
  std::vector<std::string> names() const;  // hidden ones too, sorted

 private:
  std::filesystem::path path_;
};

std::string wkt(const std::string& crs);  // "EPSG:32631" or anything that GDAL understands
std::string content_of(const std::filesystem::path& file);
void write_text(const std::filesystem::path& file, const std::string& text);

// A GeoTIFF to order; the defaults make a good raster.
struct RasterOrder {
  int columns = 4;
  int rows = 3;
  int bands = 1;
  GDALDataType type = GDT_Float32;
  std::string crs = "EPSG:32631";  // empty: none
  std::array<double, 6> transform{600000.0, 10.0, 0.0, 5800000.0, 0.0, -10.0};
  bool with_transform = true;
  std::optional<double> nodata;
  std::optional<double> scale;
  std::optional<double> offset;
  std::string unit;
  std::vector<std::string> creation;  // "TILED=YES"
  std::vector<double> values;         // row by row; empty: 1, 2, 3 …
};
void make_raster(const std::filesystem::path& file, const RasterOrder& order);

// The error that `action` must throw, of the given kind.
Error::Parts refusal(ErrorKind kind, const std::function<void()>& action);

GridFrame utm_frame(int columns, int rows, double cell_m = 1.0);

}  // namespace sunfall::test

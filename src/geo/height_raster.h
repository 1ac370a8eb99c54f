#pragma once
// Heights out of an opened raster: stored numbers decoded, missing cells marked, absurd values
// refused. Says nothing of the grid's shape or CRS (raster_source.h does). Private to geo.

#include <gdal_priv.h>

#include <array>
#include <filesystem>
#include <optional>
#include <string>

#include "geo/raster_meaning.h"
#include "sunfall/grid.h"

namespace sunfall {

// How the band's stored numbers become heights in metres.
struct HeightCoding {
  std::optional<double> nodata;  // as stored; NaN when NaN marks missing cells
  double scale = 1.0;
  double offset_m = 0.0;
};

class HeightRaster {
 public:
  // Throws Error(data) where the file is no single-band raster of heights in metres (or what else is meant).
  HeightRaster(const std::filesystem::path& file, const std::string& role,
               RasterMeaning meaning = RasterMeaning::height());

  int columns() const { return dataset_->GetRasterXSize(); }
  int rows() const { return dataset_->GetRasterYSize(); }
  // The plane part of the CRS, east first, where the file (or an ASCII grid's .prj) gives one.
  const std::optional<OGRSpatialReference>& crs() const { return crs_; }
  // The affine transform from (column, row) to the map, where the file has one.
  const std::optional<std::array<double, 6>>& transform() const { return transform_; }
  // For what needs both: throws Error(data) unless the file says where on the map it lies.
  void require_place() const;
  // "ground.tif (ground)", for messages.
  const std::string& where() const { return where_; }

  // Heights of a window that lies inside the raster, `stride` floats from row to row. Throws
  // Error(data) at the first height that is not believable, Error(io) when reading fails.
  void read(const CellWindow& window, float* heights, std::size_t stride) const;

 private:
  template <typename Stored>
  void read_as(const CellWindow& window, float* heights, std::size_t stride) const;
  template <typename Stored>
  void fetch(const CellWindow& window, Stored* values, std::size_t stride) const;
  void apply_mask(const CellWindow& window, float* heights, std::size_t stride) const;
  [[noreturn]] void refuse(CellIndex cell, double height_m) const;

  std::string where_;
  RasterMeaning meaning_;
  GDALDatasetUniquePtr dataset_;
  GDALRasterBand* band_;
  HeightCoding coding_;
  std::optional<OGRSpatialReference> crs_;
  std::optional<std::array<double, 6>> transform_;
};

std::string raster_where(const std::filesystem::path& file, const std::string& role);

}  // namespace sunfall

#pragma once
// A raster for GDAL's algorithms whose values come from a function, block by block. So a warp or a
// copy reads through our own checks, and never needs the whole raster in memory. Private to geo.

#include <gdal_priv.h>

#include <array>
#include <exception>
#include <functional>
#include <string>

#include "sunfall/grid.h"

namespace sunfall {

struct LazyRasterSpec {
  int columns = 0;
  int rows = 0;
  std::array<double, 6> transform{};  // GDAL's: west, cell, 0, north, 0, -cell for a plain grid
  OGRSpatialReference crs;
  double nodata = 0.0;
  std::string unit;
  // Fills `values` with the window's values, `stride` floats from row to row. May throw.
  std::function<void(const CellWindow& window, float* values, int stride)> read;
};

// One band of Float32. For one thread at a time.
class LazyRaster : public GDALDataset {
 public:
  explicit LazyRaster(LazyRasterSpec spec);

  CPLErr GetGeoTransform(double* transform) override;
  const OGRSpatialReference* GetSpatialRef() const override { return &spec_.crs; }

  // GDAL sees a thrown exception as a failed read; this throws it again once GDAL has returned.
  void rethrow() const {
    if (fault_) std::rethrow_exception(fault_);
  }

 private:
  friend class LazyBand;
  LazyRasterSpec spec_;
  std::exception_ptr fault_;
};

}  // namespace sunfall

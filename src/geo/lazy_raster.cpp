#include "geo/lazy_raster.h"

#include <algorithm>
#include <utility>

namespace sunfall {

namespace {
constexpr int kBlock = 512;
}

class LazyBand : public GDALRasterBand {
 public:
  LazyBand(LazyRaster* raster, const LazyRasterSpec& spec) : raster_(raster), spec_(spec) {
    poDS = raster;
    nBand = 1;
    eDataType = GDT_Float32;
    nRasterXSize = spec.columns;
    nRasterYSize = spec.rows;
    nBlockXSize = kBlock;
    nBlockYSize = kBlock;
  }

  double GetNoDataValue(int* present) override {
    if (present != nullptr) *present = TRUE;
    return spec_.nodata;
  }
  const char* GetUnitType() override { return spec_.unit.c_str(); }

 protected:
  CPLErr IReadBlock(int block_column, int block_row, void* image) override {
    const int column = block_column * kBlock;
    const int row = block_row * kBlock;
    const CellWindow window{column, row, std::min(kBlock, spec_.columns - column),
                            std::min(kBlock, spec_.rows - row)};
    try {
      spec_.read(window, static_cast<float*>(image), kBlock);
      return CE_None;
    } catch (...) {
      raster_->fault_ = std::current_exception();
      return CE_Failure;
    }
  }

 private:
  LazyRaster* raster_;
  const LazyRasterSpec& spec_;
};

LazyRaster::LazyRaster(LazyRasterSpec spec) : spec_(std::move(spec)) {
  nRasterXSize = spec_.columns;
  nRasterYSize = spec_.rows;
  eAccess = GA_ReadOnly;
  SetBand(1, new LazyBand(this, spec_));
}

CPLErr LazyRaster::GetGeoTransform(double* transform) {
  std::copy(spec_.transform.begin(), spec_.transform.end(), transform);
  return CE_None;
}

}  // namespace sunfall

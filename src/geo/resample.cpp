// Rasters on another grid, by GDAL's warper with everything fixed that would let its answer depend
// on memory or on approximation.

#include <cpl_string.h>
#include <gdal_alg.h>
#include <gdalwarper.h>

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "geo/height_raster.h"
#include "geo/lazy_raster.h"
#include "geo/raster_source.h"

namespace sunfall {
namespace {

// Chunks of the warp. Its size has no influence on values once the scale is fixed.
constexpr double kWarpMemory_bytes = 256.0 * 1024 * 1024;

struct DestroyTransformer {
  void operator()(void* transformer) const { GDALDestroyGenImgProjTransformer(transformer); }
};
using Transformer = std::unique_ptr<void, DestroyTransformer>;

struct DestroyWarpOptions {
  void operator()(GDALWarpOptions* options) const { GDALDestroyWarpOptions(options); }
};
using WarpOptions = std::unique_ptr<GDALWarpOptions, DestroyWarpOptions>;

std::unique_ptr<LazyRaster> checked_source(const HeightRaster& raster) {
  raster.require_place();
  LazyRasterSpec spec;
  spec.columns = raster.columns();
  spec.rows = raster.rows();
  spec.transform = *raster.transform();
  spec.crs = *raster.crs();
  spec.nodata = kMissing;
  spec.read = [&raster](const CellWindow& window, float* values, int stride) {
    raster.read(window, values, static_cast<std::size_t>(stride));
  };
  return std::make_unique<LazyRaster>(std::move(spec));
}

// The target grid as a dataset whose cells are those of `grid`.
GDALDatasetUniquePtr target_dataset(Grid<float>& grid) {
  const GridFrame& frame = grid.frame();
  auto* driver = GetGDALDriverManager()->GetDriverByName("MEM");
  GDALDatasetUniquePtr dataset(driver->Create("", frame.columns, frame.rows, 0, GDT_Float32, nullptr));
  if (!dataset) return dataset;
  char address[64] = {};
  CPLPrintPointer(address, grid.values().data(), sizeof(address) - 1);
  CPLStringList options;
  options.SetNameValue("DATAPOINTER", address);
  if (dataset->AddBand(GDT_Float32, options.List()) != CE_None) return nullptr;
  double transform[] = {frame.west, frame.cell_m, 0.0, frame.north, 0.0, -frame.cell_m};
  dataset->SetGeoTransform(transform);
  const OGRSpatialReference crs = crs_from_wkt(frame.crs_wkt);
  dataset->SetSpatialRef(&crs);
  return dataset;
}

struct Scale {
  double x = 1.0;
  double y = 1.0;
};

// Target cells per source cell along each axis at the middle of the target, at most 1: where the
// target is coarser, the bilinear kernel widens to average what falls into a cell.
Scale scale_at_middle(void* transformer, const GridFrame& frame) {
  const double column = 0.5 * frame.columns;
  const double row = 0.5 * frame.rows;
  double x[] = {column, column + 1.0, column};
  double y[] = {row, row, row + 1.0};
  double z[] = {0.0, 0.0, 0.0};
  int done[] = {0, 0, 0};
  if (GDALGenImgProjTransform(transformer, TRUE, 3, x, y, z, done) == 0 || !done[0] || !done[1] || !done[2])
    return {};
  const double columns_per_column = std::hypot(x[1] - x[0], y[1] - y[0]);
  const double rows_per_row = std::hypot(x[2] - x[0], y[2] - y[0]);
  return {1.0 / std::max(1.0, columns_per_column), 1.0 / std::max(1.0, rows_per_row)};
}

WarpOptions warp_options(GDALDataset& source, GDALDataset& target, void* transformer, Scale scale) {
  WarpOptions options(GDALCreateWarpOptions());
  options->hSrcDS = GDALDataset::ToHandle(&source);
  options->hDstDS = GDALDataset::ToHandle(&target);
  options->eResampleAlg = GRA_Bilinear;
  options->eWorkingDataType = GDT_Float32;
  options->dfWarpMemoryLimit = kWarpMemory_bytes;
  options->pfnTransformer = GDALGenImgProjTransform;  // exact; gdalwarp would approximate it
  options->pTransformerArg = transformer;
  GDALWarpInitDefaultBandMapping(options.get(), 1);
  GDALWarpInitSrcNoDataReal(options.get(), kMissing);
  GDALWarpInitDstNoDataReal(options.get(), kMissing);
  CPLStringList extra;
  extra.SetNameValue("INIT_DEST", "nan");
  extra.SetNameValue("NUM_THREADS", "1");
  extra.SetNameValue("XSCALE", fmt::format("{}", scale.x).c_str());
  extra.SetNameValue("YSCALE", fmt::format("{}", scale.y).c_str());
  options->papszWarpOptions = extra.StealList();
  return options;
}

}  // namespace

Grid<float> resample(const std::filesystem::path& source, const std::string& role, const GridFrame& frame) {
  const HeightRaster raster(source, role);
  GdalGuard guard;
  const std::unique_ptr<LazyRaster> from = checked_source(raster);
  Grid<float> grid(frame, kMissing);
  const GDALDatasetUniquePtr to = target_dataset(grid);
  const auto give_up = [&] {
    from->rethrow();
    guard.fail(ErrorKind::data, "the raster cannot be carried to the ground's grid", raster.where(),
               "Project it to the CRS of ground with gdalwarp");
  };
  if (!to) give_up();
  const Transformer transformer(GDALCreateGenImgProjTransformer2(GDALDataset::ToHandle(from.get()),
                                                                 GDALDataset::ToHandle(to.get()), nullptr));
  if (!transformer) give_up();
  const WarpOptions options =
      warp_options(*from, *to, transformer.get(), scale_at_middle(transformer.get(), frame));
  GDALWarpOperation warp;
  if (warp.Initialize(options.get()) != CE_None) give_up();
  if (warp.ChunkAndWarpImage(0, 0, frame.columns, frame.rows) != CE_None) give_up();
  return grid;
}

}  // namespace sunfall

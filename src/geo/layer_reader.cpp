// Reading back the layers that layer_writer.cpp wrote.

#include <algorithm>
#include <cmath>
#include <string_view>

#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "geo/layer_values.h"
#include "geo/layer_writer.h"

namespace sunfall {
namespace {

GridFrame frame_of(GDALDataset& dataset) {
  double transform[6] = {0.0, 1.0, 0.0, 0.0, 0.0, -1.0};
  dataset.GetGeoTransform(transform);
  const OGRSpatialReference* crs = dataset.GetSpatialRef();
  return {dataset.GetRasterXSize(),
          dataset.GetRasterYSize(),
          transform[0],
          transform[3],
          transform[1],
          crs != nullptr ? wkt_of(*crs) : std::string()};
}

bool holds_classes(GDALDataset& dataset) {
  const char* values = dataset.GetMetadataItem(kValuesKey);
  return values != nullptr && std::string_view(values) == kClassValues;
}

// Reads `window` of the layer into the whole of `grid`, whatever their sizes.
void read_into(GDALDataset& dataset, const CellWindow& window, GDALRIOResampleAlg method, Grid<float>& grid,
               const std::string& where) {
  GdalGuard guard;
  GDALRasterIOExtraArg extra;
  INIT_RASTERIO_EXTRA_ARG(extra);
  extra.eResampleAlg = method;
  if (dataset.GetRasterBand(1)->RasterIO(GF_Read, window.column, window.row, window.columns, window.rows,
                                         grid.values().data(), grid.columns(), grid.rows(), GDT_Float32, 0, 0,
                                         &extra) != CE_None) {
    guard.fail(ErrorKind::io, "the layer cannot be read", where,
               "Run the map again; the file may be damaged");
  }
  for (float& value : grid.values()) {
    if (value == kLayerNodata) value = kMissing;
  }
}

}  // namespace

GDALDatasetUniquePtr open_layer(const std::filesystem::path& layer) {
  start_geo();
  GdalGuard guard;
  static constexpr const char* kDrivers[] = {"GTiff", nullptr};
  GDALDatasetUniquePtr dataset(GDALDataset::Open(std::filesystem::absolute(layer).c_str(),
                                                 GDAL_OF_RASTER | GDAL_OF_READONLY | GDAL_OF_VERBOSE_ERROR,
                                                 kDrivers));
  if (!dataset || dataset->GetRasterCount() != 1) {
    guard.fail(ErrorKind::io, "the layer cannot be opened", layer.string(), "Run the map again");
  }
  return dataset;
}

GridFrame layer_frame(const std::filesystem::path& layer) { return frame_of(*open_layer(layer)); }

Grid<float> read_preview(const std::filesystem::path& layer, int largest_side) {
  const GDALDatasetUniquePtr dataset = open_layer(layer);
  const GridFrame whole = frame_of(*dataset);
  const double factor =
      std::max(1.0, static_cast<double>(std::max(whole.columns, whole.rows)) / largest_side);
  GridFrame frame = whole;
  frame.columns = std::max(1, static_cast<int>(std::lround(whole.columns / factor)));
  frame.rows = std::max(1, static_cast<int>(std::lround(whole.rows / factor)));
  frame.cell_m = whole.cell_m * factor;
  Grid<float> preview(frame);
  const GDALRIOResampleAlg method = holds_classes(*dataset) ? GRIORA_NearestNeighbour : GRIORA_Average;
  read_into(*dataset, {0, 0, whole.columns, whole.rows}, method, preview, layer.string());
  return preview;
}

Grid<float> read_layer(const std::filesystem::path& layer, const CellWindow& window) {
  const GDALDatasetUniquePtr dataset = open_layer(layer);
  GridFrame frame = frame_of(*dataset);
  if (window.column < 0 || window.row < 0 || window.columns < 1 || window.rows < 1 ||
      window.column > frame.columns - window.columns || window.row > frame.rows - window.rows) {
    throw Error(ErrorKind::internal, {"a window outside the layer was asked for", layer.string(), "", ""});
  }
  frame.west += window.column * frame.cell_m;
  frame.north -= window.row * frame.cell_m;
  frame.columns = window.columns;
  frame.rows = window.rows;
  Grid<float> grid(frame);
  read_into(*dataset, window, GRIORA_NearestNeighbour, grid, layer.string());
  return grid;
}

}  // namespace sunfall

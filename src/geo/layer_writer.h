#pragma once
// Writing map layers as Cloud Optimized GeoTIFF. A layer appears whole under its final name or
// not at all.

#include <filesystem>
#include <map>
#include <memory>
#include <string>

#include "sunfall/grid.h"

namespace sunfall {

struct LayerSpec {
  std::string file_name;    // "dli-01.tif"
  std::string description;  // band description: "Daily light integral, January"
  std::string unit;         // "mol m-2 d-1"; "1" for shares
  double quantum = 0.0;     // values are rounded to multiples of it; 0 leaves them as they are
  bool integers = false;    // classes or months: overviews by nearest instead of average
  std::map<std::string, std::string> provenance;  // default metadata domain, key to value
};

// Collects one layer's tiles in a nameless temporary file in `folder`, then turns it into the final
// file. Float32, nodata -9999, one band. `write` is for one thread at a time per writer; different
// writers may be used from different threads.
class LayerWriter {
 public:
  LayerWriter(const std::filesystem::path& folder, LayerSpec spec, const GridFrame& frame);
  LayerWriter(LayerWriter&&) noexcept;
  LayerWriter& operator=(LayerWriter&&) noexcept;
  ~LayerWriter();  // a layer that was not finished leaves nothing behind

  const LayerSpec& spec() const;
  // `values` row by row, window.columns × window.rows; missing (NaN) becomes nodata. The window
  // must lie inside the frame, and in the end each cell must have been written exactly once.
  // Throws Error(io).
  void write(const CellWindow& window, const float* values);
  // Statistics, overviews, COG, close, verify by reading back, flush to disk, rename to the final
  // name. Throws Error(io), and then no file stands under the final name.
  void finish();
  const std::filesystem::path& final_path() const;

 private:
  struct State;
  std::unique_ptr<State> state_;
};

// A finished layer, made smaller by averaging so that neither side exceeds `largest_side` cells.
// The frame of the result has the coarser cell size.
Grid<float> read_preview(const std::filesystem::path& layer, int largest_side);
// A window of a finished layer at full resolution, missing where nodata.
Grid<float> read_layer(const std::filesystem::path& layer, const CellWindow& window);

// Where a finished layer lies.
GridFrame layer_frame(const std::filesystem::path& layer);

// Once per process, before any other use: registers only the drivers that Sunfall needs, closes
// off the network and side-car files. Safe to call again.
void start_geo();
// "GDAL 3.6.2, PROJ 9.1.1 (database 10.076)" for provenance.
std::string geo_versions();

}  // namespace sunfall

#pragma once
// Reading rasters. Everything that GDAL says wrong becomes one Error here.

#include <filesystem>
#include <memory>
#include <string>

#include "geo/raster_meaning.h"
#include "sunfall/grid.h"

namespace sunfall {

// An opened single-band height raster, checked to be what Sunfall needs: a projected CRS in
// metres, north up, square cells. Not for use from two threads at once.
class RasterSource {
 public:
  // `role` names the raster in messages ("ground", "surface"). Throws Error(data).
  // `meaning` says what its cells count where that is not a height.
  static RasterSource open(const std::filesystem::path& file, const std::string& role,
                           RasterMeaning meaning = RasterMeaning::height());
  RasterSource(RasterSource&&) noexcept;
  RasterSource& operator=(RasterSource&&) noexcept;
  ~RasterSource();

  const GridFrame& frame() const;
  const std::filesystem::path& file() const;
  const std::string& role() const;

  // Heights in the window; missing where the raster has nodata or the window leaves its frame.
  // Throws Error(data) for heights that are NaN without being nodata, infinite or absurd
  // (beyond -500 to 9000 m, or what is meant), naming the cell; Error(io) when reading fails.
  Grid<float> read(const CellWindow& window) const;

 private:
  struct State;
  explicit RasterSource(std::unique_ptr<State> state);
  std::unique_ptr<State> state_;
};

// Throws Error(data) that tells how to align `other` unless it has the grid of `reference`
// (same CRS, cell size, extent; corners within 1 % of a cell).
void require_same_grid(const RasterSource& other, const RasterSource& reference);

// `source` resampled bilinearly onto `frame`, reprojecting where the CRS differ; missing outside
// the source. Deterministic: no approximate transformer, fixed warp scale.
Grid<float> resample(const std::filesystem::path& source, const std::string& role, const GridFrame& frame);
// The extent of a raster of any CRS, degrees too, in the CRS of `frame`, and its mean cell size there.
struct MapBox {
  double west = 0.0;
  double south = 0.0;
  double east = 0.0;
  double north = 0.0;
  double cell_m = 0.0;
};
MapBox extent_in(const std::filesystem::path& source, const std::string& role, const GridFrame& frame);

}  // namespace sunfall

#include "geo/grid_canopy.h"

#include <algorithm>
#include <cmath>
#include <mutex>
#include <utility>

#include <fmt/format.h>

#include "sunfall/error.h"

namespace sunfall {
namespace {

// Cells that are checked at a time, to bound memory.
constexpr int kCellsAtOnce = 1 << 20;

// A number or an opened raster.
class GridInput {
 public:
  GridInput(const GridValue& value, const std::string& role, RasterMeaning meaning,
            const RasterSource& ground)
      : number_(static_cast<float>(value.number)) {
    if (!value.file) return;
    raster_.emplace(RasterSource::open(*value.file, role, meaning));
    require_same_grid(*raster_, ground);
  }

  bool is_raster() const { return raster_.has_value(); }
  const RasterSource& raster() const { return *raster_; }
  // Missing where the raster is.
  std::vector<float> read(const CellWindow& window) const {
    if (raster_) return raster_->read(window).values();
    return std::vector<float>(
        static_cast<std::size_t>(window.columns) * static_cast<std::size_t>(window.rows), number_);
  }

 private:
  float number_;
  std::optional<RasterSource> raster_;
};

class GridCanopy : public CanopySource {
 public:
  GridCanopy(const GridCanopyRequest& request, const RasterSource& ground)
      : frame_(ground.frame()),
        where_(request.where),
        top_(request.top_m, "canopy.top", RasterMeaning::height_of_leaves(), ground),
        base_(request.base_m, "canopy.base", RasterMeaning::height_of_leaves(), ground),
        density_(request.leaf_density, "canopy.leaf_density", RasterMeaning::leaf_density(), ground) {}

  void check(std::vector<std::string>& notes);
  float highest_top_m() const override { return highest_m_; }
  CanopyCells read(const CellWindow& window) const override;

 private:
  CanopyCells read_stored(const CellWindow& window) const;
  void check_strip(const CanopyCells& strip);
  void require_base(const CanopyCells& strip, std::size_t i) const;
  bool has_base_raster() const { return base_.is_raster(); }

  GridFrame frame_;
  std::string where_;
  GridInput top_;
  GridInput base_;
  GridInput density_;
  mutable std::mutex reading_;  // a raster is for one thread at a time
  float highest_m_ = 0.0F;
  long leafy_ = 0;
  long below_base_ = 0;
};

bool has_leaves(float top_m, float leaf_density) {
  return top_m > 0.0F && leaf_density > 0.0F;  // missing is neither
}

CanopyCells GridCanopy::read_stored(const CellWindow& window) const {
  const std::lock_guard<std::mutex> lock(reading_);
  return {window, top_.read(window), base_.read(window), density_.read(window)};
}

CanopyCells GridCanopy::read(const CellWindow& window) const {
  CanopyCells cells = read_stored(window);
  for (int row = 0; row < window.rows; ++row) {
    const bool row_on_map = window.row + row >= 0 && window.row + row < frame_.rows;
    for (int column = 0; column < window.columns; ++column) {
      const bool on_map =
          row_on_map && window.column + column >= 0 && window.column + column < frame_.columns;
      const std::size_t i = static_cast<std::size_t>(row) * static_cast<std::size_t>(window.columns) +
                            static_cast<std::size_t>(column);
      float& top = cells.top_m[i];
      float& base = cells.base_m[i];
      base = std::max(base, 0.0F);
      if (on_map && has_leaves(top, cells.leaf_density[i]) && base < top) continue;
      top = base = cells.leaf_density[i] = 0.0F;
    }
  }
  return cells;
}

// A base raster is at fault where it lacks a value, or stands above the top, wherever leaves are.
void GridCanopy::require_base(const CanopyCells& strip, std::size_t i) const {
  const float base = strip.base_m[i];
  if (base <= strip.top_m[i]) return;
  const auto columns = static_cast<std::size_t>(strip.window.columns);
  const CellIndex cell{strip.window.column + static_cast<int>(i % columns),
                       strip.window.row + static_cast<int>(i / columns)};
  const MapPoint centre = frame_.centre(cell);
  const std::string place =
      fmt::format("{} (canopy.base), column {}, row {}, centre {:.3f}, {:.3f}",
                  base_.raster().file().string(), cell.column, cell.row, centre.east, centre.north);
  if (std::isnan(base)) {
    throw Error(ErrorKind::data, {"the leaves of a cell have no base", place, "nodata",
                                  "Fill it in wherever top and leaf_density have values"});
  }
  throw Error(ErrorKind::data, {"the base of the leaves lies above their top", place,
                                fmt::format("base {:g} m, top {:g} m", base, strip.top_m[i]),
                                "Both count from the ground; are the rasters swapped?"});
}

void GridCanopy::check_strip(const CanopyCells& strip) {
  for (std::size_t i = 0; i < strip.top_m.size(); ++i) {
    if (!has_leaves(strip.top_m[i], strip.leaf_density[i])) continue;
    if (has_base_raster()) require_base(strip, i);
    ++leafy_;
    if (!(strip.base_m[i] < strip.top_m[i])) {
      ++below_base_;
      continue;
    }
    highest_m_ = std::max(highest_m_, strip.top_m[i]);
  }
}

void GridCanopy::check(std::vector<std::string>& notes) {
  const int rows_at_once = std::max(1, kCellsAtOnce / frame_.columns);
  for (int row = 0; row < frame_.rows; row += rows_at_once)
    check_strip(read_stored({0, row, frame_.columns, std::min(rows_at_once, frame_.rows - row)}));
  if (leafy_ == below_base_) {
    throw Error(
        ErrorKind::data,
        {"the canopy holds no leaves", where_,
         leafy_ == 0 ? "no cell has a top and a leaf density above 0"
                     : fmt::format("the top does not reach above the base in any of {} cells", leafy_),
         "Give top and base above the ground, in metres, or leave the table out"});
  }
  if (below_base_ > 0) {
    notes.push_back(fmt::format(
        "{}: in {:.1f} % of the cells with a top it does not reach above the base, and these hold "
        "no leaves.",
        where_, 100.0 * static_cast<double>(below_base_) / static_cast<double>(leafy_)));
  }
}

}  // namespace

std::unique_ptr<CanopySource> open_grid_canopy(const GridCanopyRequest& request, const RasterSource& ground,
                                               std::vector<std::string>& notes) {
  auto canopy = std::make_unique<GridCanopy>(request, ground);
  canopy->check(notes);
  return canopy;
}

}  // namespace sunfall

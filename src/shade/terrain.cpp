#include "shade/terrain.h"

#include <algorithm>
#include <cmath>

#include "shade/horizon_kernel.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

int floor_div(int a, int b) { return a >= 0 ? a / b : -((-a + b - 1) / b); }
int ceil_div(int a, int b) { return -floor_div(-a, b); }

// The cells of a level that cover a rectangle of map cells.
CellWindow covering(const CellWindow& map, int level) {
  const int size = 1 << level;
  CellWindow out;
  out.column = floor_div(map.column, size);
  out.row = floor_div(map.row, size);
  out.columns = ceil_div(map.column + map.columns, size) - out.column;
  out.rows = ceil_div(map.row + map.rows, size) - out.row;
  return out;
}

CellWindow joined(const CellWindow& a, const CellWindow& b) {
  const int west = std::min(a.column, b.column), north = std::min(a.row, b.row);
  const int east = std::max(a.column + a.columns, b.column + b.columns);
  const int south = std::max(a.row + a.rows, b.row + b.rows);
  return {west, north, east - west, south - north};
}

CellWindow grown(const CellWindow& window, int margin) {
  return {window.column - margin, window.row - margin, window.columns + 2 * margin, window.rows + 2 * margin};
}

// Halves a grid, keeping the highest of the (up to four) cells below each.
std::vector<float> halved(const std::vector<float>& fine, int columns, int rows, int first_column,
                          int first_row, const CellWindow& coarse) {
  std::vector<float> out(static_cast<std::size_t>(coarse.columns) * coarse.rows, kNothing);
  for (int row = 0; row < rows; ++row) {
    const int to_row = floor_div(first_row + row, 2) - coarse.row;
    const float* from = fine.data() + static_cast<std::size_t>(row) * columns;
    float* to = out.data() + static_cast<std::size_t>(to_row) * coarse.columns;
    for (int column = 0; column < columns; ++column) {
      float& cell = to[floor_div(first_column + column, 2) - coarse.column];
      cell = std::max(cell, from[column]);
    }
  }
  return out;
}

// Fills gaps from the nearest known value of the same row, else of the row before; a grid with no
// value at all becomes level 0. Only far horizons beside gaps ever see these numbers.
void fill_gaps(std::vector<float>& values, int columns, int rows) {
  const float* previous = nullptr;
  for (int row = 0; row < rows; ++row) {
    float* line = values.data() + static_cast<std::size_t>(row) * columns;
    int known = -1;
    for (int column = 0; column < columns; ++column) {
      if (std::isnan(line[column])) continue;
      for (int gap = known + 1; gap < column; ++gap) {
        line[gap] = known < 0 || column - gap < gap - known ? line[column] : line[known];
      }
      known = column;
    }
    if (known < 0) {
      if (previous)
        std::copy(previous, previous + columns, line);
      else
        continue;
    } else {
      std::fill(line + known + 1, line + columns, line[known]);
    }
    if (!previous) {
      for (int above = 0; above < row; ++above) {
        std::copy(line, line + columns, values.data() + static_cast<std::size_t>(above) * columns);
      }
    }
    previous = line;
  }
  if (!previous) std::fill(values.begin(), values.end(), 0.0F);
}

}  // namespace

Terrain::Terrain(Inputs inputs, Progress& progress)
    : inputs_(std::move(inputs)), frame_(inputs_.ground.frame()) {
  if (inputs_.surface) require_same_grid(*inputs_.surface, inputs_.ground);
  read_all(progress);
  known_box_ = {0, 0, frame_.columns, frame_.rows};
  if (inputs_.far_ground) add_far_ground();
  const int farthest = std::max(known_box_.columns, known_box_.rows);
  while ((kFullReach << top_level_) < farthest) ++top_level_;
}

// One pass over the rasters in strips: checks heights, counts valid cells, builds level 1; the
// further levels follow from it in memory.
void Terrain::read_all(Progress& progress) {
  constexpr int kStrip = 512;
  const CellWindow first = covering({0, 0, frame_.columns, frame_.rows}, 1);
  Level level{first.columns, first.rows,
              std::vector<float>(static_cast<std::size_t>(first.columns) * first.rows, kNothing)};
  std::size_t valid = 0;
  lowest_m_ = std::numeric_limits<float>::max();
  highest_m_ = std::numeric_limits<float>::lowest();
  std::vector<float> strip;
  for (int row = 0; row < frame_.rows; row += kStrip) {
    if (progress.stop_requested())
      throw Error(ErrorKind::interrupted,
                  {"stopped while reading the ground", "", "", "Run the same command again"});
    const CellWindow window{0, row, frame_.columns, std::min(kStrip, frame_.rows - row)};
    strip.resize(static_cast<std::size_t>(window.columns) * window.rows);
    hiding_heights(window, strip.data());
    for (const float height : strip) {
      if (height == kNothing) continue;
      ++valid;
      lowest_m_ = std::min(lowest_m_, height);
      highest_m_ = std::max(highest_m_, height);
    }
    const CellWindow coarse = covering(window, 1);
    const std::vector<float> half = halved(strip, window.columns, window.rows, 0, row, coarse);
    std::copy(half.begin(), half.end(),
              level.heights.begin() + static_cast<std::ptrdiff_t>(coarse.row) * level.columns);
    progress.advance("reading the ground", double(row + window.rows) / frame_.rows);
  }
  valid_fraction_ = double(valid) / double(frame_.size());
  if (valid == 0) {
    throw Error(ErrorKind::data, {"the raster holds no height at all, only nodata",
                                  inputs_.ground.file().string(), "", "Give a raster with known heights"});
  }
  levels_.push_back(std::move(level));
  while (levels_.back().columns > 1 || levels_.back().rows > 1) {
    const Level& fine = levels_.back();
    const CellWindow coarse = covering({0, 0, fine.columns, fine.rows}, 1);
    levels_.push_back(
        {coarse.columns, coarse.rows, halved(fine.heights, fine.columns, fine.rows, 0, 0, coarse)});
  }
}

// Far ground is resampled once to the level whose cells are nearest to its own size.
void Terrain::add_far_ground() {
  const RasterSource source = RasterSource::open(*inputs_.far_ground, "far_ground");
  const MapBox box = extent_in(*inputs_.far_ground, "far_ground", frame_);
  const double reach = inputs_.reach_m;
  const double west = std::max(box.west, frame_.west - reach);
  const double east = std::min(box.east, frame_.west + frame_.columns * frame_.cell_m + reach);
  const double north = std::min(box.north, frame_.north + reach);
  const double south = std::max(box.south, frame_.north - frame_.rows * frame_.cell_m - reach);
  if (east <= west || north <= south) {
    throw Error(ErrorKind::data, {"far_ground lies away from the ground that it should surround",
                                  inputs_.far_ground->string(), "", "Give terrain around the plot"});
  }
  far_level_ = std::max(1, static_cast<int>(std::lround(std::log2(source.frame().cell_m / frame_.cell_m))));
  const double size = frame_.cell_m * std::exp2(far_level_);
  far_window_.column = static_cast<int>(std::floor((west - frame_.west) / size));
  far_window_.row = static_cast<int>(std::floor((frame_.north - north) / size));
  far_window_.columns = static_cast<int>(std::ceil((east - frame_.west) / size)) - far_window_.column;
  far_window_.rows = static_cast<int>(std::ceil((frame_.north - south) / size)) - far_window_.row;
  GridFrame target = frame_;
  target.columns = far_window_.columns;
  target.rows = far_window_.rows;
  target.cell_m = size;
  target.west = frame_.west + far_window_.column * size;
  target.north = frame_.north - far_window_.row * size;
  Grid<float> grid = resample(*inputs_.far_ground, "far_ground", target);
  for (float& height : grid.values()) height = std::isnan(height) ? kNothing : height;
  far_.push_back({target.columns, target.rows, std::move(grid.values())});
  far_windows_.push_back(far_window_);
  while (far_.back().columns > 2 || far_.back().rows > 2) {
    const CellWindow fine = far_windows_.back();
    const CellWindow coarse = covering(fine, 1);
    far_.push_back({coarse.columns, coarse.rows,
                    halved(far_.back().heights, fine.columns, fine.rows, fine.column, fine.row, coarse)});
    far_windows_.push_back(coarse);
  }
  const int cells = 1 << far_level_;
  known_box_ = joined(known_box_, {far_window_.column * cells, far_window_.row * cells,
                                   far_window_.columns * cells, far_window_.rows * cells});
}

void Terrain::hiding_heights(const CellWindow& window, float* out) const {
  const std::lock_guard lock(reading_);
  const Grid<float> ground = inputs_.ground.read(window);
  const std::size_t size = ground.values().size();
  const float* low = ground.values().data();
  if (!inputs_.surface) {
    for (std::size_t i = 0; i < size; ++i) out[i] = std::isnan(low[i]) ? kNothing : low[i];
    return;
  }
  const Grid<float> surface = inputs_.surface->read(window);
  const float* top = surface.values().data();
  for (std::size_t i = 0; i < size; ++i) {
    const float a = std::isnan(low[i]) ? kNothing : low[i];
    const float b = std::isnan(top[i]) ? kNothing : top[i];
    out[i] = std::max(a, b);
  }
}

// Far ground under a cell of any level: bilinear below its own level, the highest above.
float Terrain::far_height(int level, int column, int row) const {
  if (far_.empty()) return kNothing;
  if (level >= far_level_) {
    const std::size_t n = std::min<std::size_t>(level - far_level_, far_.size() - 1);
    const int extra = level - far_level_ - static_cast<int>(n);
    const CellWindow& window = far_windows_[n];
    const int c = column * (1 << extra) - window.column, r = row * (1 << extra) - window.row;
    if (c < 0 || r < 0 || c >= window.columns || r >= window.rows) return kNothing;
    return far_[n].heights[static_cast<std::size_t>(r) * window.columns + c];
  }
  const double scale = std::exp2(level - far_level_);
  const double x = (column + 0.5) * scale - 0.5 - far_window_.column;
  const double y = (row + 0.5) * scale - 0.5 - far_window_.row;
  const int c = static_cast<int>(std::floor(x)), r = static_cast<int>(std::floor(y));
  if (c < 0 || r < 0 || c + 1 >= far_window_.columns || r + 1 >= far_window_.rows) return kNothing;
  const float* h = far_[0].heights.data() + static_cast<std::size_t>(r) * far_window_.columns + c;
  const float fx = static_cast<float>(x - c), fy = static_cast<float>(y - r);
  const float* below = h + far_window_.columns;
  const bool known = h[0] != kNothing && h[1] != kNothing && below[0] != kNothing && below[1] != kNothing;
  if (!known) return kNothing;
  return (h[0] * (1 - fx) + h[1] * fx) * (1 - fy) + (below[0] * (1 - fx) + below[1] * fx) * fy;
}

LevelGrid Terrain::level_grid(int level, const CellWindow& window) const {
  LevelGrid out{level, window, std::vector<float>(static_cast<std::size_t>(window.columns) * window.rows)};
  if (level == 0) {
    hiding_heights(window, out.heights.data());
  } else {
    const Level& map = levels_[std::min<std::size_t>(level - 1, levels_.size() - 1)];
    const int extra = std::max(0, level - static_cast<int>(levels_.size()));
    for (int row = 0; row < window.rows; ++row) {
      for (int column = 0; column < window.columns; ++column) {
        const int c = (window.column + column) * (1 << extra), r = (window.row + row) * (1 << extra);
        const bool inside = c >= 0 && r >= 0 && c < map.columns && r < map.rows;
        out.heights[static_cast<std::size_t>(row) * window.columns + column] =
            inside ? map.heights[static_cast<std::size_t>(r) * map.columns + c] : kNothing;
      }
    }
  }
  if (far_.empty()) return out;
  for (int row = 0; row < window.rows; ++row) {
    for (int column = 0; column < window.columns; ++column) {
      float& height = out.heights[static_cast<std::size_t>(row) * window.columns + column];
      if (height == kNothing) height = far_height(level, window.column + column, window.row + row);
    }
  }
  return out;
}

Grid<float> Terrain::ground(const CellWindow& window) const {
  const std::lock_guard lock(reading_);
  return inputs_.ground.read(window);
}

TerrainTile Terrain::tile(const CellWindow& window) const {
  TerrainTile out;
  out.window = window;
  const int size = std::max(window.columns, window.rows);
  for (int level = 0; level <= top_level_; ++level) {
    const int margin = size + (kFullReach << level) + (2 << level);
    CellWindow cells = covering(grown(window, margin), level);
    if (level > 0) {
      const CellWindow known = grown(covering(known_box_, level), 1);
      const int west = std::max(cells.column, known.column), north = std::max(cells.row, known.row);
      const int east = std::min(cells.column + cells.columns, known.column + known.columns);
      const int south = std::min(cells.row + cells.rows, known.row + known.rows);
      if (east - west < 2 || south - north < 2) break;
      cells = {west, north, east - west, south - north};
    }
    out.levels.push_back(level_grid(level, cells));
  }
  out.receiver_window = grown(window, kReceiverMargin);
  Grid<float> ground_around = ground(out.receiver_window);
  out.receivers = std::move(ground_around.values());
  const float height = static_cast<float>(inputs_.receiver_height_m);
  for (float& value : out.receivers) value += height;

  const LevelGrid& hiding = out.levels.front();
  out.usable.resize(static_cast<std::size_t>(window.columns) * window.rows);
  for (int row = 0; row < window.rows; ++row) {
    const float* eye = out.receivers.data() +
                       static_cast<std::size_t>(row + kReceiverMargin) * out.receiver_window.columns +
                       kReceiverMargin;
    const float* top =
        hiding.heights.data() +
        static_cast<std::size_t>(window.row + row - hiding.window.row) * hiding.window.columns +
        (window.column - hiding.window.column);
    char* usable = out.usable.data() + static_cast<std::size_t>(row) * window.columns;
    // A NaN eye compares false.
    for (int column = 0; column < window.columns; ++column) usable[column] = eye[column] >= top[column];
  }
  fill_gaps(out.receivers, out.receiver_window.columns, out.receiver_window.rows);
  return out;
}

}  // namespace sunfall

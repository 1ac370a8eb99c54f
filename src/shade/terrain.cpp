#include "shade/terrain.h"

#include <algorithm>
#include <cmath>

#include "shade/horizon_kernel.h"
#include "shade/level_cells.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

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
  if (inputs_.far_ground) {
    far_.emplace(*inputs_.far_ground, frame_, inputs_.reach_m);
    const int columns = frame_.columns, rows = frame_.rows;
    far_->join({ground({0, 0, columns, 1}), ground({0, rows - 1, columns, 1}), ground({0, 0, 1, rows}),
                ground({columns - 1, 0, 1, rows})});
    known_box_ = joined(known_box_, far_->box());
  }
  const int farthest = std::max(known_box_.columns, known_box_.rows);
  while ((kFullReach << top_level_) < farthest && top_level_ < kMostLevels) ++top_level_;
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
    const std::vector<float> half = halved(strip, window, coarse);
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
        {coarse.columns, coarse.rows, halved(fine.heights, {0, 0, fine.columns, fine.rows}, coarse)});
  }
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
  if (!far_) return out;
  for (int row = 0; row < window.rows; ++row) {
    for (int column = 0; column < window.columns; ++column) {
      float& height = out.heights[static_cast<std::size_t>(row) * window.columns + column];
      if (height == kNothing) height = far_->height(level, window.column + column, window.row + row);
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
  out.map_columns = frame_.columns;
  out.map_rows = frame_.rows;
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

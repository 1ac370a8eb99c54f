#include "shade/horizon_sweep.h"

#include <algorithm>
#include <cassert>
#include <cmath>

#include "dome/horizon_steps.h"
#include "shade/row_loops.h"

namespace sunfall {
namespace {

// Near rows that one look serves for directions a degree or two apart (at seven rows they lie a
// fifth of a cell apart), and how many of them are also looked at halfway.
constexpr int kSharedRows = 7;
constexpr int kHalfRows = 3;

// The same grid, stored column by column.
LevelGrid turned(const LevelGrid& grid) {
  LevelGrid out{grid.level, grid.window, std::vector<float>(grid.heights.size())};
  const int columns = grid.window.columns, rows = grid.window.rows;
  constexpr int kBlock = 32;
  for (int row0 = 0; row0 < rows; row0 += kBlock) {
    for (int column0 = 0; column0 < columns; column0 += kBlock) {
      for (int row = row0; row < std::min(row0 + kBlock, rows); ++row) {
        for (int column = column0; column < std::min(column0 + kBlock, columns); ++column) {
          out.heights[static_cast<std::size_t>(column) * rows + row] =
              grid.heights[static_cast<std::size_t>(row) * columns + column];
        }
      }
    }
  }
  return out;
}

}  // namespace

HorizonSweep::HorizonSweep(const TerrainTile& tile, const SweepOptions& options)
    : tile_(tile), options_(options), turned_(tile.levels.size()), kernel_(best_sweep_kernel()) {}

HorizonSweep::Direction HorizonSweep::direction_of(GridAzimuth azimuth) const {
  const RowDirection rows = row_direction(azimuth);
  return {rows.heading, static_cast<float>(rows.lean), static_cast<float>(rows.row_length)};
}

const LevelGrid& HorizonSweep::oriented(int level, bool columns) {
  if (!columns) return tile_.levels[level];
  if (turned_[level].heights.empty()) turned_[level] = turned(tile_.levels[level]);
  return turned_[level];
}

HorizonSweep::March& HorizonSweep::march(Heading heading) {
  March& m = marches_[static_cast<int>(heading)];
  if (m.ready) return m;
  m.columns = by_columns(heading);
  m.reversed = reversed(heading);
  const int tile_u = m.columns ? tile_.window.column : tile_.window.row;
  const int tile_rows = m.columns ? tile_.window.columns : tile_.window.rows;
  const int map_rows = m.columns ? tile_.map_columns : tile_.map_rows;
  const int first = m.reversed ? map_rows - tile_u - tile_rows : tile_u;
  m.lead = ((first % kNodeStride) + kNodeStride) % kNodeStride;
  m.rows = m.lead + tile_rows;
  m.map_u = first - m.lead;
  m.width = m.columns ? tile_.window.rows : tile_.window.columns;
  for (int level = static_cast<int>(tile_.levels.size()) - 1; level >= 0; --level) add_level_rows(m, level);
  align_rows(m);
  turn_receivers(m);
  m.ready = true;
  return m;
}

// Level n fills the ring between kFullReach·2^(n-1) and kFullReach·2^n before the tile; level 0
// reaches from there to the tile's last row. A finer level starts where the last coarser cell ends.
void HorizonSweep::add_level_rows(March& m, int level) {
  const LevelGrid& grid = oriented(level, m.columns);
  const float size = static_cast<float>(1 << level);
  const int lines = m.columns ? grid.window.columns : grid.window.rows;  // grid lines along u
  const int count = m.columns ? grid.window.rows : grid.window.columns;  // values along v
  const int first_line = m.columns ? grid.window.column : grid.window.row;
  const int first_value = m.columns ? grid.window.row : grid.window.column;
  const int tile_u = m.columns ? tile_.window.column : tile_.window.row;
  const int tile_v = m.columns ? tile_.window.row : tile_.window.column;
  // A cell's centre in map cells, counted from the centre of the tile's first cell.
  const auto centre = [size](int cell, int tile) {
    return (static_cast<float>(cell) + 0.5F) * size - 0.5F - static_cast<float>(tile);
  };
  const float outer = -static_cast<float>(kFullReach << level);
  const float inner =
      level == 0 ? static_cast<float>(m.rows) : -static_cast<float>(kFullReach << (level - 1));

  for (int i = 0; i < lines; ++i) {
    const int line = m.reversed ? lines - 1 - i : i;
    const float place = centre(first_line + line, tile_u);
    MarchRow row;
    row.u = m.reversed ? static_cast<float>(m.rows - 1) - place : place + static_cast<float>(m.lead);
    const bool beyond_coarser = m.march_rows.empty() ? row.u >= outer : row.u - 0.5F * size >= m.covered_to;
    if (!beyond_coarser || row.u >= inner) continue;
    row.values = grid.heights.data() + static_cast<std::size_t>(line) * count;
    row.count = count;
    row.cell = size;
    row.first_v = centre(first_value, tile_v);
    m.march_rows.push_back(row);
    m.covered_to = row.u + 0.5F * size;
  }
}

// The kernel groups rows from the front; the row with u = 0 must begin a group.
void HorizonSweep::align_rows(March& m) {
  while ((m.march_rows.size() - static_cast<std::size_t>(m.rows)) % kRowsPerNode != 0) {
    MarchRow empty;
    empty.u = m.march_rows.front().u - 1.0F;
    m.march_rows.insert(m.march_rows.begin(), empty);
  }
  m.tile_row = static_cast<int>(m.march_rows.size()) - m.rows;
  for (int u = -kNearRows; u < m.rows; ++u) {
    const MarchRow& row = m.march_rows[static_cast<std::size_t>(m.tile_row + u)];
    m.near.push_back(row.values - static_cast<std::ptrdiff_t>(row.first_v));
  }
}

void HorizonSweep::turn_receivers(March& m) {
  const int margin = kReceiverMargin;
  m.receiver_stride = m.width + 2 * margin;
  // Room for a whole group of cells behind the last row.
  m.receivers.resize(static_cast<std::size_t>(m.rows + 2 * margin) * m.receiver_stride + kRowGroup);
  const int tile_rows = m.rows - m.lead;
  for (int u = -margin; u < m.rows + margin; ++u) {
    const int row_of_tile = std::max(u - m.lead, -margin);
    const int place = (m.reversed ? tile_rows - 1 - row_of_tile : row_of_tile) + margin;
    for (int v = -margin; v < m.width + margin; ++v) {
      const int row = m.columns ? v + margin : place, column = m.columns ? place : v + margin;
      m.receivers[static_cast<std::size_t>(u + margin) * m.receiver_stride + v + margin] =
          tile_.receivers[static_cast<std::size_t>(row) * tile_.receiver_window.columns + column];
    }
  }
}

// The rows from `first` to `last` before row u, along the direction.
void HorizonSweep::append_near_rows(const March& m, const Direction& direction, int u, int first, int last,
                                    std::vector<NearRow>& out) {
  for (int n = first; n <= last; ++n) {
    const float shift = -direction.lean * static_cast<float>(n);
    const float whole = std::floor(shift);
    out.push_back({m.near[static_cast<std::size_t>(u + kNearRows - n)] + static_cast<int>(whole), nullptr,
                   shift - whole, 1.0F / static_cast<float>(n)});
  }
}

// Halfway between two rows a cell's ground lies between its two diagonals: the mean of the rows'
// heights where the ray passes. On steep convex ground the rows alone would miss it.
void HorizonSweep::append_half_rows(const March& m, const Direction& direction, int u,
                                    std::vector<NearRow>& out) {
  for (int n = 1; n <= kHalfRows; ++n) {
    const float distance = static_cast<float>(n) - 0.5F;
    const float shift = -direction.lean * distance;
    const float whole = std::floor(shift);
    const int across = static_cast<int>(whole);
    out.push_back({m.near[static_cast<std::size_t>(u + kNearRows - n)] + across,
                   m.near[static_cast<std::size_t>(u + kNearRows - n + 1)] + across, shift - whole,
                   1.0F / distance});
  }
}

const float* HorizonSweep::eyes(const March& m, int u) {
  return m.receivers.data() + static_cast<std::size_t>(u + kReceiverMargin) * m.receiver_stride +
         kReceiverMargin;
}

void HorizonSweep::look_near(GridAzimuth azimuth) {
  const Direction direction = direction_of(azimuth);
  const March& m = march(direction.heading);
  near_stride_ = (m.width + kRowGroup - 1) / kRowGroup * kRowGroup;
  near_.resize(static_cast<std::size_t>(m.rows) * near_stride_);
  std::vector<NearRow> rows;
  for (int u = m.lead; u < m.rows; ++u) {
    rows.clear();
    append_near_rows(m, direction, u, 1, kSharedRows, rows);
    append_half_rows(m, direction, u, rows);
    look_along_near_rows(
        {eyes(m, u), nullptr, rows, m.width, near_.data() + static_cast<std::size_t>(u) * near_stride_});
  }
}

// Metres that the level plane rises above the Earth's curve per row².
double HorizonSweep::bend_of(const Direction& direction) const {
  const double row_m = options_.cell_m * direction.row_length;
  return row_m * row_m * (1.0 - options_.refraction) / (2.0 * options_.earth_radius_m);
}

void HorizonSweep::sweep_far(const March& m, const Direction& direction, float first_v, int blocks) {
  const double step_m = options_.cell_m * direction.row_length;
  const double bend = bend_of(direction);
  std::vector<MarchRow> rows = m.march_rows;
  for (MarchRow& row : rows) row.sink = static_cast<float>(bend * row.u * row.u);
  assert(rows.size() <= kMostRows);
  const std::size_t nodes = rows.size() / kRowsPerNode + 2;
  parent_height_.resize(nodes * kLinesPerBlock);
  parent_code_.resize(nodes * kLinesPerBlock);
  far_stride_ = blocks * kLinesPerBlock;
  const std::size_t points = static_cast<std::size_t>(node_rows(m.rows)) * far_stride_;
  far_height_.assign(points, kNothing);
  far_u_.assign(points, -1.0e5F);

  SweepJob job;
  job.rows = rows.data();
  job.row_count = static_cast<int>(rows.size());
  job.tile_row = m.tile_row;
  job.lean = direction.lean;
  job.first_v = first_v;
  job.blocks = blocks;
  job.receivers =
      m.receivers.data() + static_cast<std::size_t>(kReceiverMargin) * m.receiver_stride + kReceiverMargin;
  job.receiver_stride = m.receiver_stride;
  job.tile_rows = m.rows;
  job.tile_columns = m.width;
  job.row_m = static_cast<float>(step_m);
  job.bend = static_cast<float>(bend);
  job.far_height = far_height_.data();
  job.far_u = far_u_.data();
  job.far_stride = far_stride_;
  job.scratch = {parent_height_.data(), parent_code_.data()};
  kernel_(job);
}

void HorizonSweep::look_far(GridAzimuth azimuth, std::uint16_t* steps) {
  const Direction direction = direction_of(azimuth);
  const March& m = march(direction.heading);
  const float last_u = static_cast<float>((node_rows(m.rows) - 1) * kNodeStride);
  // Lines pass whole columns at the edge of the map that the light comes over.
  const double at_map = double(direction.lean) * m.map_u;
  const float phase = static_cast<float>(at_map - std::floor(at_map));
  const float first_v = std::floor(std::min(0.0F, -direction.lean * last_u)) - 2.0F + phase;
  const float last_v = static_cast<float>(m.width) + std::max(0.0F, -direction.lean * last_u) + 1.0F;
  const int blocks = static_cast<int>(std::ceil(last_v - first_v + 1.0F)) / kLinesPerBlock + 1;
  sweep_far(m, direction, first_v, blocks);
  const double bend = bend_of(direction);
  std::vector<float> near(static_cast<std::size_t>(near_stride_));
  std::vector<NearRow> rows;
  for (int u = m.lead; u < m.rows; ++u) {
    rows.clear();
    append_near_rows(m, direction, u, kSharedRows + 1, kNearRows, rows);
    look_along_near_rows(
        {eyes(m, u), near_.data() + static_cast<std::size_t>(u) * near_stride_, rows, m.width, near.data()});
    FarRead read;
    const int node = u / kNodeStride;
    const int next = std::min(node + 1, node_rows(m.rows) - 1);
    const float line = -direction.lean * static_cast<float>(u) - first_v;
    const float whole = std::floor(line);
    const auto points = [&](int node_row) {
      const std::size_t at = static_cast<std::size_t>(node_row) * far_stride_ + static_cast<int>(whole);
      return FarPoints{far_height_.data() + at, far_u_.data() + at};
    };
    read.before = points(node);
    read.after = points(next);
    read.u = static_cast<float>(u);
    read.fraction = line - whole;
    read.eyes = eyes(m, u);
    read.eye_sink = static_cast<float>(bend * u * u);
    read.unbend = static_cast<float>(2.0 * bend * u);
    read.near = near.data();
    read.tangent_per_slope = static_cast<float>(1.0 / (options_.cell_m * direction.row_length));
    read.width = m.width;
    const int row = m.reversed ? m.rows - 1 - u : u - m.lead;
    read.steps = steps + static_cast<std::size_t>(row) * m.width;
    combine_near_and_far(read);
  }
}

}  // namespace sunfall

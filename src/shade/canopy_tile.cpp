#include "shade/canopy_tile.h"

#include <algorithm>
#include <bit>
#include <cassert>
#include <cmath>
#include <limits>
#include <map>
#include <utility>

#include "shade/horizon_kernel.h"
#include "shade/horizon_sweep.h"

namespace sunfall {
namespace {

// At least so many bins for what a ray rises in a row.
constexpr double kBinsPerRise = 8.0;
// A ray that rises less than this in a row does not leave a column through its top.
constexpr double kLevelRise_m = 1e-4;

Depth sum_of(Depth a, Depth b) { return static_cast<Depth>(std::min(a + b, 65535)); }

}  // namespace

CanopyTile::CanopyTile(const TerrainTile& tile, LeafLines leaves, const CanopyScene& scene,
                       const LeafDepth& depth)
    : window_(tile.window),
      map_columns_(tile.map_columns),
      map_rows_(tile.map_rows),
      scene_(scene),
      depth_(depth) {
  View& rows = views_[0];
  rows.leaves = std::move(leaves);
  rows.receivers.reserve(static_cast<std::size_t>(window_.columns) * window_.rows);
  for (int row = 0; row < window_.rows; ++row) {
    const float* from = tile.receivers.data() +
                        static_cast<std::size_t>(row + kReceiverMargin) * tile.receiver_window.columns +
                        kReceiverMargin;
    for (int column = 0; column < window_.columns; ++column) {
      rows.receivers.push_back(from[column] - scene_.zero_m);
    }
  }
  lowest_m_ = *std::min_element(rows.receivers.begin(), rows.receivers.end());
  rows.receivers.resize(rows.receivers.size() + kCanopySpare);
  find_lowest(rows, window_.rows);
  gather_blocks();
}

void CanopyTile::gather_blocks() {
  std::map<std::pair<int, int>, float> tops;
  highest_m_ = std::numeric_limits<float>::lowest();
  views_[0].leaves.for_each([&](int row, int column, const LeafColumn& leaf) {
    const auto place = tops.try_emplace({row / kBlock, column / kBlock}, leaf.top_m).first;
    place->second = std::max(place->second, leaf.top_m);
    highest_m_ = std::max(highest_m_, leaf.top_m);
  });
  for (const auto& [place, top_m] : tops)
    blocks_.push_back({place.second * kBlock, place.first * kBlock, top_m});
}

const CanopyTile::View& CanopyTile::view(bool columns) {
  if (!columns) return views_[0];
  View& out = views_[1];
  if (!out.receivers.empty()) return out;
  out.leaves = views_[0].leaves.turned();
  out.receivers.resize(views_[0].receivers.size());
  for (int row = 0; row < window_.rows; ++row) {
    for (int column = 0; column < window_.columns; ++column) {
      out.receivers[static_cast<std::size_t>(column) * window_.rows + row] =
          views_[0].receivers[static_cast<std::size_t>(row) * window_.columns + column];
    }
  }
  find_lowest(out, window_.columns);
  return out;
}

void CanopyTile::find_lowest(View& view, int rows) const {
  const std::ptrdiff_t width = static_cast<std::ptrdiff_t>(window_.columns) * window_.rows / rows;
  for (int row = 0; row < rows; ++row) {
    const auto begin = view.receivers.begin() + row * width;
    view.row_lowest.push_back(*std::min_element(begin, begin + width));
  }
}

// Each block of leaves that lies towards the light, as if its highest top stood at its nearest corner and the
// lowest receiver at the tile's.
float CanopyTile::highest_tangent(GridAzimuth azimuth) {
  // What the sweep smears: a cell aside, half a row and the rise of its bins along the ray.
  constexpr double kSlackCells = 2.0;
  const double slack_m = 1.5 * static_cast<double>(scene_.bin_m);
  const double east = sin(azimuth.from_grid_north), south = -cos(azimuth.from_grid_north);
  double highest = 0.0;
  for (const LeafBlock& block : blocks_) {
    const double rise_m = static_cast<double>(block.top_m - lowest_m_) + slack_m;
    if (rise_m <= 0.0) continue;
    // From any cell of the tile to any of the block, in cells.
    const double columns_from = block.column - (window_.column + window_.columns - 1);
    const double columns_to = block.column + kBlock - 1 - window_.column;
    const double rows_from = block.row - (window_.row + window_.rows - 1);
    const double rows_to = block.row + kBlock - 1 - window_.row;
    const auto most = [&](double x, double y) {
      return std::max(x * columns_from, x * columns_to) + std::max(y * rows_from, y * rows_to);
    };
    if (most(east, south) < -kSlackCells) continue;
    if (most(south, -east) < -kSlackCells || most(-south, east) < -kSlackCells) continue;
    const double columns = std::max({columns_from, -columns_to, 0.0});
    const double rows = std::max({rows_from, -rows_to, 0.0});
    const double distance_m = (std::hypot(columns, rows) - kSlackCells) * scene_.cell_m;
    if (distance_m <= 0.0) return std::numeric_limits<float>::max();
    highest = std::max(highest, rise_m / distance_m);
  }
  return static_cast<float>(highest * (1.0 + 1e-6));
}

CanopyTile::Rays CanopyTile::rays(GridAzimuth azimuth, double tangent) const {
  Rays out;
  out.rows = row_direction(azimuth);
  const double row_m = scene_.cell_m * out.rows.row_length;
  out.rise_m = tangent * row_m;
  out.row_m = std::hypot(row_m, out.rise_m);
  out.sine = std::isinf(out.row_m) ? 1.0 : out.rise_m / out.row_m;
  out.depth_per_m = depth_.scattering(out.sine);
  return out;
}

// The half row from each receiver to the edge of its own cell.
bool CanopyTile::add_own_columns(const Rays& rays, std::span<Depth> depth) const {
  const View& rows = views_[0];
  const double half_m = 0.5 * rays.rise_m;
  const bool level = rays.rise_m < kLevelRise_m;
  bool any = false;
  for (int row = 0; row < window_.rows; ++row) {
    for (int begin = 0; begin < window_.columns; begin += 64) {
      const int line = window_.row + row, cell = window_.column + begin;
      std::uint64_t bits = rows.leaves.bits(line, cell);
      if (window_.columns - begin < 64) bits &= (std::uint64_t{1} << (window_.columns - begin)) - 1;
      if (bits == 0) continue;
      const LeafColumn* leaf = rows.leaves.first(line, cell, bits);
      for (; bits != 0; bits &= bits - 1, ++leaf) {
        const std::size_t at =
            static_cast<std::size_t>(row) * window_.columns + begin + std::countr_zero(bits);
        const double eye = rows.receivers[at];
        const double below = leaf->base_m - eye, above = leaf->top_m - eye;
        const double path_m =
            level ? (below <= 0.0 && above > 0.0 ? 0.5 * rays.row_m : 0.0)
                  : (std::clamp(above, 0.0, half_m) - std::clamp(below, 0.0, half_m)) / rays.sine;
        if (path_m <= 0.0) continue;
        const double own = rays.depth_per_m * leaf->density * path_m * kDepthUnits + 0.5;
        depth[at] = sum_of(depth[at], static_cast<Depth>(std::min(own, 65535.0)));
        any = true;
      }
    }
  }
  return any;
}

bool CanopyTile::add_rows_before(const Rays& rays, std::span<Depth> depth) {
  const double bin_m = std::max(static_cast<double>(scene_.bin_m), rays.rise_m / kBinsPerRise);
  // A row before is left at half a row's rise above the receiver or more; bins smear by one and a half.
  if (!(0.5 * rays.rise_m - 1.5 * bin_m < static_cast<double>(highest_m_ - lowest_m_))) return false;
  const bool columns = by_columns(rays.rows.heading);
  const View& lines = view(columns);
  CanopyJob job;
  job.leaves = &lines.leaves;
  job.reversed = reversed(rays.rows.heading);
  job.map_lines = columns ? map_columns_ : map_rows_;
  const int first_line = columns ? window_.column : window_.row;
  job.rows = columns ? window_.columns : window_.rows;
  job.first_u = job.reversed ? job.map_lines - first_line - job.rows : first_line;
  job.first_v = columns ? window_.row : window_.column;
  job.width = columns ? window_.rows : window_.columns;
  job.receivers = lines.receivers.data();
  job.row_lowest = lines.row_lowest.data();
  job.lean = rays.rows.lean;
  job.rise_bins = rays.rise_m / bin_m;
  job.bins_per_m = static_cast<float>(1.0 / bin_m);
  job.depth = static_cast<float>(rays.depth_per_m * rays.row_m * kDepthUnits * kFineDepth);
  job.reach = scene_.reach;
  job.lowest_m = lowest_m_;
  job.highest_m = highest_m_;
  swept_.assign(depth.size(), 0);
  job.out = swept_.data();
  if (!sweep_.run(job)) return false;
  add_swept(rays.rows.heading, depth);
  return true;
}

void CanopyTile::add_swept(Heading heading, std::span<Depth> depth) const {
  const bool back = reversed(heading);
  const std::size_t columns = static_cast<std::size_t>(window_.columns);
  const std::size_t rows = static_cast<std::size_t>(window_.rows);
  if (!by_columns(heading)) {
    for (std::size_t u = 0; u < rows; ++u) {
      Depth* to = depth.data() + (back ? rows - 1 - u : u) * columns;
      const Depth* from = swept_.data() + u * columns;
      for (std::size_t v = 0; v < columns; ++v) to[v] = sum_of(to[v], from[v]);
    }
    return;
  }
  constexpr std::size_t kTurned = 32;  // cells on a side that stay in the nearest cache
  for (std::size_t row0 = 0; row0 < rows; row0 += kTurned) {
    for (std::size_t column0 = 0; column0 < columns; column0 += kTurned) {
      for (std::size_t row = row0; row < std::min(row0 + kTurned, rows); ++row) {
        for (std::size_t column = column0; column < std::min(column0 + kTurned, columns); ++column) {
          Depth& to = depth[row * columns + column];
          to = sum_of(to, swept_[(back ? columns - 1 - column : column) * rows + row]);
        }
      }
    }
  }
}

bool CanopyTile::add_depth(GridAzimuth azimuth, float tangent, std::span<Depth> depth) {
  assert(depth.size() + kCanopySpare == views_[0].receivers.size());
  const Rays direction = rays(azimuth, std::max(static_cast<double>(tangent), 0.0));
  const bool before = add_rows_before(direction, depth);
  const bool own = add_own_columns(direction, depth);
  return before || own;
}

}  // namespace sunfall

#include "bench/rays_part.h"

#include <fmt/format.h>
#include <tbb/parallel_for.h>

#include <algorithm>
#include <bit>
#include <cmath>

#include "bench/geometry_part.h"
#include "map/loss_table.h"
#include "map/scene.h"

namespace sunfall::bench {
namespace {

using oracle::kPacket;
using oracle::RayPacket;

constexpr int kBlockSide = 4;
static_assert(kBlockSide * kBlockSide == kPacket);

}  // namespace

RayRace::RayRace(const oracle::Ground& ground, std::size_t count) : ground_(ground) {
  const Meter building;
  surface_ = std::make_unique<oracle::RaySurface>(ground.terrain, oracle::Diagonal::falling);
  building_ = building.cost();
  place_blocks(count);
  sky_view_.resize(sampled_cells());
}

std::size_t RayRace::sampled_cells() const { return blocks_.size() * kPacket; }

void RayRace::place_blocks(std::size_t count) {
  const GridFrame& frame = ground_.terrain.frame();
  const double cells_per_one = double(frame.size()) / double(count);
  const int apart =
      std::max(kBlockSide, static_cast<int>(std::lround(kBlockSide * std::sqrt(cells_per_one))));
  for (int row = apart / 2; row + kBlockSide <= frame.rows; row += apart) {
    for (int column = apart / 2; column + kBlockSide <= frame.columns; column += apart) {
      const TerrainTile tile = ground_.terrain.tile({column, row, kBlockSide, kBlockSide});
      Block block;
      for (int i = 0; i < kPacket; ++i) {
        const int across = i % kBlockSide, down = i / kBlockSide;
        const int eye = (down + kReceiverMargin) * tile.receiver_window.columns + across + kReceiverMargin;
        block.cells[i] = {column + across, row + down};
        block.eyes[i] = surface_->eye(block.cells[i], tile.receivers[eye]);
        block.usable |= static_cast<std::uint32_t>(tile.usable[i] != 0) << i;
      }
      blocks_.push_back(block);
    }
  }
}

// Bands are even in the sine of elevation; an even sky's light on the level grows with the sine.
std::vector<RayRace::DomeRay> RayRace::rays_of(const DomeLight& light) const {
  const Dome& dome = light.dome;
  std::vector<DomeRay> rays;
  for (const Look& look : looks_of(light)) {
    const double azimuth = to_grid(look.azimuth, ground_.convergence).from_grid_north.radians();
    for (int band = 0; band < dome.bands; ++band) {
      const double elevation = std::asin((band + 0.5) / dome.bands);
      const double share = (2.0 * band + 1.0) * look.lines / (double(dome.bands) * dome.bands * dome.lines());
      rays.push_back({oracle::RayDirection::of(azimuth, elevation), static_cast<float>(share)});
    }
  }
  return rays;
}

void RayRace::trace_block(std::size_t at, const std::vector<DomeRay>& rays, Packing packing) {
  const Block& block = blocks_[at];
  float* sky_view = sky_view_.data() + at * kPacket;
  std::fill_n(sky_view, kPacket, 1.0F);
  RayPacket packet;
  if (packing == Packing::cells) {
    std::copy_n(block.eyes, kPacket, packet.eyes);
    for (const DomeRay& ray : rays) {
      std::fill_n(packet.directions, kPacket, ray.direction);
      for (std::uint32_t hidden = surface_->hidden(packet, block.usable); hidden != 0; hidden &= hidden - 1)
        sky_view[std::countr_zero(hidden)] -= ray.light;
    }
    return;
  }
  const std::size_t together = packing == Packing::sector ? kPacket : 1;
  for (int i = 0; i < kPacket; ++i) {
    if ((block.usable >> i & 1U) == 0) continue;
    std::fill_n(packet.eyes, kPacket, block.eyes[i]);
    for (std::size_t first = 0; first < rays.size(); first += together) {
      const std::size_t count = std::min(together, rays.size() - first);
      for (std::size_t k = 0; k < count; ++k) packet.directions[k] = rays[first + k].direction;
      for (std::uint32_t hidden = surface_->hidden(packet, (1U << count) - 1U); hidden != 0;
           hidden &= hidden - 1)
        sky_view[i] -= rays[first + std::countr_zero(hidden)].light;
    }
  }
}

Cost RayRace::trace(const DomeLight& light, Packing packing) {
  const std::vector<DomeRay> rays = rays_of(light);
  const Meter tracing;
  tbb::parallel_for(std::size_t{0}, blocks_.size(),
                    [&](std::size_t block) { trace_block(block, rays, packing); });
  return tracing.cost();
}

void RayRace::check_sky_view(const Dome& dome, Findings& findings) const {
  const GridFrame& frame = ground_.terrain.frame();
  std::vector<float> ours(frame.size(), 0.0F);
  solve_tiles(ground_, testing::even_sky(dome), [&](const TileShares& tile) {
    for (std::size_t i = 0; i < tile.usable.size(); ++i) {
      const std::size_t row = static_cast<std::size_t>(tile.window.row) + i / tile.window.columns;
      ours[row * frame.columns + tile.window.column + i % tile.window.columns] =
          tile.of(i)[testing::kSkyColumn];
    }
  });
  std::vector<double> apart;
  double sum = 0.0;
  for (std::size_t i = 0; i < sky_view_.size(); ++i) {
    const Block& block = blocks_[i / kPacket];
    if ((block.usable >> (i % kPacket) & 1U) == 0) continue;
    const CellIndex cell = block.cells[i % kPacket];
    const double gap =
        double(ours[static_cast<std::size_t>(cell.row) * frame.columns + cell.column]) - sky_view_[i];
    sum += gap;
    apart.push_back(std::abs(gap));
  }
  std::sort(apart.begin(), apart.end());
  const double mean = sum / double(apart.size()), most_cells = apart[apart.size() * 95 / 100];
  findings.check(
      std::abs(mean) <= kMeanLimit && most_cells <= kMostCellsLimit,
      fmt::format("sky view of {} cells against rays: mean {:+.3f} %, 95th {:.3f} %, most {:.3f} %",
                  apart.size(), 100.0 * mean, 100.0 * most_cells, 100.0 * apart.back()));
}

}  // namespace sunfall::bench

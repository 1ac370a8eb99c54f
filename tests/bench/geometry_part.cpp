#include "bench/geometry_part.h"

#include <fmt/format.h>
#include <tbb/enumerable_thread_specific.h>
#include <tbb/parallel_for.h>

#include <algorithm>
#include <random>

#include "bench/horizon_march.h"
#include "geo/geodesy.h"
#include "map/layers.h"
#include "map/tiles.h"
#include "sunfall/map.h"

namespace sunfall::bench {
namespace {

constexpr unsigned kSeed = 20250621;

bool inside(const CellWindow& window, CellIndex cell) {
  return cell.column >= window.column && cell.column < window.column + window.columns &&
         cell.row >= window.row && cell.row < window.row + window.rows;
}

void keep(const TileShares& shares, const TileLight& light, std::vector<CellLight>& cells) {
  for (CellLight& kept : cells) {
    if (!inside(shares.window, kept.cell)) continue;
    const std::size_t at =
        static_cast<std::size_t>(kept.cell.row - shares.window.row) * shares.window.columns +
        static_cast<std::size_t>(kept.cell.column - shares.window.column);
    kept.usable = shares.usable[at] != 0;
    kept.shares.assign(shares.of(at), shares.of(at) + shares.columns);
    kept.dli.clear();
    for (const std::vector<float>& period : light.dli) kept.dli.push_back(period[at]);
    kept.dli.push_back(light.year[at]);
  }
}

oracle::MonthShares months_of(const double* beam, const double* sky) {
  oracle::MonthShares out;
  std::copy_n(beam, 12, out.beam.begin());
  std::copy_n(sky, 12, out.sky.begin());
  return out;
}

}  // namespace

Cost solve_tiles(const oracle::Ground& ground, const DomeLight& light,
                 const std::function<void(const TileShares&)>& take) {
  const GridFrame& frame = ground.terrain.frame();
  const std::vector<CellWindow> tiles = tiles_of(frame, MapOptions{}.tile_cells);
  const Meter meter;
  const TileSolver solver(ground.terrain, light, ground.plan.site.receiver_plane);
  tbb::enumerable_thread_specific<TileRoom> rooms;
  tbb::parallel_for(
      tbb::blocked_range<std::size_t>(0, tiles.size(), 1),
      [&](const tbb::blocked_range<std::size_t>& range) {
        for (std::size_t t = range.begin(); t < range.end(); ++t) {
          const CellWindow& window = tiles[t];
          const CellIndex middle{window.column + window.columns / 2, window.row + window.rows / 2};
          const Angle convergence = geo_place(frame, frame.centre(middle)).convergence;
          take(solver.solve(ground.terrain.tile(window), convergence, rooms.local()));
        }
      },
      tbb::simple_partitioner());
  return meter.cost();
}

Cost geometry_and_light(const oracle::Ground& ground, const DomeLight& light, std::vector<CellLight>& cells) {
  const OpenField open = open_field(light);
  return solve_tiles(ground, light,
                     [&](const TileShares& shares) { keep(shares, light_of(shares, open), cells); });
}

std::vector<CellLight> some_cells(const GridFrame& frame, std::size_t count) {
  std::vector<CellLight> cells;
  std::mt19937 random(kSeed);
  const auto below = [&random](int bound) {
    return static_cast<int>(random() % static_cast<unsigned>(bound));
  };
  while (cells.size() < count) {
    const CellIndex cell{below(frame.columns), below(frame.rows)};
    const auto same = [cell](const CellLight& other) { return other.cell == cell; };
    if (std::none_of(cells.begin(), cells.end(), same)) cells.push_back({cell, false, {}, {}});
  }
  return cells;
}

void check_against_march(const oracle::Ground& ground, const DomeLight& light,
                         const std::vector<CellLight>& cells, Findings& findings) {
  const HorizonMarch march(ground.terrain);
  const LightBelow below(light);
  std::vector<const CellLight*> usable;
  for (const CellLight& cell : cells) {
    if (cell.usable) usable.push_back(&cell);
  }
  std::vector<oracle::MonthShares> ours(usable.size()), marched(usable.size());
  tbb::parallel_for(std::size_t{0}, usable.size(), [&](std::size_t i) {
    const CellLight& cell = *usable[i];
    const std::vector<double> own(cell.shares.begin(), cell.shares.end());
    ours[i] = months_of(own.data(), own.data() + light.periods.size());
    const std::vector<double> plain = march.shares(cell.cell, ground, light.dome, below);
    marched[i] = months_of(plain.data(), plain.data() + light.periods.size());
  });
  const oracle::MonthShares open = months_of(light.beam.open.data(), light.sky.open.data());
  for (const auto& [kind, name] : {std::pair{oracle::Light::beam, "beam"}, {oracle::Light::sky, "sky"}}) {
    oracle::Spread worst;
    for (int month = 0; month < 12; ++month) {
      const oracle::Spread spread = oracle::spread(ours, marched, open, kind, month);
      if (spread.p95 >= worst.p95) worst = spread;
      if (spread.mean > kMeanLimit) worst = spread;
    }
    findings.check(
        usable.size() > cells.size() / 2 && worst.mean <= kMeanLimit && worst.p95 <= kMostCellsLimit,
        fmt::format("{} of {} cells against a plain march, the worst month: {}", name, usable.size(),
                    oracle::told(worst)));
  }
}

}  // namespace sunfall::bench

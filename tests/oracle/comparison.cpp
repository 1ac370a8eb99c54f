#include "oracle/comparison.h"

#include <fmt/format.h>
#include <tbb/parallel_for.h>

#include <algorithm>
#include <cmath>
#include <random>

#include "map/open_terrain.h"
#include "map/site.h"
#include "map/tile_solver.h"

namespace sunfall::oracle {
namespace {

Terrain terrain_of(const Plan& plan) {
  SilentProgress quiet;
  return Terrain(open_terrain(plan.site), quiet);
}

double in_open_light(const MonthShares& shares, const MonthShares& open, Light light, int month) {
  const double beam = light == Light::sky ? 0.0 : shares.beam[month] * open.beam[month];
  const double sky = light == Light::beam ? 0.0 : shares.sky[month] * open.sky[month];
  return (beam + sky) / (open.beam[month] + open.sky[month]);
}

}  // namespace

Ground::Ground(Plan opened)
    : plan(std::move(opened)), series(open_site(plan).series), terrain(terrain_of(plan)) {
  convergence = geo_place(terrain.frame(), terrain.frame().middle()).convergence;
}

MapShares::MapShares(const Ground& ground, DomeQuality quality, int tile_cells)
    : columns_(ground.terrain.frame().columns),
      usable_(ground.terrain.frame().size()),
      shares_(ground.terrain.frame().size()) {
  const GridFrame& frame = ground.terrain.frame();
  const DomeLight light =
      make_dome_light(ground.series, Dome::of(quality), ground.plan.dome.sky, month_periods());
  const TileSolver solver(ground.terrain, light, ReceiverPlane::level);
  std::vector<CellWindow> tiles;
  for (int row = 0; row < frame.rows; row += tile_cells) {
    for (int column = 0; column < frame.columns; column += tile_cells) {
      tiles.push_back({column, row, std::min(tile_cells, frame.columns - column),
                       std::min(tile_cells, frame.rows - row)});
    }
  }
  tbb::parallel_for(std::size_t{0}, tiles.size(), [&](std::size_t t) {
    const CellWindow& window = tiles[t];
    const CellIndex middle{window.column + window.columns / 2, window.row + window.rows / 2};
    const TileShares tile =
        solver.solve(ground.terrain.tile(window), geo_place(frame, frame.centre(middle)).convergence);
    for (int row = 0; row < window.rows; ++row) {
      for (int column = 0; column < window.columns; ++column) {
        const std::size_t from = static_cast<std::size_t>(row) * window.columns + column;
        const std::size_t to = at({window.column + column, window.row + row});
        usable_[to] = tile.usable[from];
        std::copy_n(tile.of(from), 12, shares_[to].beam.begin());
        std::copy_n(tile.of(from) + 12, 12, shares_[to].sky.begin());
      }
    }
  });
}

std::vector<CellIndex> random_cells(const Ground& ground, const MapShares& shares, std::size_t count,
                                    unsigned seed) {
  std::vector<CellIndex> cells;
  for (int row = 0; row < ground.terrain.frame().rows; ++row) {
    for (int column = 0; column < ground.terrain.frame().columns; ++column) {
      if (shares.usable({column, row})) cells.push_back({column, row});
    }
  }
  std::mt19937 random(seed);
  for (std::size_t i = 0; i + 1 < cells.size(); ++i)
    std::swap(cells[i], cells[i + random() % (cells.size() - i)]);
  cells.resize(std::min(count, cells.size()));
  return cells;
}

std::vector<MonthShares> ray_shares(const Ground& ground, const OracleLight& light,
                                    std::span<const CellIndex> cells, int azimuths) {
  std::vector<MonthShares> out(cells.size());
  for (const Diagonal diagonal : {Diagonal::falling, Diagonal::rising}) {
    const RaySurface surface(ground.terrain, diagonal);
    tbb::parallel_for(std::size_t{0}, cells.size(), [&](std::size_t i) {
      const CellIndex cell = cells[i];
      const float height = ground.terrain.ground({cell.column, cell.row, 1, 1}).at(0, 0);
      const MonthShares shares =
          light.under(surface.horizon(cell, double(height) + ground.plan.site.receiver_height_m, azimuths));
      for (int month = 0; month < 12; ++month) {
        out[i].beam[month] += 0.5 * shares.beam[month];
        out[i].sky[month] += 0.5 * shares.sky[month];
      }
    });
  }
  return out;
}

Spread spread(const std::vector<MonthShares>& a, const std::vector<MonthShares>& b, const MonthShares& open,
              Light light, int month) {
  Spread out;
  std::vector<double> gaps;
  for (std::size_t i = 0; i < a.size(); ++i) {
    const double gap = in_open_light(a[i], open, light, month) - in_open_light(b[i], open, light, month);
    out.bias += gap / static_cast<double>(a.size());
    out.mean += std::abs(gap) / static_cast<double>(a.size());
    gaps.push_back(std::abs(gap));
    if (gaps[i] > gaps[out.worst]) out.worst = i;
  }
  out.most = gaps[out.worst];
  std::sort(gaps.begin(), gaps.end());
  out.median = gaps[gaps.size() / 2];
  out.p95 = gaps[gaps.size() * 95 / 100];
  return out;
}

std::string told(const Spread& s) {
  return fmt::format("bias {:+.3f} %, mean {:.3f} %, median {:.3f} %, 95th {:.3f} %, most {:.3f} %",
                     100 * s.bias, 100 * s.mean, 100 * s.median, 100 * s.p95, 100 * s.most);
}

}  // namespace sunfall::oracle

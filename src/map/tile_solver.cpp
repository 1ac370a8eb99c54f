#include "map/tile_solver.h"

#include <algorithm>
#include <cmath>
#include <tuple>

#include "map/accumulate.h"

namespace sunfall {
namespace {

// Looks that are added up together: their tables should stay in the second cache.
constexpr int kBatch = 8;
static_assert(kBatch <= kMostLooks);
// Looks whose horizons are kept at a time: the sums, larger than any cache, pass once for all of them.
constexpr int kKept = 6 * kBatch;

// The near rows are looked along once for looks that lie within this of it and share its heading.
constexpr double kNearTolerance_deg = 2.0;

double apart_deg(GridAzimuth a, GridAzimuth b) {
  const double degrees = wrapped(a.from_grid_north - b.from_grid_north).degrees();
  return std::min(degrees, 360.0 - degrees);
}

}  // namespace

const Casters& TileSolver::no_casters() {
  static const Casters none;
  return none;
}

TileSolver::TileSolver(const Terrain& terrain, const DomeLight& light, ReceiverPlane plane,
                       const Casters& casters)
    : terrain_(terrain), looks_(looks_of(light)), plane_(plane), level_(light, looks_), casters_(casters) {
  if (plane == ReceiverPlane::ground) slope_.emplace(light, looks_);
  if (!casters.empty()) caster_tables_.emplace(light, looks_, level_, slope_ ? &*slope_ : nullptr, casters);
  sweep_options_.cell_m = terrain.frame().cell_m;
}

// The azimuth of the last look that near rows along it can serve together with this one, so that
// looks on both sides share it.
GridAzimuth TileSolver::near_azimuth_for(std::size_t look, Angle convergence) const {
  const GridAzimuth own = to_grid(looks_[look].azimuth, convergence);
  GridAzimuth last = own;
  for (std::size_t next = look + 1; next < looks_.size(); ++next) {
    const GridAzimuth azimuth = to_grid(looks_[next].azimuth, convergence);
    if (apart_deg(own, azimuth) > kNearTolerance_deg || heading_of(azimuth) != heading_of(own)) break;
    last = azimuth;
  }
  return last;
}

template <typename Take>
void TileSolver::batches(HorizonSweep& sweep, const CellWindow& window, Angle convergence, TileRoom& room,
                         Take take) const {
  const std::size_t cells = static_cast<std::size_t>(window.columns) * window.rows;
  room.steps.resize(cells * kKept);
  std::vector<HorizonBatch> kept;
  std::size_t looks_kept = 0;
  const auto flush = [&] {
    if (!kept.empty()) take(kept);
    kept.clear();
    looks_kept = 0;
  };
  std::optional<GridAzimuth> near_azimuth;
  for (std::size_t look = 0; look < looks_.size(); ++look) {
    const GridAzimuth azimuth = to_grid(looks_[look].azimuth, convergence);
    const Heading heading = heading_of(azimuth);
    // The near rows hardly change within a few degrees: one look along them serves three lines.
    const bool near_serves = near_azimuth && apart_deg(*near_azimuth, azimuth) <= kNearTolerance_deg &&
                             heading_of(*near_azimuth) == heading;
    if (!near_serves) {
      near_azimuth = near_azimuth_for(look, convergence);
      sweep.look_near(*near_azimuth);
    }
    if (looks_kept == kKept) flush();
    if (kept.empty() || kept.back().steps.size() == kBatch || kept.back().by_columns != by_columns(heading)) {
      kept.push_back({look, {}, window.rows, window.columns, by_columns(heading)});
    }
    std::uint16_t* place = room.steps.data() + cells * looks_kept++;
    sweep.look_far(azimuth, place);
    kept.back().steps.push_back(place);
  }
  flush();
}

std::vector<TileSolver::CasterView> TileSolver::views_of(const TerrainTile& tile) const {
  std::vector<CasterView> views;
  for (std::size_t i = 0; i < casters_.size(); ++i) {
    if (auto view = casters_[i]->tile(tile)) {
      const std::optional<int> crop = casters_[i]->crop();
      views.push_back({std::move(view), caster_tables_->group_of(i), crop, casters_[i]->one_state()});
    }
  }
  return views;
}

TileCrops TileSolver::crops_of(std::span<const CasterView> views, std::size_t cells) const {
  TileCrops out;
  out.columns = columns();
  std::vector<std::int32_t> slot_of;
  for (const CasterView& view : views) {
    if (!view.crop) continue;
    if (slot_of.empty()) slot_of.assign(cells, -1);
    TileCrops::Crop crop{view.group, view.tile->crop_cells(), {}};
    for (const std::uint32_t cell : crop.cells) {
      if (slot_of[cell] < 0) {
        slot_of[cell] = static_cast<std::int32_t>(out.cells.size());
        out.cells.push_back(cell);
        out.numbers.push_back(*view.crop);
      }
      crop.slots.push_back(static_cast<std::uint32_t>(slot_of[cell]));
    }
    out.crops.push_back(std::move(crop));
  }
  out.taken.assign(out.cells.size() * 2 * out.columns, 0.0F);
  out.came.assign(out.cells.size() * out.columns, 0.0F);
  return out;
}

// In every state of leaf.
void TileSolver::append_taken(const CasterView& view, GridAzimuth azimuth, float tangent,
                              std::vector<CropTaken>& out) const {
  for (int state = 0; state < caster_tables_->states(); ++state) {
    const double leaf = caster_tables_->leaf_of(state)[view.group] / 256.0;
    CropTaken taken;
    if (view.one_state) {
      taken = leaf > 0.0 ? view.tile->taken(azimuth, tangent, 1.0) : CropTaken{};
      const float part = static_cast<float>(leaf);
      taken = {part * taken.right, part * taken.left, part};
    } else {
      taken = view.tile->taken(azimuth, tangent, leaf);
    }
    out.push_back(taken);
  }
}

template <typename Take>
void TileSolver::caster_batches(const HorizonBatch& horizons, std::span<const CasterView> views,
                                Angle convergence, TileRoom& room, Take take) const {
  const std::size_t cells = static_cast<std::size_t>(horizons.rows) * horizons.columns;
  const std::vector<CasterBand>& bands = caster_tables_->bands();
  const int groups = caster_tables_->groups();
  room.depths.resize(cells * bands.size() * groups * caster_looks(groups));
  CasterBatch batch{{}, horizons.rows, horizons.columns, horizons.by_columns};
  std::size_t planes_used = 0;
  const auto flush = [&] {
    if (!batch.looks.empty()) take(batch);
    batch.looks.clear();
    planes_used = 0;
  };
  for (std::size_t i = 0; i < horizons.steps.size(); ++i) {
    const std::size_t look = horizons.first_look + i;
    const GridAzimuth azimuth = to_grid(looks_[look].azimuth, convergence);
    float highest = 0.0F;
    for (const CasterView& view : views) highest = std::max(highest, view.tile->highest_tangent(azimuth));
    CasterLook of_look{horizons.steps[i], {}, look};
    for (std::size_t b = 0; b < bands.size() && bands[b].tangent <= highest; ++b) {
      Depth* const planes = room.depths.data() + planes_used * cells;
      std::fill(planes, planes + cells * groups, Depth{0});
      bool touched = false, others = false;
      for (const CasterView& view : views) {
        const std::span<Depth> plane(planes + cells * static_cast<std::size_t>(view.group), cells);
        const bool added = view.tile->add_depth(azimuth, bands[b].tangent, plane);
        touched = touched || added;
        others = others || (added && !view.crop);
      }
      DepthPlanes of_band{static_cast<int>(b), {}, {}, others};
      for (const CasterView& view : views) {
        if (view.crop) append_taken(view, azimuth, bands[b].tangent, of_band.crops);
      }
      if (!touched && of_band.crops.empty()) continue;
      for (int g = 0; g < groups; ++g) of_band.groups.push_back(planes + cells * static_cast<std::size_t>(g));
      of_look.bands.push_back(std::move(of_band));
      planes_used += static_cast<std::size_t>(groups);
    }
    if (!of_look.bands.empty()) batch.looks.push_back(std::move(of_look));
    if (batch.looks.size() == caster_looks(groups)) flush();
  }
  flush();
}

void TileSolver::solve_level(HorizonSweep& sweep, std::span<const CasterView> views, Angle convergence,
                             TileRoom& room, TileShares& out) const {
  const std::size_t cells = out.usable.size();
  const int blocks = level_.blocks();
  std::vector<AlignedVector<std::uint32_t>>& sums = room.level_sums;
  sums.resize(blocks);
  for (auto& sum : sums) sum.assign(cells * kColumnBlock, 0);
  batches(sweep, out.window, convergence, room, [&](std::span<const HorizonBatch> kept) {
    for (int block = 0; block < blocks; ++block) {
      accumulate_level(
          kept, [&](std::size_t look) { return level_.look(look, block); }, sums[block].data());
    }
    if (views.empty()) return;
    for (const HorizonBatch& horizons : kept) {
      caster_batches(horizons, views, convergence, room, [&](const CasterBatch& batch) {
        for (int block = 0; block < blocks; ++block) {
          accumulate_casters(batch, *caster_tables_, level_, block, sums[block].data());
        }
        accumulate_crops(batch, *caster_tables_, level_, out.crops);
      });
    }
  });
  std::vector<float> units(level_.units().begin(), level_.units().end());
  for (std::size_t cell = 0; cell < cells; ++cell) {
    float* shares = out.shares.data() + cell * out.columns;
    for (int c = 0; c < out.columns; ++c) {
      const std::uint32_t lost = sums[c / kColumnBlock][cell * kColumnBlock + c % kColumnBlock];
      shares[c] = std::max(0.0F, 1.0F - static_cast<float>(lost) * units[c]);
    }
  }
}

void TileSolver::solve_slope(HorizonSweep& sweep, std::span<const CasterView> views, Angle convergence,
                             TileRoom& room, TileShares& out) const {
  const CellWindow& window = out.window;
  const std::size_t cells = out.usable.size();
  const int width = slope_->padded();
  // Rise of the ground per metre to east and north, by central differences; from one side where the
  // other is missing, as at the map's edge.
  const CellWindow around{window.column - 1, window.row - 1, window.columns + 2, window.rows + 2};
  const Grid<float> ground = terrain_.ground(around);
  std::vector<float> east(cells), north(cells);
  const float per_m = static_cast<float>(1.0 / sweep_options_.cell_m);
  const auto rise = [per_m](float before, float here, float after) {
    const float from = std::isnan(before) ? here : before, to = std::isnan(after) ? here : after;
    const bool both = !std::isnan(before) && !std::isnan(after);
    return std::isnan(to - from) ? 0.0F : (to - from) * (both ? 0.5F * per_m : per_m);
  };
  for (int row = 0; row < window.rows; ++row) {
    for (int column = 0; column < window.columns; ++column) {
      const std::size_t cell = static_cast<std::size_t>(row) * window.columns + column;
      const float here = ground.at(column + 1, row + 1);
      east[cell] = rise(ground.at(column, row + 1), here, ground.at(column + 2, row + 1));
      north[cell] = rise(ground.at(column + 1, row + 2), here, ground.at(column + 1, row));
    }
  }
  // Open light on the plane: level - rise·facing summed over the lines, linear in the rise.
  std::vector<double> open_east(width, 0.0), open_north(width, 0.0);
  std::vector<float> towards_east(looks_.size()), towards_north(looks_.size());
  for (std::size_t look = 0; look < looks_.size(); ++look) {
    const Angle azimuth = to_grid(looks_[look].azimuth, convergence).from_grid_north;
    towards_east[look] = static_cast<float>(sin(azimuth));
    towards_north[look] = static_cast<float>(cos(azimuth));
    for (int c = 0; c < width; ++c) {
      open_east[c] += sin(azimuth) * slope_->open_facing(look)[c];
      open_north[c] += cos(azimuth) * slope_->open_facing(look)[c];
    }
  }
  std::vector<float>& sums = room.slope_sums;
  sums.assign(cells * width, 0.0F);
  batches(sweep, window, convergence, room, [&](std::span<const HorizonBatch> kept) {
    for (const HorizonBatch& batch : kept) {
      const std::size_t first = batch.first_look;
      std::vector<const float*> tables(batch.steps.size());
      for (std::size_t i = 0; i < tables.size(); ++i) tables[i] = slope_->look(first + i);
      SlopeTables slope{tables,
                        width,
                        east.data(),
                        north.data(),
                        std::span(towards_east).subspan(first, tables.size()),
                        std::span(towards_north).subspan(first, tables.size())};
      accumulate_slope(batch, slope, sums.data());
      if (views.empty()) continue;
      caster_batches(batch, views, convergence, room, [&](const CasterBatch& casters) {
        accumulate_casters_on_slope(casters, *caster_tables_, slope, first, sums.data());
        accumulate_crops(casters, *caster_tables_, level_, out.crops);
      });
    }
  });
  for (std::size_t cell = 0; cell < cells; ++cell) {
    const double upright =
        1.0 / std::sqrt(1.0 + double(east[cell]) * east[cell] + double(north[cell]) * north[cell]);
    for (int c = 0; c < out.columns; ++c) {
      const double open = 1.0 - east[cell] * open_east[c] - north[cell] * open_north[c];
      const bool dark = level_.units()[c] == 0.0;
      out.shares[cell * out.columns + c] =
          dark ? 1.0F : static_cast<float>(std::max(0.0, upright * (open - sums[cell * width + c])));
    }
  }
}

TileShares TileSolver::solve(const TerrainTile& tile, Angle convergence, TileRoom& room) const {
  TileShares out;
  out.window = tile.window;
  out.columns = columns();
  out.usable = tile.usable;
  out.shares.resize(tile.usable.size() * out.columns);
  HorizonSweep sweep(tile, sweep_options_);
  const std::vector<CasterView> views = views_of(tile);
  out.crops = crops_of(views, out.usable.size());
  if (plane_ == ReceiverPlane::level)
    solve_level(sweep, views, convergence, room, out);
  else
    solve_slope(sweep, views, convergence, room, out);
  out.crops.crops.clear();  // they look into the views
  return out;
}

}  // namespace sunfall

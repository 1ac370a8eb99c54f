#pragma once
// Shares of one tile: passage times dome light, without ever storing the passage.

#include <cstdint>
#include <optional>
#include <vector>

#include "map/accumulate_casters.h"
#include "map/caster_tables.h"
#include "map/loss_table.h"
#include "shade/horizon_sweep.h"
#include "shade/terrain.h"
#include "sunfall/dome.h"
#include "sunfall/plan.h"

namespace sunfall {

// Per cell (row by row) and column (beam of every period, then sky of every period), the fraction
// of the open field's light that arrives.
struct TileShares {
  CellWindow window;
  int columns = 0;
  std::vector<char> usable;   // 0: no receiver here
  std::vector<float> shares;  // [cell][columns]
  TileCrops crops;            // what crop rows take
  const float* of(std::size_t cell) const { return shares.data() + cell * columns; }
};

// Room that a thread uses for one tile after another, so that memory is not asked for anew each time.
struct TileRoom {
  std::vector<std::uint16_t> steps;
  std::vector<AlignedVector<std::uint32_t>> level_sums;
  std::vector<float> slope_sums;
  AlignedVector<Depth> depths;
};

class TileSolver {
 public:
  // `plane`: level receivers, or receivers in the plane of the ground.
  // `casters`, which are kept by reference, take their part of what the terrain leaves.
  TileSolver(const Terrain& terrain, const DomeLight& light, ReceiverPlane plane,
             const Casters& casters = no_casters());
  static const Casters& no_casters();

  // May be called from several threads. `convergence` is that of the tile's centre.
  TileShares solve(const TerrainTile& tile, Angle convergence, TileRoom& room) const;
  TileShares solve(const TerrainTile& tile, Angle convergence) const {
    TileRoom room;
    return solve(tile, convergence, room);
  }

  int columns() const { return level_.columns(); }

 private:
  // A caster's view of the tile, and the group that it adds to.
  struct CasterView {
    std::unique_ptr<CasterTile> tile;
    int group = 0;
    std::optional<int> crop;
    bool one_state = false;
  };
  std::vector<CasterView> views_of(const TerrainTile& tile) const;
  void append_taken(const CasterView& view, GridAzimuth azimuth, float tangent,
                    std::vector<CropTaken>& out) const;
  TileCrops crops_of(std::span<const CasterView> views, std::size_t cells) const;
  void solve_level(HorizonSweep& sweep, std::span<const CasterView> views, Angle convergence, TileRoom& room,
                   TileShares& out) const;
  void solve_slope(HorizonSweep& sweep, std::span<const CasterView> views, Angle convergence, TileRoom& room,
                   TileShares& out) const;
  // Calls take(batch) with what the casters do to a few looks of a batch of horizons at a time.
  template <typename Take>
  void caster_batches(const HorizonBatch& horizons, std::span<const CasterView> views, Angle convergence,
                      TileRoom& room, Take take) const;
  GridAzimuth near_azimuth_for(std::size_t look, Angle convergence) const;
  // Calls take(batches) with the horizons of several looks at a time.
  template <typename Take>
  void batches(HorizonSweep& sweep, const CellWindow& window, Angle convergence, TileRoom& room,
               Take take) const;

  const Terrain& terrain_;
  std::vector<Look> looks_;
  ReceiverPlane plane_;
  LossTable level_;                      // units and column count also serve sloped receivers
  std::optional<SlopeLossTable> slope_;  // only for receivers in the plane of the ground
  const Casters& casters_;
  std::optional<CasterTables> caster_tables_;  // only where there are casters
  SweepOptions sweep_options_;
};

}  // namespace sunfall

#pragma once
// Porous canopy on the map's grid: trees, hedges, windbreaks as columns of leaves that stand on the ground of
// their cells. Optical depth along a ray is √α G Ω × leaf density × metres within columns (Beer-Lambert; G
// after Campbell 1986, √α after Goudriaan 1977), found by canopy_sweep.h.

#include <memory>

#include "geo/canopy_source.h"
#include "shade/caster.h"
#include "shade/leaf_depth.h"

namespace sunfall {

// Leaves farther than so many rows, or so far that the map's highest leaves stand lower than this above its
// lowest ground, do not count. A row is a cell long towards grid north, and up to 1.41 cells between.
inline constexpr int kCanopyReach = 1024;
inline constexpr double kLowestCanopyDeg = 1.5;

struct CanopyOptions {
  LeafKind leaves;
  std::array<double, 12> leafing = {1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1};  // share of full leaf by month
};

// Leaves in cells whose ground is unknown do not count. Receivers may stand under, in and beside leaves.
class Canopy : public Caster {
 public:
  // `terrain` must outlive the caster.
  Canopy(std::shared_ptr<const CanopySource> source, const Terrain& terrain, const CanopyOptions& options);

  const std::array<double, 12>& leafing() const override { return options_.leafing; }
  std::unique_ptr<CasterTile> tile(const TerrainTile& tile) const override;

  // Rows within which leaves count, the same for every tile.
  int reach() const { return reach_; }
  // Heights are told apart by so much, and by an eighth of what a ray rises in a row.
  double bin_m() const { return static_cast<double>(bin_m_); }

 private:
  std::shared_ptr<const CanopySource> source_;
  const Terrain& terrain_;
  CanopyOptions options_;
  LeafDepth depth_;
  int reach_ = 0;
  float bin_m_ = 0.25F;
};

}  // namespace sunfall

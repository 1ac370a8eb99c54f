#pragma once
// Canopy seen from one tile: the leaves around it, turned to each direction's rows as needed.

#include <array>
#include <vector>

#include "shade/canopy_sweep.h"
#include "shade/caster.h"
#include "shade/leaf_depth.h"
#include "shade/row_direction.h"

namespace sunfall {

// What is the same for all tiles of a map.
struct CanopyScene {
  double cell_m = 1.0;
  float zero_m = 0.0F;  // heights count from here
  float bin_m = 0.25F;  // least height of the sweep's bins
  int reach = 0;        // rows
};

class CanopyTile : public CasterTile {
 public:
  // `leaves`: rows of the map around the tile, as far as the reach.
  CanopyTile(const TerrainTile& tile, LeafLines leaves, const CanopyScene& scene, const LeafDepth& depth);

  float highest_tangent(GridAzimuth azimuth) override;
  bool add_depth(GridAzimuth azimuth, float tangent, std::span<Depth> depth) override;

 private:
  // The tile and its leaves as rows of the map, or as columns.
  struct View {
    LeafLines leaves;
    std::vector<float> receivers;   // above zero_m; kCanopySpare behind
    std::vector<float> row_lowest;  // of them
  };
  struct LeafBlock {  // kBlock × kBlock cells with leaves among them
    int column = 0, row = 0;
    float top_m = 0.0F;
  };
  const View& view(bool columns);
  // Rays of one direction: what they rise in a row, and optical depth per metre in leaves of density 1.
  struct Rays {
    RowDirection rows;
    double sine = 1.0, rise_m = 0.0, row_m = 1.0;  // row_m: a ray's length within a row
    double depth_per_m = 0.5;
  };
  Rays rays(GridAzimuth azimuth, double tangent) const;
  bool add_rows_before(const Rays& rays, std::span<Depth> depth);
  bool add_own_columns(const Rays& rays, std::span<Depth> depth) const;
  void add_swept(Heading heading, std::span<Depth> depth) const;
  void find_lowest(View& view, int rows) const;
  void gather_blocks();

  static constexpr int kBlock = 32;

  CellWindow window_;
  int map_columns_ = 0, map_rows_ = 0;
  CanopyScene scene_;
  LeafDepth depth_;
  std::array<View, 2> views_;
  float lowest_m_ = 0.0F;   // receiver, above zero_m
  float highest_m_ = 0.0F;  // leaf, likewise
  std::vector<LeafBlock> blocks_;
  CanopySweep sweep_;
  std::vector<std::uint16_t> swept_;
};

}  // namespace sunfall

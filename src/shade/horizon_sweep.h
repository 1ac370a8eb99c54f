#pragma once
// Horizons of all cells of a tile, one direction of light at a time.
//
// Near rows (kNearRows) are looked at one by one along the direction from each cell's own centre,
// the nearest also halfway, for a surface that is linear between cell centres. Beyond them the
// horizon comes from parallel lines that each keep a hull (horizon_kernel.h), read between the two
// lines beside a cell, from the cell's own eye to the points found at the node rows around it.

#include <array>
#include <cstdint>
#include <vector>

#include "shade/horizon_kernel.h"
#include "shade/row_direction.h"
#include "shade/row_loops.h"
#include "shade/terrain.h"
#include "sunfall/angle.h"

namespace sunfall {

struct SweepOptions {
  double cell_m = 1.0;
  // Drop of the far ground below the level plane: distance² · (1 - refraction) / (2 · radius).
  double earth_radius_m = 6'371'000.0;
  double refraction = 0.13;  // customary terrestrial refraction coefficient
};

class HorizonSweep {
 public:
  HorizonSweep(const TerrainTile& tile, const SweepOptions& options);

  // Looks along the nearest rows at this azimuth; the far looks that follow build on it, and may
  // differ from it by a degree or two within the same heading.
  void look_near(GridAzimuth azimuth);
  // Writes one horizon step (dome/horizon_steps.h) per tile cell: row by row, or column by column
  // for light from east or west.
  void look_far(GridAzimuth azimuth, std::uint16_t* steps);

 private:
  // One heading's view of the tile: u runs away from the light. Node rows and lines lie where they would
  // lie for any other tile of the map, so that tiles agree on what they see.
  struct March {
    bool ready = false;
    bool columns = false;   // u counts columns
    bool reversed = false;  // u runs towards the north-west
    int lead = 0;           // rows from u = 0, which every tile has on the same rows of the map, to the tile
    int rows = 0;           // from u = 0 to the tile's last row
    int map_u = 0;          // rows from the map's edge on the light's side to u = 0
    int width = 0;          // tile extent along v
    std::vector<MarchRow> march_rows;
    float covered_to = 0.0F;  // u up to which march_rows reach while they are gathered
    int tile_row = 0;
    std::vector<const float*> near;  // level-0 row at u = index - kNearRows, pointing at v = 0
    std::vector<float> receivers;    // turned to u, v order, with margin
    int receiver_stride = 0;
  };
  struct Direction {
    Heading heading;
    float lean = 0.0F;        // cells across per row
    float row_length = 1.0F;  // cells along the ray per row
  };

  Direction direction_of(GridAzimuth azimuth) const;
  March& march(Heading heading);
  void add_level_rows(March& m, int level);
  static void align_rows(March& m);
  void turn_receivers(March& m);
  const LevelGrid& oriented(int level, bool columns);
  static const float* eyes(const March& m, int u);
  static void append_near_rows(const March& m, const Direction& direction, int u, int first, int last,
                               std::vector<NearRow>& out);
  static void append_half_rows(const March& m, const Direction& direction, int u, std::vector<NearRow>& out);
  double bend_of(const Direction& direction) const;
  void sweep_far(const March& m, const Direction& direction, float first_v, int blocks);

  const TerrainTile& tile_;
  SweepOptions options_;
  std::array<March, 4> marches_;
  std::vector<LevelGrid> turned_;  // levels stored column by column
  int near_stride_ = 0;
  std::vector<float> near_;  // slopes to the nearest rows, u by v
  std::vector<float> far_height_, far_u_;
  int far_stride_ = 0;
  std::vector<float> parent_height_;
  std::vector<std::int32_t> parent_code_;
  SweepKernel kernel_;
};

}  // namespace sunfall

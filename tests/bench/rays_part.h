#pragma once
// The same dome by Embree's rays: one to the middle of every band at every azimuth, from every cell.

#include <memory>
#include <string>
#include <vector>

#include "bench/figures.h"
#include "oracle/comparison.h"
#include "oracle/ray_surface.h"

namespace sunfall::bench {

// Which rays Embree is given at a time. What runs alike is traced fastest together.
enum class Packing {
  cells,   // 16 neighbouring cells, one direction
  sector,  // one cell, 16 bands of an azimuth after another
  single,  // ray by ray
};

class RayRace {
 public:
  // Takes about `count` cells of the map in blocks of 4 × 4 on a regular lattice.
  RayRace(const oracle::Ground& ground, std::size_t count);

  // From every sampled cell, on all cores: rays at the azimuths that the solver looks along for this
  // light, to the middle of each of the dome's bands.
  Cost trace(const DomeLight& light, Packing packing);
  std::size_t sampled_cells() const;
  // Of the tree; not counted against the rays.
  const Cost& building() const { return building_; }

  // The sky view that the last rays found against the solver's own, under an even sky for both.
  void check_sky_view(const Dome& dome, Findings& findings) const;

 private:
  struct Block {
    oracle::RayEye eyes[oracle::kPacket];
    CellIndex cells[oracle::kPacket];
    std::uint32_t usable = 0;  // a bit a cell; the others are not traced
  };
  struct DomeRay {
    oracle::RayDirection direction;
    float light;  // of an even sky on the level, as a part of all
  };
  void place_blocks(std::size_t count);
  std::vector<DomeRay> rays_of(const DomeLight& light) const;
  void trace_block(std::size_t block, const std::vector<DomeRay>& rays, Packing packing);

  const oracle::Ground& ground_;
  Cost building_;
  std::unique_ptr<oracle::RaySurface> surface_;
  std::vector<Block> blocks_;
  std::vector<float> sky_view_;  // [block][cell]
};

}  // namespace sunfall::bench

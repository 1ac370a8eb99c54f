#pragma once
// Adds up what porous casters take of the light above each cell's horizon.

#include <cstdint>
#include <span>
#include <vector>

#include "map/accumulate.h"
#include "map/caster_tables.h"

namespace sunfall {

// The depths of one look and band at all cells of a tile, row by row, one plane per group of casters; and
// what each crop takes there.
struct DepthPlanes {
  int band = 0;
  std::vector<const Depth*> groups;
  std::vector<CropTaken> crops;  // [crop][state]
  bool others = false;           // whether casters that are no crops touch any cell
};

// Crops of a tile, and what they take: [slot][right, left][columns], shares of the open field's light. Other
// casters and the horizon have had their part before; other crops have not.
struct TileCrops {
  struct Crop {
    int group = 0;
    std::span<const std::uint32_t> cells;
    std::vector<std::uint32_t> slots;  // of those cells
  };
  std::vector<Crop> crops;
  std::vector<std::uint32_t> cells;  // [slot]
  std::vector<int> numbers;          // [slot]: the crop's number among the plan's rows
  int columns = 0;
  std::vector<float> taken;
  std::vector<float> came;  // [slot][columns]: what reaches the tops of the rows
};
// One look: the horizon steps of the cells, stored as in a HorizonBatch, and its bands that are touched.
struct CasterLook {
  const std::uint16_t* steps = nullptr;
  std::vector<DepthPlanes> bands;
  std::size_t look = 0;
};
struct CasterBatch {
  std::vector<CasterLook> looks;
  int rows = 0;
  int columns = 0;
  bool by_columns = false;  // of the steps
};

// sums[cell][32] += (light of the band above the cell's horizon) · (1 - what passes).
void accumulate_casters(const CasterBatch& batch, const CasterTables& tables, const LossTable& level,
                        int block, std::uint32_t* sums);

// Light on level ground, whatever plane receivers count in.
void accumulate_crops(const CasterBatch& batch, const CasterTables& tables, const LossTable& level,
                      TileCrops& crops);

// The same for receivers in the plane of the ground, into sums[cell][width].
void accumulate_casters_on_slope(const CasterBatch& batch, const CasterTables& tables,
                                 const SlopeTables& slope, std::size_t first_look, float* sums);

}  // namespace sunfall

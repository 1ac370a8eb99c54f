#pragma once
// Adds up what the horizons of several lines take from every cell of a tile. All columns of a cell
// stay in registers while the lines pass.

#include <cstddef>
#include <cstdint>
#include <functional>
#include <span>
#include <vector>

namespace sunfall {

inline constexpr int kMostLooks = 16;

// Horizon steps of a tile for up to kMostLooks looks; `by_columns` says that cells are stored column by
// column.
struct HorizonBatch {
  std::size_t first_look = 0;
  std::vector<const std::uint16_t*> steps;  // per look, one step per cell
  int rows = 0;
  int columns = 0;
  bool by_columns = false;
};

// sums[cell][32] += table(look)[step of the cell][32] over the looks of all batches; cells row by row.
// `table` gives a look's table.
void accumulate_level(std::span<const HorizonBatch> batches,
                      const std::function<const std::uint16_t*(std::size_t look)>& table,
                      std::uint32_t* sums);

// For receivers in the plane of the ground. With a cell's ground rising by `rise` per metre towards
// a line, light on its plane is n·(level - rise·facing), n being the upright part of its normal;
// sums gather level - rise·facing of the light below the horizon:
// sums[cell][width] += level[step][width] - rise·facing[step][width].
struct SlopeTables {
  std::span<const float* const> tables;  // per line, [step][2][width]
  int width = 0;                         // a multiple of 8
  const float* rise_east = nullptr;      // per cell, row by row
  const float* rise_north = nullptr;
  std::span<const float> towards_east;  // per line, unit vector on the ground
  std::span<const float> towards_north;
};
void accumulate_slope(const HorizonBatch& batch, const SlopeTables& slope, float* sums);

}  // namespace sunfall

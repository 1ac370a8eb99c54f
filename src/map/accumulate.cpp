#include "map/accumulate.h"

#include <algorithm>

#include "core/clones.h"
#include "dome/horizon_steps.h"
#include "map/loss_table.h"

namespace sunfall {
namespace {

// Cells in square blocks, so that steps stored column by column and sums stored row by row both
// stay in cache.
constexpr int kBlock = 16;

using Entries = std::uint16_t __attribute__((vector_size(32)));
using Sums = std::uint32_t __attribute__((vector_size(64)));

}  // namespace

SUNFALL_CLONES void accumulate_level(const HorizonBatch& batch, std::span<const std::uint16_t* const> tables,
                                     std::uint32_t* sums) {
  static_assert(kColumnBlock == 32, "two vectors of sixteen");
  const int lines = static_cast<int>(batch.steps.size());
  const std::size_t step_right = batch.by_columns ? static_cast<std::size_t>(batch.rows) : 1;
  const std::size_t step_down = batch.by_columns ? 1 : static_cast<std::size_t>(batch.columns);
  for (int row0 = 0; row0 < batch.rows; row0 += kBlock) {
    for (int column0 = 0; column0 < batch.columns; column0 += kBlock) {
      const int row1 = std::min(row0 + kBlock, batch.rows),
                column1 = std::min(column0 + kBlock, batch.columns);
      for (int row = row0; row < row1; ++row) {
        for (int column = column0; column < column1; ++column) {
          std::uint32_t* cell =
              sums + (static_cast<std::size_t>(row) * batch.columns + column) * kColumnBlock;
          const std::size_t place = row * step_down + column * step_right;
          Sums low, high;
          __builtin_memcpy(&low, cell, sizeof low);
          __builtin_memcpy(&high, cell + 16, sizeof high);
          for (int line = 0; line < lines; ++line) {
            const std::uint16_t* entry =
                tables[line] + static_cast<std::size_t>(batch.steps[line][place]) * kColumnBlock;
            Entries first, second;
            __builtin_memcpy(&first, entry, sizeof first);
            __builtin_memcpy(&second, entry + 16, sizeof second);
            low += __builtin_convertvector(first, Sums);
            high += __builtin_convertvector(second, Sums);
          }
          __builtin_memcpy(cell, &low, sizeof low);
          __builtin_memcpy(cell + 16, &high, sizeof high);
        }
      }
    }
  }
}

SUNFALL_CLONES void accumulate_slope(const HorizonBatch& batch, const SlopeTables& slope, float* sums) {
  const int lines = static_cast<int>(batch.steps.size());
  const int width = slope.width;
  for (int row = 0; row < batch.rows; ++row) {
    for (int column = 0; column < batch.columns; ++column) {
      const std::size_t index = static_cast<std::size_t>(row) * batch.columns + column;
      const std::size_t place =
          batch.by_columns ? static_cast<std::size_t>(column) * batch.rows + row : index;
      float* cell = sums + index * width;
      for (int line = 0; line < lines; ++line) {
        const float rise = slope.rise_east[index] * slope.towards_east[line] +
                           slope.rise_north[index] * slope.towards_north[line];
        const int step = std::max<int>(batch.steps[line][place], horizon_step(rise));
        const float* level = slope.tables[line] + static_cast<std::size_t>(step) * 2 * width;
        const float* facing = level + width;
        for (int c = 0; c < width; ++c) cell[c] += level[c] - rise * facing[c];
      }
    }
  }
}

}  // namespace sunfall

#include "map/accumulate.h"

#include <algorithm>

#include "core/clones.h"
#include "core/instruction_set.h"
#include "dome/horizon_steps.h"
#include "map/loss_table.h"

#if defined(__x86_64__)
// GCC 12 takes the deliberately undefined registers of its own header for forgotten ones.
#pragma GCC diagnostic push
#if !defined(__clang__)
#pragma GCC diagnostic ignored "-Wmaybe-uninitialized"
#endif
#include <immintrin.h>
#pragma GCC diagnostic pop
#endif

namespace sunfall {
namespace {

// Cells in square blocks, so that steps stored column by column and sums stored row by row both
// stay in cache.
constexpr int kBlock = 32;
static_assert(kColumnBlock == 32);

// Calls cell(sums of the cell, its place in the steps) for every cell.
template <typename Cell>
inline __attribute__((always_inline)) void for_each_cell(const HorizonBatch& batch, std::uint32_t* sums,
                                                         Cell cell) {
  const std::size_t right = batch.by_columns ? static_cast<std::size_t>(batch.rows) : 1;
  const std::size_t down = batch.by_columns ? 1 : static_cast<std::size_t>(batch.columns);
  for (int row0 = 0; row0 < batch.rows; row0 += kBlock) {
    for (int column0 = 0; column0 < batch.columns; column0 += kBlock) {
      const int row1 = std::min(row0 + kBlock, batch.rows),
                column1 = std::min(column0 + kBlock, batch.columns);
      for (int row = row0; row < row1; ++row) {
        for (int column = column0; column < column1; ++column) {
          cell(sums + (static_cast<std::size_t>(row) * batch.columns + column) * kColumnBlock,
               static_cast<std::size_t>(row) * down + static_cast<std::size_t>(column) * right);
        }
      }
    }
  }
}

inline const std::uint16_t* entry_of(const HorizonBatch& batch, const std::uint16_t* const* tables,
                                     std::size_t line, std::size_t place) {
  return tables[line] + static_cast<std::size_t>(batch.steps[line][place]) * kColumnBlock;
}

void accumulate_plain(const HorizonBatch& batch, const std::uint16_t* const* tables, std::uint32_t* sums) {
  for_each_cell(batch, sums, [&](std::uint32_t* cell, std::size_t place) {
    for (std::size_t line = 0; line < batch.steps.size(); ++line) {
      const std::uint16_t* entry = entry_of(batch, tables, line, place);
      for (int c = 0; c < kColumnBlock; ++c) cell[c] += entry[c];
    }
  });
}

#if defined(__x86_64__)
// GCC 12 widens 16 to 32 bits through half registers when left to itself, at three times the cost;
// hence the intrinsics.
__attribute__((target("avx2"))) void accumulate_avx2(const HorizonBatch& batch,
                                                     const std::uint16_t* const* tables,
                                                     std::uint32_t* sums) {
  for_each_cell(
      batch, sums, [&](std::uint32_t * cell, std::size_t place) __attribute__((target("avx2"))) {
        __m256i* to = reinterpret_cast<__m256i*>(cell);
        __m256i sum[4] = {_mm256_loadu_si256(to), _mm256_loadu_si256(to + 1), _mm256_loadu_si256(to + 2),
                          _mm256_loadu_si256(to + 3)};
        for (std::size_t line = 0; line < batch.steps.size(); ++line) {
          const __m128i* entry = reinterpret_cast<const __m128i*>(entry_of(batch, tables, line, place));
          for (int i = 0; i < 4; ++i) {
            sum[i] = _mm256_add_epi32(sum[i], _mm256_cvtepu16_epi32(_mm_loadu_si128(entry + i)));
          }
        }
        for (int i = 0; i < 4; ++i) _mm256_storeu_si256(to + i, sum[i]);
      });
}

__attribute__((target("avx512f,avx512bw"))) void accumulate_avx512(const HorizonBatch& batch,
                                                                   const std::uint16_t* const* tables,
                                                                   std::uint32_t* sums) {
  for_each_cell(
      batch, sums, [&](std::uint32_t * cell, std::size_t place) __attribute__((target("avx512f,avx512bw"))) {
        // Addresses first: the loads behind them then need not wait for one another.
        const std::uint16_t* entries[kMostLooks];
        const std::size_t looks = batch.steps.size();
        for (std::size_t look = 0; look < looks; ++look) entries[look] = entry_of(batch, tables, look, place);
        __m512i low = _mm512_loadu_si512(cell), high = _mm512_loadu_si512(cell + 16);
        for (std::size_t look = 0; look < looks; ++look) {
          const __m256i* entry = reinterpret_cast<const __m256i*>(entries[look]);
          low = _mm512_add_epi32(low, _mm512_cvtepu16_epi32(_mm256_loadu_si256(entry)));
          high = _mm512_add_epi32(high, _mm512_cvtepu16_epi32(_mm256_loadu_si256(entry + 1)));
        }
        _mm512_storeu_si512(cell, low);
        _mm512_storeu_si512(cell + 16, high);
      });
}
#endif

}  // namespace

void accumulate_level(const HorizonBatch& batch, std::span<const std::uint16_t* const> tables,
                      std::uint32_t* sums) {
#if defined(__x86_64__)
  switch (instruction_set()) {
    case InstructionSet::avx512: return accumulate_avx512(batch, tables.data(), sums);
    case InstructionSet::avx2: return accumulate_avx2(batch, tables.data(), sums);
    case InstructionSet::plain: break;
  }
#endif
  accumulate_plain(batch, tables.data(), sums);
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

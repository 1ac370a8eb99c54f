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

static_assert(kColumnBlock == 32);

// The sums of a block stay in the second cache while the looks of all batches pass, beside the tables of one
// batch; and steps stored column by column are read in whole cache lines.
constexpr int kBlockRows = 32;
constexpr int kBlockColumns = 64;

struct CellBlock {
  int row0, row1, column0, column1;
};

// Calls cell(sums of the cell, its place in the steps) for every cell of the block.
template <typename Cell>
inline __attribute__((always_inline)) void for_each_cell(const HorizonBatch& batch, const CellBlock& block,
                                                         std::uint32_t* sums, Cell cell) {
  const std::size_t right = batch.by_columns ? static_cast<std::size_t>(batch.rows) : 1;
  const std::size_t down = batch.by_columns ? 1 : static_cast<std::size_t>(batch.columns);
  for (int row = block.row0; row < block.row1; ++row) {
    for (int column = block.column0; column < block.column1; ++column) {
      cell(sums + (static_cast<std::size_t>(row) * batch.columns + column) * kColumnBlock,
           static_cast<std::size_t>(row) * down + static_cast<std::size_t>(column) * right);
    }
  }
}

inline const std::uint16_t* entry_of(const HorizonBatch& batch, const std::uint16_t* const* tables,
                                     std::size_t line, std::size_t place) {
  return tables[line] + static_cast<std::size_t>(batch.steps[line][place]) * kColumnBlock;
}

void accumulate_plain(const HorizonBatch& batch, const std::uint16_t* const* tables, const CellBlock& block,
                      std::uint32_t* sums) {
  for_each_cell(batch, block, sums, [&](std::uint32_t* cell, std::size_t place) {
    for (std::size_t line = 0; line < batch.steps.size(); ++line) {
      const std::uint16_t* entry = entry_of(batch, tables, line, place);
      for (int c = 0; c < kColumnBlock; ++c) cell[c] += entry[c];
    }
  });
}

#if defined(__x86_64__)
// Entries of kLooksPerWord looks fit 16 bits together, so they are widened once for all of them. GCC 12
// widens 16 to 32 bits through half registers when left to itself, at three times the cost; hence the
// intrinsics.
__attribute__((target("avx2"))) void accumulate_avx2(const HorizonBatch& batch,
                                                     const std::uint16_t* const* tables,
                                                     const CellBlock& block, std::uint32_t* sums) {
  for_each_cell(
      batch, block, sums, [&](std::uint32_t * cell, std::size_t place) __attribute__((target("avx2"))) {
        __m256i* to = reinterpret_cast<__m256i*>(cell);
        __m256i sum[4] = {_mm256_loadu_si256(to), _mm256_loadu_si256(to + 1), _mm256_loadu_si256(to + 2),
                          _mm256_loadu_si256(to + 3)};
        const std::size_t looks = batch.steps.size();
        for (std::size_t first = 0; first < looks; first += kLooksPerWord) {
          __m256i part[2] = {_mm256_setzero_si256(), _mm256_setzero_si256()};
          for (std::size_t look = first; look < std::min(first + kLooksPerWord, looks); ++look) {
            const __m256i* entry = reinterpret_cast<const __m256i*>(entry_of(batch, tables, look, place));
            part[0] = _mm256_add_epi16(part[0], _mm256_loadu_si256(entry));
            part[1] = _mm256_add_epi16(part[1], _mm256_loadu_si256(entry + 1));
          }
          for (int i = 0; i < 2; ++i) {
            sum[2 * i] = _mm256_add_epi32(sum[2 * i], _mm256_cvtepu16_epi32(_mm256_castsi256_si128(part[i])));
            sum[2 * i + 1] =
                _mm256_add_epi32(sum[2 * i + 1], _mm256_cvtepu16_epi32(_mm256_extracti128_si256(part[i], 1)));
          }
        }
        for (int i = 0; i < 4; ++i) _mm256_storeu_si256(to + i, sum[i]);
      });
}

__attribute__((target("avx512f,avx512bw"))) void accumulate_avx512(const HorizonBatch& batch,
                                                                   const std::uint16_t* const* tables,
                                                                   const CellBlock& block,
                                                                   std::uint32_t* sums) {
  for_each_cell(
      batch, block,
      sums, [&](std::uint32_t * cell, std::size_t place) __attribute__((target("avx512f,avx512bw"))) {
        // Addresses first: the loads behind them then need not wait for one another.
        const std::uint16_t* entries[kMostLooks];
        const std::size_t looks = batch.steps.size();
        for (std::size_t look = 0; look < looks; ++look) entries[look] = entry_of(batch, tables, look, place);
        __m512i low = _mm512_loadu_si512(cell), high = _mm512_loadu_si512(cell + 16);
        for (std::size_t first = 0; first < looks; first += kLooksPerWord) {
          __m512i part = _mm512_loadu_si512(entries[first]);
          for (std::size_t look = first + 1; look < std::min(first + kLooksPerWord, looks); ++look) {
            part = _mm512_add_epi16(part, _mm512_loadu_si512(entries[look]));
          }
          low = _mm512_add_epi32(low, _mm512_cvtepu16_epi32(_mm512_castsi512_si256(part)));
          high = _mm512_add_epi32(high, _mm512_cvtepu16_epi32(_mm512_extracti64x4_epi64(part, 1)));
        }
        _mm512_storeu_si512(cell, low);
        _mm512_storeu_si512(cell + 16, high);
      });
}
#endif

}  // namespace

void accumulate_level(std::span<const HorizonBatch> batches,
                      const std::function<const std::uint16_t*(std::size_t look)>& table,
                      std::uint32_t* sums) {
  auto* accumulate = accumulate_plain;
#if defined(__x86_64__)
  if (instruction_set() == InstructionSet::avx2) accumulate = accumulate_avx2;
  if (instruction_set() == InstructionSet::avx512) accumulate = accumulate_avx512;
#endif
  if (batches.empty()) return;
  std::vector<std::vector<const std::uint16_t*>> tables;
  for (const HorizonBatch& batch : batches) {
    auto& of_batch = tables.emplace_back();
    for (std::size_t i = 0; i < batch.steps.size(); ++i) of_batch.push_back(table(batch.first_look + i));
  }
  const int rows = batches.front().rows, columns = batches.front().columns;
  for (int row = 0; row < rows; row += kBlockRows) {
    for (int column = 0; column < columns; column += kBlockColumns) {
      const CellBlock block{row, std::min(row + kBlockRows, rows), column,
                            std::min(column + kBlockColumns, columns)};
      for (std::size_t i = 0; i < batches.size(); ++i) accumulate(batches[i], tables[i].data(), block, sums);
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

#include "shade/row_loops.h"

#include <algorithm>
#include <cmath>

#include "core/clones.h"
#include "dome/horizon_steps.h"
#include "shade/horizon_kernel.h"

namespace sunfall {

namespace {

// Sixteen cells at a time; the compiler splits them where registers are shorter.
using Cells = float __attribute__((vector_size(64)));
constexpr int kCells = 16;

inline Cells load(const float* p) {
  Cells cells;
  __builtin_memcpy(&cells, p, sizeof cells);
  return cells;
}

}  // namespace

// Two groups of cells stay in registers while the rows pass. The last groups of a row reach beyond
// the tile into its margin; `out` has room for them.
SUNFALL_CLONES void look_along_near_rows(const NearLook& look) {
  for (int begin = 0; begin < look.width; begin += 2 * kCells) {
    const Cells eyes0 = load(look.eyes + begin), eyes1 = load(look.eyes + begin + kCells);
    Cells best0 = {}, best1 = {};
    for (int n = 1; n <= kNearRows; ++n) {
      const NearRow& near = look.rows[n - 1];
      const float* row = near.values + begin;
      const Cells left0 = load(row), left1 = load(row + kCells);
      const Cells height0 = left0 + near.fraction * (load(row + 1) - left0);
      const Cells height1 = left1 + near.fraction * (load(row + kCells + 1) - left1);
      const Cells slope0 = (height0 - eyes0) * near.per_row, slope1 = (height1 - eyes1) * near.per_row;
      best0 = slope0 > best0 ? slope0 : best0;
      best1 = slope1 > best1 ? slope1 : best1;
    }
    best0 *= look.tangent_per_slope;
    best1 *= look.tangent_per_slope;
    __builtin_memcpy(look.out + begin, &best0, sizeof best0);
    __builtin_memcpy(look.out + begin + kCells, &best1, sizeof best1);
  }
}

SUNFALL_CLONES void combine_near_and_far(const FarRead& read) {
  for (int v = 0; v < read.width; ++v) {
    const float a = read.first[v] + read.first_fraction * (read.first[v + 1] - read.first[v]);
    const float b = read.second[v] + read.second_fraction * (read.second[v + 1] - read.second[v]);
    const float far = a + read.weight * (b - a);
    read.steps[v] = horizon_step(std::max(read.near[v], far));
  }
}

}  // namespace sunfall

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

inline Cells along(const float* row, float fraction) {
  const Cells left = load(row);
  return left + fraction * (load(row + 1) - left);
}

inline Cells raised(Cells best, const NearRow& near, int begin, Cells eyes) {
  Cells height = along(near.values + begin, near.fraction);
  if (near.other) height = 0.5F * (height + along(near.other + begin, near.fraction));
  const Cells slope = (height - eyes) * near.per_row;
  return slope > best ? slope : best;
}

}  // namespace

// Two groups of cells stay in registers while the rows pass. The last groups of a row reach beyond
// the tile into its margin; `out` has room for them.
SUNFALL_CLONES void look_along_near_rows(const NearLook& look) {
  for (int begin = 0; begin < look.width; begin += 2 * kCells) {
    const Cells eyes0 = load(look.eyes + begin), eyes1 = load(look.eyes + begin + kCells);
    Cells best0 = {}, best1 = {};
    if (look.start) {
      best0 = load(look.start + begin);
      best1 = load(look.start + begin + kCells);
    }
    for (const NearRow& near : look.rows) {
      best0 = raised(best0, near, begin, eyes0);
      best1 = raised(best1, near, begin + kCells, eyes1);
    }
    __builtin_memcpy(look.out + begin, &best0, sizeof best0);
    __builtin_memcpy(look.out + begin + kCells, &best1, sizeof best1);
  }
}

// Between two node rows the cotangent is interpolated: it is what changes evenly as a cell moves
// away from one obstacle. A node that sees nothing makes the far horizon open up to the next node;
// what stands there is among the near rows.
SUNFALL_CLONES void combine_near_and_far(const FarRead& read) {
  const float before_weight = 1.0F - read.weight;
  for (int v = 0; v < read.width; ++v) {
    const float a = read.before[v] + read.fraction * (read.before[v + 1] - read.before[v]);
    const float b = read.after[v] + read.fraction * (read.after[v + 1] - read.after[v]);
    const float far = a * b / (before_weight * b + read.weight * a + 1e-12F);
    read.steps[v] = horizon_step(std::max(read.near[v] * read.tangent_per_slope, far));
  }
}

}  // namespace sunfall

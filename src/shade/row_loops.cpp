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

namespace {

// The steeper of the sight lines to two points, metres per row. A point of the node row behind the eye that
// lies among the eye's near rows is left out: these were looked along from the cell's own centre, while a
// line beside it may run through a wall that the cell only looks along.
inline __attribute__((always_inline)) float steeper(const FarRead& read, int line, float eye) {
  const float rise0 = read.before.height[line] - eye, run0 = read.u - read.before.u[line];
  const float rise1 = read.after.height[line] - eye, run1 = read.u - read.after.u[line];
  const bool seen_near = run1 <= static_cast<float>(kNearRows);
  const bool first = seen_near || rise0 * run1 > rise1 * run0;
  return std::max((first ? rise0 : rise1) / (first ? run0 : run1), 0.0F);
}

}  // namespace

SUNFALL_CLONES void combine_near_and_far(const FarRead& read) {
  for (int v = 0; v < read.width; ++v) {
    const float eye = read.eyes[v] - read.eye_sink;
    const float left = steeper(read, v, eye), right = steeper(read, v + 1, eye);
    const float far = left + read.fraction * (right - left) - read.unbend;
    read.steps[v] = horizon_step(std::max(read.near[v], far) * read.tangent_per_slope);
  }
}

}  // namespace sunfall

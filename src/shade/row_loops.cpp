#include "shade/row_loops.h"

#include <algorithm>
#include <cmath>

#include "core/clones.h"
#include "dome/horizon_steps.h"
#include "shade/horizon_kernel.h"

namespace sunfall {

// In chunks that stay in registers or the first cache while the rows pass.
SUNFALL_CLONES void look_along_near_rows(const NearLook& look) {
  constexpr int kChunk = 64;
  for (int begin = 0; begin < look.width; begin += kChunk) {
    const int count = std::min(kChunk, look.width - begin);
    float best[kChunk] = {};
    const float* eyes = look.eyes + begin;
    for (int n = 1; n <= kNearRows; ++n) {
      const float shift = -look.lean * static_cast<float>(n);
      const float whole = std::floor(shift);
      const float fraction = shift - whole;
      const float* row = look.rows[kNearRows - n] + begin + static_cast<int>(whole);
      const float per_row = 1.0F / static_cast<float>(n);
      for (int i = 0; i < count; ++i) {
        const float height = row[i] + fraction * (row[i + 1] - row[i]);
        const float slope = (height - eyes[i]) * per_row;
        best[i] = slope > best[i] ? slope : best[i];
      }
    }
    for (int i = 0; i < count; ++i) look.out[begin + i] = best[i] * look.tangent_per_slope;
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

// Compiled for AVX2; runs only where best_sweep_kernel() found it.
#define SUNFALL_LANES_AVX2
#include "shade/horizon_kernel_body.h"

namespace sunfall {
void sweep_avx2(const SweepJob& job) { sweep_blocks(job); }
}  // namespace sunfall

// Compiled for AVX-512; runs only where best_sweep_kernel() found it.
#define SUNFALL_LANES_AVX512
#include "shade/horizon_kernel_body.h"

namespace sunfall {
void sweep_avx512(const SweepJob& job) { sweep_blocks(job); }
}  // namespace sunfall

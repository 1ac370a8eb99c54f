#include "shade/horizon_kernel_body.h"

namespace sunfall {
void sweep_plain(const SweepJob& job) { sweep_blocks(job); }
}  // namespace sunfall

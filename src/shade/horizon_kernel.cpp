#include "shade/horizon_kernel.h"

#include "core/instruction_set.h"

namespace sunfall {

SweepKernel best_sweep_kernel() {
#if defined(__x86_64__)
  switch (instruction_set()) {
    case InstructionSet::avx512: return sweep_avx512;
    case InstructionSet::avx2: return sweep_avx2;
    case InstructionSet::plain: break;
  }
#endif
  return sweep_plain;
}

}  // namespace sunfall

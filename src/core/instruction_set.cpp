#include "core/instruction_set.h"

#include <cstdlib>
#include <string_view>

namespace sunfall {

InstructionSet instruction_set() {
#if defined(__x86_64__)
  const char* asked = std::getenv("SUNFALL_LANES");
  const std::string_view most = asked ? asked : "avx512";
  if (most == "plain") return InstructionSet::plain;
  const bool avx512 = __builtin_cpu_supports("avx512f") && __builtin_cpu_supports("avx512vl") &&
                      __builtin_cpu_supports("avx512bw") && __builtin_cpu_supports("avx512dq");
  if (avx512 && most != "avx2") return InstructionSet::avx512;
  if (__builtin_cpu_supports("avx2")) return InstructionSet::avx2;
#endif
  return InstructionSet::plain;
}

}  // namespace sunfall

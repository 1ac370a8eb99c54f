#pragma once
// Which of the hand-written variants of a hot loop this processor runs.

namespace sunfall {

enum class InstructionSet { plain, avx2, avx512 };

// The best that the processor has. SUNFALL_LANES=plain or avx2 in the environment asks for a lesser
// one (for tests; all give the same bits).
InstructionSet instruction_set();

}  // namespace sunfall

#pragma once
// How much memory this process may take, asked before any is taken: a machine that runs out ends a
// program, or another one, without a word.

#include "sunfall/plan.h"

namespace sunfall {

// The least of the machine's memory, its control group's limit and the shell's limit (ulimit -v).
double memory_limit_bytes();

// Throws Error(data) where the plan's ground has more cells than the memory can follow.
void require_memory_for(const Plan& plan);

// Of the whole map, whatever the tiles: its coarser levels are kept.
inline constexpr double kBytesPerMapCell = 1.4;

}  // namespace sunfall

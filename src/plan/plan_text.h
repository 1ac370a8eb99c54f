#pragma once
// The plan file as text that is safe to parse.

#include <cstddef>
#include <string>
#include <string_view>

#include "plan/plan_file.h"

namespace sunfall {

// A plan is written by hand; a larger file is not one.
inline constexpr std::size_t kLargestPlan_bytes = 1'000'000;

// Throws Error(plan): no such file (naming the nearest one), a folder or device, larger than
// kLargestPlan_bytes, not UTF-8, nested beyond reason; Error(io) when reading fails.
std::string read_plan_text(const PlanFile& file);

// The two checks on the text itself, for tests and other callers.
void refuse_broken_utf8(std::string_view text, const PlanFile& file);
void refuse_deep_nesting(std::string_view text, const PlanFile& file);

}  // namespace sunfall

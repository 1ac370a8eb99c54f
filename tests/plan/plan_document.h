#pragma once
// docs/plan.md as a test sees it: the keys in its tables and its example plans.

#include <string>
#include <vector>

#include "plan/key_shapes.h"

namespace sunfall::testing {

std::string plan_page();
// Every table of keys, by the heading that it stands under.
std::vector<TableShape> documented_tables(const std::string& page);
// The contents of every ```toml block.
std::vector<std::string> example_plans(const std::string& page);

}  // namespace sunfall::testing

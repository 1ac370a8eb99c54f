#pragma once
// The TOML library's adapter: its faults become ours, its nodes become words.

#include <toml++/toml.h>
#include <string>
#include <string_view>
#include <vector>

#include "plan/plan_file.h"

namespace sunfall {

// Throws Error(plan) with line and column for what is not TOML, repeated keys included.
toml::table parse_toml(std::string_view text, const PlanFile& file);

// The value and its type, for "found": `a string: "0.5"`, `a whole number: 7`, `a list of 11`.
std::string described(const toml::node& node);

// The keys of a table in the order in which the file has them, which the library does not keep.
std::vector<toml::key> keys_in_order(const toml::table& table);

inline long line_of(const toml::key& key) { return static_cast<long>(key.source().begin.line); }
inline long line_of(const toml::node& node) { return static_cast<long>(node.source().begin.line); }

}  // namespace sunfall

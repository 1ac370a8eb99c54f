#pragma once
// How values and names from a plan are shown in messages: short, and harmless to a terminal.

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace sunfall {

// Longer texts are cut in messages (bytes).
inline constexpr std::size_t kLongestShown = 60;

// Control characters and broken UTF-8 as \xNN; cut after `longest` bytes.
std::string harmless(std::string_view text, std::size_t longest);
// The same in quotes, cut after kLongestShown bytes.
std::string in_quotes(std::string_view text);

// "a, b or c"; the first few only where there are many.
std::string listed(const std::vector<std::string>& names);

// A sentence that points from an unknown name to a known one: `Perhaps "clock" is meant`, or
// `Known here: …`.
std::string did_you_mean(const std::string& name, const std::vector<std::string>& known);

// Plain shortest decimal: 0.5, 50, 1e-05.
std::string plain(double value);

}  // namespace sunfall

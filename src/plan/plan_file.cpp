#include "plan/plan_file.h"

#include <fmt/format.h>

#include <algorithm>

#include "plan/words.h"

namespace sunfall {
namespace {

bool is_bare(char letter) {
  return (letter >= 'a' && letter <= 'z') || (letter >= 'A' && letter <= 'Z') ||
         (letter >= '0' && letter <= '9') || letter == '_' || letter == '-';
}

}  // namespace

std::string PlanFile::where(long line, const std::string& key) const {
  const std::string place = line > 0 ? fmt::format("{}:{}", path.string(), line) : path.string();
  return key.empty() ? place : fmt::format("{} {}", place, key);
}

std::string joined_key(const std::string& table, const std::string& key) {
  if (key.empty() && !table.empty()) return table;
  const bool bare =
      !key.empty() && key.size() <= kLongestShown && std::all_of(key.begin(), key.end(), is_bare);
  const std::string last = bare ? key : in_quotes(key);
  return table.empty() ? last : table + "." + last;
}

}  // namespace sunfall

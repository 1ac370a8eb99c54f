#include "plan/month_day.h"

#include <algorithm>

namespace sunfall {

std::optional<std::chrono::month_day> month_day_of(std::string_view text) {
  const auto is_digit = [](char letter) { return letter >= '0' && letter <= '9'; };
  if (text.size() != 5 || text[2] != '-') return std::nullopt;
  if (std::count_if(text.begin(), text.end(), is_digit) != 4) return std::nullopt;
  const auto pair = [&](std::size_t at) {
    return static_cast<unsigned>((text[at] - '0') * 10 + (text[at + 1] - '0'));
  };
  const std::chrono::month_day day{std::chrono::month{pair(0)}, std::chrono::day{pair(3)}};
  if (!day.ok()) return std::nullopt;
  return day;
}

}  // namespace sunfall

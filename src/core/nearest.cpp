#include "core/nearest.h"

#include <algorithm>
#include <cctype>

namespace sunfall {
namespace {

char lower(char letter) { return static_cast<char>(std::tolower(static_cast<unsigned char>(letter))); }

// Optimal string alignment distance.
std::size_t distance(const std::string& a, const std::string& b) {
  std::vector<std::vector<std::size_t>> cost(a.size() + 1, std::vector<std::size_t>(b.size() + 1));
  for (std::size_t i = 0; i <= a.size(); ++i) cost[i][0] = i;
  for (std::size_t j = 0; j <= b.size(); ++j) cost[0][j] = j;
  for (std::size_t i = 1; i <= a.size(); ++i) {
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t replace = lower(a[i - 1]) == lower(b[j - 1]) ? 0 : 1;
      cost[i][j] = std::min({cost[i - 1][j] + 1, cost[i][j - 1] + 1, cost[i - 1][j - 1] + replace});
      const bool swapped =
          i > 1 && j > 1 && lower(a[i - 1]) == lower(b[j - 2]) && lower(a[i - 2]) == lower(b[j - 1]);
      if (swapped) cost[i][j] = std::min(cost[i][j], cost[i - 2][j - 2] + 1);
    }
  }
  return cost[a.size()][b.size()];
}

}  // namespace

std::string nearest_name(const std::string& name, const std::vector<std::string>& known) {
  std::string best;
  std::size_t least = name.size() / 2 + 1;
  for (const std::string& candidate : known) {
    const std::size_t d = distance(name, candidate);
    if (d < least) {
      least = d;
      best = candidate;
    }
  }
  return best;
}

}  // namespace sunfall

#pragma once
// Quantiles of samples, the same everywhere in the program.

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <vector>

namespace sunfall {

// Definition 7 of Hyndman and Fan (1996), Am. Stat. 50:361: linear between the order statistics around
// rank (n - 1) share, the first having rank 0. Where that lies, for `size` values.
struct QuantilePlace {
  std::size_t below = 0;
  std::size_t above = 0;
  double part = 0.0;  // of the way from below to above
};
inline QuantilePlace quantile_place(std::size_t size, double share) {
  const double rank = share * static_cast<double>(size - 1);
  const auto below = static_cast<std::size_t>(rank);
  return {below, std::min(below + 1, size - 1), rank - static_cast<double>(below)};
}

// `share` from 0 to 1; `sorted` ascending, not empty.
template <typename Values = std::vector<float>>
double quantile(const Values& sorted, double share) {
  const QuantilePlace place = quantile_place(sorted.size(), share);
  return std::lerp(static_cast<double>(sorted[place.below]), static_cast<double>(sorted[place.above]),
                   place.part);
}

}  // namespace sunfall

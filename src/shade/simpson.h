#pragma once
// Simpson's rule over equal steps.

#include <cassert>

namespace sunfall {

// The weight of point i (0 to steps) in the mean over the stretch; `steps` is even. Sum 1.
inline double simpson_weight(int i, int steps) {
  assert(steps > 0 && steps % 2 == 0 && i >= 0 && i <= steps);
  const bool end = i == 0 || i == steps;
  return (end ? 1.0 : i % 2 == 1 ? 4.0 : 2.0) / (3.0 * steps);
}

}  // namespace sunfall

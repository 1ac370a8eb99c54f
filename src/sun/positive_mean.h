#pragma once
// The mean of what is above zero.

#include <algorithm>
#include <array>
#include <cmath>

namespace sunfall {

// Mean over an interval of max(0, p), where p is the parabola through the values at its left edge,
// middle and right edge. Exact for a parabola, the crossings included.
inline double positive_mean(double left, double middle, double right) {
  const double square = 0.5 * (left + right) - middle;  // p(x) = square x² + slope x + middle, x in [-1, 1]
  const double slope = 0.5 * (right - left);
  const auto value = [&](double x) { return (square * x + slope) * x + middle; };
  const auto integral = [&](double x) { return ((square / 3.0 * x + 0.5 * slope) * x + middle) * x; };

  // Between neighbouring bounds p keeps its sign; a root that does not exist or lies outside is an
  // edge.
  std::array<double, 4> bounds{-1.0, 1.0, 1.0, 1.0};
  const double discriminant = slope * slope - 4.0 * square * middle;
  if (discriminant >= 0.0) {
    // The form that loses no digits when `square` is tiny.
    const double q = -0.5 * (slope + std::copysign(std::sqrt(discriminant), slope));
    const double first = square != 0.0 ? std::clamp(q / square, -1.0, 1.0) : 1.0;
    const double second = q != 0.0 ? std::clamp(middle / q, -1.0, 1.0) : 1.0;
    bounds = {-1.0, std::min(first, second), std::max(first, second), 1.0};
  }
  double sum = 0.0;
  for (std::size_t i = 0; i + 1 < bounds.size(); ++i) {
    if (value(0.5 * (bounds[i] + bounds[i + 1])) > 0.0) sum += integral(bounds[i + 1]) - integral(bounds[i]);
  }
  return std::max(0.0, 0.5 * sum);
}

}  // namespace sunfall

#include "shapes.h"

#include <algorithm>
#include <cmath>
#include <limits>
#include <numbers>

namespace alder_reach {
namespace {

double distance_to_segment(Point point, Point from, Point to) {
  const Point run{to.x - from.x, to.y - from.y};
  const double squared_length = run.x * run.x + run.y * run.y;
  double share = 0.0;
  if (squared_length > 0.0) {
    share = ((point.x - from.x) * run.x + (point.y - from.y) * run.y) / squared_length;
    share = std::clamp(share, 0.0, 1.0);
  }
  return distance(point, {from.x + share * run.x, from.y + share * run.y});
}

// The unit vector along the rectangle's length.
Point direction(const Rectangle& rectangle) {
  const double azimuth = rectangle.azimuth_deg * std::numbers::pi / 180.0;
  return {std::sin(azimuth), std::cos(azimuth)};
}

}  // namespace

double smooth_step(double from, double to, double value) {
  const double t = std::clamp((value - from) / (to - from), 0.0, 1.0);
  return t * t * (3.0 - 2.0 * t);
}

double distance(Point a, Point b) { return std::hypot(a.x - b.x, a.y - b.y); }

double distance_to_path(Point point, const Path& path) {
  double nearest = std::numeric_limits<double>::infinity();
  for (std::size_t i = 1; i < path.size(); ++i) {
    nearest = std::min(nearest, distance_to_segment(point, path[i - 1], path[i]));
  }
  return nearest;
}

Point within(const Rectangle& rectangle, Point point) {
  const Point along = direction(rectangle);
  const Point offset{point.x - rectangle.middle.x, point.y - rectangle.middle.y};
  return {offset.x * along.x + offset.y * along.y, -offset.x * along.y + offset.y * along.x};
}

double distance_outside(const Rectangle& rectangle, Point point) {
  const Point inside = within(rectangle, point);
  return std::hypot(std::max(0.0, std::abs(inside.x) - 0.5 * rectangle.length_m),
                    std::max(0.0, std::abs(inside.y) - 0.5 * rectangle.width_m));
}

Path corners(const Rectangle& rectangle) {
  const Point along = direction(rectangle);
  Path path;
  for (const Point sign : {Point{-1, -1}, Point{1, -1}, Point{1, 1}, Point{-1, 1}}) {
    const double forward = 0.5 * sign.x * rectangle.length_m;
    const double left = 0.5 * sign.y * rectangle.width_m;
    path.push_back({rectangle.middle.x + forward * along.x - left * along.y,
                    rectangle.middle.y + forward * along.y + left * along.x});
  }
  return path;
}

}  // namespace alder_reach

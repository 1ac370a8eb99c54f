#pragma once
// Which points of a regular grid stand for a place. Private to geo.

#include <cstddef>
#include <functional>
#include <string>
#include <vector>

#include "core/globe.h"
#include "sunfall/sun.h"

namespace sunfall {

// A grid in coordinates of its own.
struct PointGrid {
  std::string file;
  std::vector<double> x;  // of the columns, rising or falling
  std::vector<double> y;  // of the rows
  double turn = 0.0;      // 360 where x is a longitude in degrees, else 0
  std::function<LonLat(double x, double y)> to_globe;
};

struct GridPoint {
  std::size_t column = 0;
  std::size_t row = 0;
  double weight = 1.0;
};
struct ChosenPoints {
  std::vector<GridPoint> points;  // weights add up to 1
  std::string words;              // "the point 51.75° N, 5.75° E, 22 km away"
};

// `x` and `y` are the place in the grid's coordinates. Between the outermost points and half a spacing
// beyond, the outermost ones count. Throws Error(data) farther out, and for axes that are not monotone. Along
// an axis of one point the spacing is that of the other; a lone point stands for half a degree (the coarser
// of the usual reanalyses; common practice, no source).
ChosenPoints choose_points(const PointGrid& grid, double x, double y, const Place& place, bool bilinear);

}  // namespace sunfall

#pragma once
// Small plane geometry that terrain and buildings share. Coordinates are metres east and north of
// the farm's south-west corner.

#include <vector>

namespace alder_reach {

struct Point {
  double x = 0.0;
  double y = 0.0;
};

using Path = std::vector<Point>;

// 0 below `from`, 1 above `to`, smooth between.
double smooth_step(double from, double to, double value);

double distance(Point a, Point b);
// To the nearest point of the path.
double distance_to_path(Point point, const Path& path);

// A rectangle by its middle; `azimuth_deg` is that of its long side, clockwise from grid north.
struct Rectangle {
  Point middle;
  double length_m = 0.0;
  double width_m = 0.0;
  double azimuth_deg = 0.0;
};

// The point as seen from the rectangle: x along its length, y across, from its middle.
Point within(const Rectangle& rectangle, Point point);
// Metres from the point to the rectangle; 0 inside.
double distance_outside(const Rectangle& rectangle, Point point);
// Its four corners, counter-clockwise.
Path corners(const Rectangle& rectangle);

}  // namespace alder_reach

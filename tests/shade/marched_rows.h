#pragma once
// Rows as explicit hedges in space, and rays that walk through them step by step: the brute force that
// closed forms are held against. Shares no code with src/shade but the description of rows.

#include <cmath>
#include <vector>

#include "sunfall/rows.h"

namespace sunfall::testing {

struct ExplicitRows {
  CropRows rows;
  double azimuth = 0.0;             // radians from grid north
  std::vector<double> middles;      // of each row, to the right of the azimuth, metres
  double left = -1e9, right = 1e9;  // the plot's bounds across and along the rows
  double back = -1e9, front = 1e9;
  double rise_east = 0.0, rise_north = 0.0;  // of the ground

  bool leaf_at(double east, double north, double up) const {
    const double across = east * std::cos(azimuth) - north * std::sin(azimuth);
    const double along = east * std::sin(azimuth) + north * std::cos(azimuth);
    if (across < left || across > right || along < back || along > front) return false;
    const double height = up - rise_east * east - rise_north * north;
    const double part = (height - rows.base_m) / (rows.height_m - rows.base_m);
    if (part < 0.0 || part > 1.0) return false;
    for (const double middle : middles) {
      const double aside = std::abs(across - middle) / (0.5 * rows.width_m);
      switch (rows.section) {
        case RowSection::box:
          if (aside <= 1.0) return true;
          break;
        case RowSection::ellipse:
          if (aside * aside + (2.0 * part - 1.0) * (2.0 * part - 1.0) <= 1.0) return true;
          break;
        case RowSection::wedge:
          if (aside <= 1.0 - part) return true;
          break;
      }
    }
    return false;
  }

  // Metres of a ray within leaves, from a place `height` above the ground.
  double walk(double east, double north, double height, double light_azimuth, double tangent,
              double step) const {
    const double cosine = 1.0 / std::sqrt(1.0 + tangent * tangent), sine = tangent * cosine;
    const double start = rise_east * east + rise_north * north + height;
    double length = 0.0;
    for (double at = 0.5 * step;; at += step) {
      const double e = east + at * cosine * std::sin(light_azimuth);
      const double n = north + at * cosine * std::cos(light_azimuth);
      const double up = start + at * sine;
      if (up - rise_east * e - rise_north * n > rows.height_m) return length;
      if (leaf_at(e, n, up)) length += step;
    }
  }
};

}  // namespace sunfall::testing

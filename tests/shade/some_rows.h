#pragma once
// Rows for tests.

#include <numbers>

#include "sunfall/angle.h"
#include "sunfall/crop_rows.h"

namespace sunfall::testing {

inline constexpr double kDegree = std::numbers::pi / 180.0;
inline constexpr RowSection kSections[] = {RowSection::box, RowSection::ellipse, RowSection::wedge};

inline GridAzimuth grid(double degrees) { return {Angle::degrees(degrees)}; }

inline CropRows rows_of(RowSection section, double spacing, double height, double width, double base = 0.0) {
  CropRows rows;
  rows.section = section;
  rows.spacing_m = spacing;
  rows.height_m = height;
  rows.width_m = width;
  rows.base_m = base;
  return rows;
}

}  // namespace sunfall::testing

#pragma once
// How much of a ray lies in the leaves of parallel rows: closed forms for sections that repeat across the
// ground. Rays are followed in the plane across the rows, with the height above the ground as the
// parameter: what happens along the rows only decides how much of the ray lies within the plot.
//
// Sloping ground: plants stand plumb, heights count from the ground below, spacing and width are
// measured on the map. Seen over its ground a ray then rises by its tangent less the ground's rise;
// this shear keeps volumes, so density and path stay what they are.

#include <span>

#include "sunfall/angle.h"
#include "sunfall/crop_rows.h"

namespace sunfall {

// Metres of rise per metre on the map; level by default.
struct GroundPlane {
  double rise_east = 0.0;
  double rise_north = 0.0;
};

// A direction of light as rows see it, the same for all receivers.
struct RowRay {
  double lean = 0.0;  // metres to the right of the rows per metre of height above their ground
  double path = 1.0;  // metres of ray per metre of height above their ground
  double rise = 1.0;  // metres of height above their ground per metre on the map
  double sine = 1.0;  // of the elevation above the level

  // The ground hides what is below it, whatever stands there.
  bool meets_ground() const { return !(rise > 0.0); }
};
// `tangent` of the elevation above the level, not negative; infinite for the zenith.
RowRay row_ray(GridAzimuth rows, GridAzimuth light, double tangent, const GroundPlane& ground = {});

// The part of the ray that counts: from and to so many metres on the map away from the receiver, where
// the ray enters and leaves the plot.
struct RowReach {
  double from_m = 0.0;
  double to_m = 1e30;
};

// Metres of ray within leaves. `across_m` is the receiver's distance from the middle of any row, to the
// right; `height_m` its height above the ground. Infinite where the ray meets the ground.
//
// Box: O(1). Ellipse and wedge: row by row for the first 256 rows that are crossed; beyond them rows
// are taken as evenly spread, which errs by less than half a row in 256 (at most 0.08 % of the light).
double row_path(const CropRows& rows, const RowRay& ray, double across_m, double height_m,
                const RowReach& reach = {});

// The same for many receivers; all spans of one length. Same numbers as one by one.
struct RowReceivers {
  std::span<const double> across_m;
  std::span<const double> height_m;
  std::span<const RowReach> reach;
};
void row_paths(const CropRows& rows, const RowRay& ray, const RowReceivers& receivers,
               std::span<double> path_m);

// Half the section's width at a height, 0 above and below the leaves.
double half_width_at(const CropRows& rows, double height_m);

}  // namespace sunfall

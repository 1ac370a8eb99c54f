#pragma once
// What crop rows do to light: what they take, what they leave on the ground between them, and how that
// changes with their direction, spacing and height. Without a map: rows without end on level ground.
//
// Leaves stand at Campbell's (1986) ellipsoidal angles, turned every way about the plumb line. Light is lost
// by Beer and Lambert along its path through the rows' sections; light that leaves scatter is counted by
// Goudriaan's (1977) factor. Trunks, posts and wires are not there. docs/method.md has the equations.

#include <array>
#include <vector>

#include "sunfall/angle.h"
#include "sunfall/crop_rows.h"
#include "sunfall/dome.h"

namespace sunfall {

// Light fractions of what falls on level ground in the open. Right and left are the sides of somebody
// who looks along the row's azimuth; light that comes from straight ahead or behind is halved.
struct RowInstant {
  double taken = 0.0;        // by leaves
  double taken_right = 0.0;  // of it, what came from the right
  double taken_left = 0.0;
  double reflected = 0.0;
  double ground = 0.0;       // mean over alley and row; taken + reflected + ground = 1
  double sunlit_leaf = 0.0;  // m2 per m2 of ground
  double shaded_leaf = 0.0;
};

// Under a beam from `from_row` (the azimuth of the light less that of the rows, clockwise) at an
// elevation above 0 and up to 90 degrees. `leafing`: share of the full leaf, 0 to 1.
// Throws Error(plan) where fault_of finds something or the elevation is not above 0.
RowInstant rows_in_beam(const CropRows& rows, Angle from_row, Angle elevation, double leafing = 1.0);

inline constexpr std::array<double, 12> kFullLeaf = {1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1};

// The share of full leaf that stands for a period: the mean over its days of its months' shares.
double leafing_of(const Period& period, const std::array<double, 12>& leafing);

// Every azimuth with every spacing with every height; all else as in `rows`.
struct RowStudyRequest {
  CropRows rows;
  std::array<double, 12> leafing = kFullLeaf;  // January to December
  std::vector<Azimuth> azimuths;
  std::vector<double> spacings_m;
  std::vector<double> heights_m;
};

// Vectors have one value per period of the dome light. Fractions are those of the light on level ground
// in the open, which RowStudy::open_mol holds: their product is mol m-2 d-1.
struct RowCase {
  Azimuth azimuth;
  double spacing_m = 0.0;
  double height_m = 0.0;
  std::vector<double> taken;        // per m2 of ground, alleys counted in
  std::vector<double> taken_right;  // of it, what came from the right of the azimuth
  std::vector<double> taken_left;
  std::vector<double> floor_mean;   // on the alley floor: the ground between the rows' widths
  std::vector<double> floor_least;  // at the alley's darkest place, over the period's whole light
};

struct RowStudy {
  std::vector<Period> periods;
  std::vector<double> open_mol;  // mol m-2 d-1
  std::vector<RowCase> cases;    // azimuths outermost, then spacings, then heights
};

// Throws Error(plan) for an empty list or rows that fault_of refuses.
RowStudy study_rows(const DomeLight& light, const RowStudyRequest& request);

// Light against the position across one cycle of rows, `height_m` above the ground.
struct RowProfile {
  std::vector<double> across_m;            // the middles of equal stretches from -spacing/2 to spacing/2
  std::vector<std::vector<double>> share;  // [period][position], of the open field's light
};
struct RowProfileRequest {
  CropRows rows;
  std::array<double, 12> leafing = kFullLeaf;
  Azimuth azimuth;
  int positions = 48;
  double height_m = 0.0;
};
RowProfile profile_of_rows(const DomeLight& light, const RowProfileRequest& request);

}  // namespace sunfall

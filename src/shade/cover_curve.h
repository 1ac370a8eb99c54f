#pragma once
// Transmittance between measured angles: never outside the two values between which it lies, and falling
// where they fall.

#include <vector>

#include "sunfall/covers.h"

namespace sunfall {

// The total by a cubic without overshoot (Fritsch and Carlson 1980, slopes of Fritsch and Butland 1984),
// level at 0 degrees, as it must be by symmetry; the scattered share of it in straight lines. So regular and
// scattered parts are never negative and never more than the total. Beyond the last angle it closes with 0 at
// 90 degrees.
class CoverCurve {
 public:
  // Readings must be such as fault_of lets pass.
  explicit CoverCurve(const CoverReadings& readings);
  CoverPassage at(double angle_deg) const;

 private:
  std::vector<double> angle_deg_;
  std::vector<double> total_;
  std::vector<double> slope_;  // of the total, per degree
  std::vector<double> scattered_share_;
};

}  // namespace sunfall

#pragma once
// The mean over one cycle of rows, for receivers that are too wide to lie somewhere in it.

#include <array>

#include "shade/row_paths.h"

namespace sunfall {

// The mean of exp(-depth_per_m × path) over all places across one cycle, `height_m` above the ground.
// The mean of what passes, not of the path: e^-mean would be darker than the mean of e^-each.
//
// Box and wedge: exact, as the path is linear between the places where it meets a corner of the section.
// Ellipse: Gauss-Legendre quadrature between the places where the path starts, ends or bends, in an
// angle that takes out the square root at either end; within 1e-4 of the sum over 20 000 places.
class CyclePaths {
 public:
  CyclePaths(const CropRows& rows, const RowRay& ray, double height_m, const RowReach& reach = {});

  // 0 where the ray meets the ground. The paths serve any depth: any state of leaf.
  double passage(double depth_per_m) const;

 private:
  // A part of the cycle over which the path goes evenly from one length to another.
  struct Part {
    double weight;
    double from_m;
    double to_m;
  };
  static constexpr int kMostParts = 96;
  std::array<Part, kMostParts> parts_;  // the first count_ are set
  int count_ = 0;
};

inline double cycle_passage(const CropRows& rows, const RowRay& ray, double depth_per_m, double height_m,
                            const RowReach& reach = {}) {
  return CyclePaths(rows, ray, height_m, reach).passage(depth_per_m);
}

}  // namespace sunfall

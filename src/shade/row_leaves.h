#pragma once
// What a metre of row does to light: leaf angles, density, clumping and scatter together.

#include "shade/leaf_depth.h"
#include "sunfall/crop_rows.h"

namespace sunfall {

class RowLeaves {
 public:
  // `leafing`: share of the full leaf, 0 to 1.
  RowLeaves(const CropRows& rows, double leafing)
      : leaves_({rows.leaf_angle, rows.clumping, rows.absorptance}), density_(rows.leaf_density * leafing) {}

  // Optical depth of a metre of path, G Ω × density, as if leaves were black.
  double black_depth(double sine) const { return leaves_.black(sine) * density_; }
  // The same with the light that leaves scatter counted as travelling on.
  double depth(double sine) const { return leaves_.scattering(sine) * density_; }
  // Of the light that does not pass, the part that returns to the sky.
  double reflected(double sine) const { return leaves_.reflected(sine); }
  double projection(double sine) const { return leaves_.projection(sine); }

 private:
  LeafDepth leaves_;
  double density_;
};

}  // namespace sunfall

#pragma once
// What a metre of row does to light: leaf angles, density, clumping and scatter together.

#include "shade/leaf_angles.h"
#include "shade/leaf_scatter.h"
#include "sunfall/crop_rows.h"

namespace sunfall {

class RowLeaves {
 public:
  // `leafing`: share of the full leaf, 0 to 1.
  RowLeaves(const CropRows& rows, double leafing)
      : angles_(rows.leaf_angle),
        scatter_(rows.absorptance),
        density_(rows.leaf_density * leafing),
        clumping_(rows.clumping) {}

  // Optical depth of a metre of path, G Ω × density, as if leaves were black.
  double black_depth(double sine) const { return angles_.projection(sine) * clumping_ * density_; }
  // The same with the light that leaves scatter counted as travelling on.
  double depth(double sine) const { return black_depth(sine) * scatter_.depth_factor(); }
  // Of the light that does not pass, the part that returns to the sky.
  double reflected(double sine) const { return scatter_.reflected(angles_.extinction(sine)); }
  double projection(double sine) const { return angles_.projection(sine); }

 private:
  LeafAngles angles_;
  LeafScatter scatter_;
  double density_;
  double clumping_;
};

}  // namespace sunfall

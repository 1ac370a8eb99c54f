#pragma once
// What leaves do to light along a metre of ray: angles, clumping and scatter together.

#include "shade/leaf_angles.h"
#include "shade/leaf_scatter.h"

namespace sunfall {

struct LeafKind {
  double leaf_angle = 1.0;  // Campbell's (1986) x: 1 spherical, below it upright, above it flat
  double clumping = 1.0;    // Ω, above 0 to 1: the part of the leaf area that works as if it stood at random
  double absorptance = 0.85;  // of a leaf, 400-700 nm, above 0 to 1; 0.80 to 0.85 in handbooks
};

class LeafDepth {
 public:
  explicit LeafDepth(const LeafKind& kind)
      : angles_(kind.leaf_angle), scatter_(kind.absorptance), clumping_(kind.clumping) {}

  // Optical depth of a metre of path for 1 m2 of leaf in the m3, G Ω, as if leaves were black; `sine` of the
  // light's elevation.
  double black(double sine) const { return angles_.projection(sine) * clumping_; }
  // The same with the light that leaves scatter counted as travelling on, √α G Ω.
  double scattering(double sine) const { return black(sine) * scatter_.depth_factor(); }
  // Of the light that does not pass, the part that returns to the sky.
  double reflected(double sine) const { return scatter_.reflected(angles_.extinction(sine)); }
  double projection(double sine) const { return angles_.projection(sine); }

 private:
  LeafAngles angles_;
  LeafScatter scatter_;
  double clumping_;
};

}  // namespace sunfall

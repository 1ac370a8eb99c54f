#pragma once
// Light that leaves scatter instead of taking it, after Goudriaan (1977) in the form of Campbell and
// Norman (1998, An Introduction to Environmental Biophysics, ch. 15): scattered light travels on, so that
// a canopy of leaves with absorptance α thins light as black leaves of area sqrt(α) would, and a part
// leaves it upwards. For a closed canopy; for rows it is an assumption.

#include <cmath>

namespace sunfall {

class LeafScatter {
 public:
  explicit LeafScatter(double absorptance) : root_(std::sqrt(absorptance)) {}

  // On the optical depth of black leaves: sqrt(α).
  double depth_factor() const { return root_; }
  // Of the light that does not pass, the part that returns to the sky. ρ_h = (1 − √α)/(1 + √α) for level
  // leaves, times 2 K / (K + 1) for others.
  double reflected(double extinction) const {
    return 2.0 * extinction / (extinction + 1.0) * (1.0 - root_) / (1.0 + root_);
  }

 private:
  double root_;
};

}  // namespace sunfall

#pragma once
// Dome light as rows without end on level ground see it: they know how far off their direction light
// comes, and from which side, but not whether from ahead or behind. So four directions fold into one. What
// rows pass changes slowly between them, so that a coarser grid than the dome's is enough.

#include <vector>

#include "sunfall/dome.h"

namespace sunfall {

class RowSky {
 public:
  // Between along the rows (node 0) and across them (the last); 2 degrees.
  static constexpr int kNodes = 46;
  // Even in the sine of elevation, at the middles of equal stretches.
  static constexpr int kSteps = 60;
  static Angle angle_of(int node) { return Angle::degrees(90.0 * node / (kNodes - 1)); }
  static constexpr double sine_of(int step) { return (step + 0.5) / kSteps; }

  // Beam and sky together. Light goes to the two nodes and two steps beside it by its distance from them,
  // so that none is lost and its middle stays; light straight along the rows goes to both sides by half.
  RowSky(const DomeLight& light, Azimuth rows);

  enum Side { right = 0, left = 1 };
  // [period] of level light from one node and step, mol m-2 d-1.
  const double* level(Side side, int node, int step) const {
    return &level_[((static_cast<std::size_t>(side) * kNodes + node) * kSteps + step) * periods_];
  }
  std::size_t periods() const { return periods_; }

 private:
  std::size_t periods_;
  std::vector<double> level_;
};

// [period]: beam and sky on level ground in the open.
std::vector<double> open_light(const DomeLight& light);

}  // namespace sunfall

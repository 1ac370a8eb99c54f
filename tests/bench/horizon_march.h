#pragma once
// Horizons and shares the plain way, to verify the fast one: from one cell along every line of the dome,
// over the full-resolution heights to the edge of the map, with no levels, hulls, groups or steps.

#include <vector>

#include "oracle/comparison.h"
#include "shade/terrain.h"
#include "sunfall/angle.h"
#include "sunfall/dome.h"

namespace sunfall::bench {

// The dome light below a horizon: for every line of the dome, sums over its steps from the horizon up,
// for the beam of every period, then the sky, as parts of the open field's.
class LightBelow {
 public:
  explicit LightBelow(const DomeLight& light);
  std::size_t columns() const { return columns_; }
  // Takes from `shares` what a horizon of this sine of elevation hides along a line.
  void take(int line, double horizon_sine, std::vector<double>& shares) const;

 private:
  int steps_;
  std::size_t columns_;
  std::vector<double> sums_;  // [line][step edge][column]
};

class HorizonMarch {
 public:
  explicit HorizonMarch(const Terrain& terrain);

  // Tangent of the horizon's elevation from a height above a cell, 0 where it is open. Heights between
  // cell centres are bilinear: along a ray they bend where it crosses a row or a column of centres, so
  // those places and the ones halfway between are looked at.
  double tangent(CellIndex cell, double eye_m, GridAzimuth azimuth) const;

  // Beam of every period, then sky; each line is looked along at its own azimuth.
  std::vector<double> shares(CellIndex cell, const oracle::Ground& ground, const Dome& dome,
                             const LightBelow& below) const;

 private:
  double height(double column, double row) const;

  GridFrame frame_;
  std::vector<float> heights_;
  float highest_m_;
};

}  // namespace sunfall::bench

#pragma once
// The solid scene as triangles for Embree: a second way to find horizons, that shares nothing with
// the sweep but the heights themselves.

#include <embree3/rtcore.h>

#include <vector>

#include "shade/terrain.h"
#include "sunfall/grid.h"

namespace sunfall::oracle {

// Four heights around a cell corner are cut into two triangles along one of two diagonals. Neither is
// truer; what they differ by is what the heights leave open.
enum class Diagonal { falling, rising };  // north-west to south-east, south-west to north-east

// Horizons of equal azimuths from grid north, as elevations in radians, never negative.
struct RayHorizon {
  std::vector<float> elevation;

  // Linear between the two azimuths beside `turn`, which counts turns from grid north in [0, 1).
  float at(double turn) const;
};

// Vertices stand at cell centres. Full resolution over the map and 64 cells around it; where the
// terrain knows a far ground, cells of 2^4 map cells beyond.
class RaySurface {
 public:
  RaySurface(const Terrain& terrain, Diagonal diagonal);
  ~RaySurface();
  RaySurface(const RaySurface&) = delete;
  RaySurface& operator=(const RaySurface&) = delete;

  // From a point above the middle of a cell. Each horizon is found by halving between level and
  // zenith until 0.006 degrees are left. May be called from several threads.
  RayHorizon horizon(CellIndex cell, double height_m, int azimuths) const;

 private:
  void add(const Terrain& terrain, const LevelGrid& grid, const CellWindow* hole, Diagonal diagonal);

  GridFrame frame_;
  RTCDevice device_;
  RTCScene scene_;
};

}  // namespace sunfall::oracle

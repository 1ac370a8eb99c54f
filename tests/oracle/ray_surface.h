#pragma once
// The solid scene as triangles for Embree: a second way to find horizons, that shares nothing with
// the sweep but the heights themselves.

#include <embree3/rtcore.h>

#include <cstdint>
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

// A point above the middle of a cell, metres from the middle of the map; `up` is bent with the Earth.
struct RayEye {
  double east = 0.0;
  double north = 0.0;
  double up = 0.0;
};

// A direction from grid north and the level, radians, with its sines and cosines at hand.
struct RayDirection {
  double to_east = 0.0;  // on the ground: a unit vector
  double to_north = 1.0;
  double level = 1.0;  // cosine and sine of the elevation
  double rise = 0.0;
  static RayDirection of(double azimuth, double elevation);
};

// Rays that are traced together, which is fastest where they run alike.
inline constexpr int kPacket = 16;
struct RayPacket {
  RayEye eyes[kPacket];
  RayDirection directions[kPacket];
};

// Vertices stand at cell centres. Full resolution over the map and 64 cells around it; where the
// terrain knows a far ground, cells of 2^4 map cells beyond.
class RaySurface {
 public:
  RaySurface(const Terrain& terrain, Diagonal diagonal);
  ~RaySurface();
  RaySurface(const RaySurface&) = delete;
  RaySurface& operator=(const RaySurface&) = delete;

  RayEye eye(CellIndex cell, double height_m) const;
  // Which of the packet's rays meet something, a bit a ray; `wanted` tells which ones count. May be
  // called from several threads.
  std::uint32_t hidden(const RayPacket& packet, std::uint32_t wanted = 0xFFFFU) const;

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

#include "noise.h"

#include <cmath>
#include <cstdint>

namespace alder_reach {
namespace {

// Mixes lattice coordinates and seed into 32 well-spread bits (the finaliser of MurmurHash3, Austin
// Appleby, public domain).
std::uint32_t mixed(std::int32_t column, std::int32_t row, unsigned seed) {
  std::uint32_t bits = static_cast<std::uint32_t>(column) * 0x9E3779B1U ^
                       static_cast<std::uint32_t>(row) * 0x85EBCA77U ^ seed * 0xC2B2AE3DU;
  bits ^= bits >> 16;
  bits *= 0x85EBCA6BU;
  bits ^= bits >> 13;
  bits *= 0xC2B2AE35U;
  bits ^= bits >> 16;
  return bits;
}

// The corner's slope, one of sixteen directions, times the offset from the corner.
double slope_at(std::int32_t column, std::int32_t row, unsigned seed, double x, double y) {
  const double angle = (mixed(column, row, seed) & 15U) * 0.39269908169872414;  // 22.5 degrees
  return std::cos(angle) * x + std::sin(angle) * y;
}

double eased(double t) { return t * t * t * (t * (t * 6.0 - 15.0) + 10.0); }

}  // namespace

double noise(double x, double y, unsigned seed) {
  const double floor_x = std::floor(x);
  const double floor_y = std::floor(y);
  const auto column = static_cast<std::int32_t>(floor_x);
  const auto row = static_cast<std::int32_t>(floor_y);
  const double dx = x - floor_x;
  const double dy = y - floor_y;
  const double south = std::lerp(slope_at(column, row, seed, dx, dy),
                                 slope_at(column + 1, row, seed, dx - 1.0, dy), eased(dx));
  const double north = std::lerp(slope_at(column, row + 1, seed, dx, dy - 1.0),
                                 slope_at(column + 1, row + 1, seed, dx - 1.0, dy - 1.0), eased(dx));
  return 1.4142135623730951 * std::lerp(south, north, eased(dy));
}

double layered_noise(double x, double y, unsigned seed, int octaves) {
  double sum = 0.0;
  double strength = 1.0;
  for (int octave = 0; octave < octaves; ++octave) {
    sum += strength * noise(x, y, seed + static_cast<unsigned>(octave));
    x *= 2.0;
    y *= 2.0;
    strength *= 0.5;
  }
  return sum;
}

}  // namespace alder_reach

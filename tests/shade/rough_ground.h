#pragma once
// Rough invented ground with hills, blocks and bumps, from a fixed seed.

#include <cmath>
#include <cstdint>

namespace sunfall::testing {

inline double noise(int x, int y) {
  std::uint32_t h = static_cast<std::uint32_t>(x) * 374761393U + static_cast<std::uint32_t>(y) * 668265263U;
  h = (h ^ (h >> 13)) * 1274126177U;
  return ((h ^ (h >> 16)) & 0xffffffU) / double(0x1000000);
}

inline double rough_height(double east, double north) {
  const int x = static_cast<int>(std::floor(east)), y = static_cast<int>(std::floor(north));
  double height = 12.0 * std::sin(east * 0.02) * std::cos(north * 0.03) + 0.3 * noise(x, y);
  const int block_x = static_cast<int>(std::floor(east / 40.0)),
            block_y = static_cast<int>(std::floor(north / 40.0));
  if (noise(block_x, block_y) < 0.4 && x - 40 * block_x < 14 && y - 40 * block_y < 9) height += 7.0;
  return height;
}

}  // namespace sunfall::testing

#pragma once
// The two plain loops over a row of cells that the compiler turns into vector code, cloned for each
// instruction set.

#include <cstdint>

namespace sunfall {

struct NearLook {
  const float* eyes = nullptr;         // receiver heights, v = 0 …
  const float* const* rows = nullptr;  // rows[kNearRows - n] points at v = 0 of the row n before
  float lean = 0.0F;
  float tangent_per_slope = 1.0F;
  int width = 0;
  float* out = nullptr;  // tangents ≥ 0
};
void look_along_near_rows(const NearLook& look);

struct FarRead {
  const float* first = nullptr;  // node row at or before the row, at the line left of v = 0
  const float* second = nullptr;
  float first_fraction = 0.0F;  // how far v = 0 lies from that line towards the next
  float second_fraction = 0.0F;
  float weight = 0.0F;  // of the second node row
  const float* near = nullptr;
  int width = 0;
  std::uint16_t* steps = nullptr;
};
void combine_near_and_far(const FarRead& read);

}  // namespace sunfall

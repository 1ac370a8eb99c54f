#pragma once
// The two plain loops over a row of cells that the compiler turns into vector code, cloned for each
// instruction set.

#include <cstdint>

namespace sunfall {

inline constexpr int kRowGroup = 32;  // rows are worked on in whole groups of cells

// A row some rows before the receivers', seen along the ray: at v the height lies `fraction` of the
// way from values[v] to values[v + 1].
struct NearRow {
  const float* values = nullptr;
  float fraction = 0.0F;
  float per_row = 1.0F;  // one over the rows between
};
struct NearLook {
  const float* eyes = nullptr;  // receiver heights, v = 0 …, readable to the end of the last group
  const NearRow* rows = nullptr;  // kNearRows of them, nearest first; readable as far and one more
  float tangent_per_slope = 1.0F;
  int width = 0;
  float* out = nullptr;  // tangents ≥ 0, with room for whole groups
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

#pragma once
// The two plain loops over a row of cells that the compiler turns into vector code, cloned for each
// instruction set.

#include <cstdint>
#include <span>

namespace sunfall {

inline constexpr int kRowGroup = 32;  // rows are worked on in whole groups of cells

// A row, or a place halfway between two rows, some rows before the receivers', seen along the ray: at
// v the height is the mean of both rows' heights at values[v] + fraction·(values[v + 1] - values[v]).
struct NearRow {
  const float* values = nullptr;
  const float* other = nullptr;  // the second row; nullptr for a whole row
  float fraction = 0.0F;
  float per_row = 1.0F;  // one over the rows between
};
struct NearLook {
  const float* eyes = nullptr;    // receiver heights, v = 0 …, readable to the end of the last group
  const float* start = nullptr;   // slopes found before, as `out`; nullptr for the level
  std::span<const NearRow> rows;  // readable as far as eyes, and one more
  int width = 0;
  float* out = nullptr;  // slopes ≥ 0, metres per row, with room for whole groups
};
void look_along_near_rows(const NearLook& look);

// The points that make the far horizon at a node row, from the line left of v = 0 on.
struct FarPoints {
  const float* height = nullptr;
  const float* u = nullptr;
};
// A cell tries the points found at the node rows before and after its own, on the lines beside it,
// from its own eye.
struct FarRead {
  FarPoints before;
  FarPoints after;
  float u = 0.0F;         // the cells' row
  float fraction = 0.0F;  // how far v = 0 lies from the line on its left towards the next
  const float* eyes = nullptr;
  float eye_sink = 0.0F;        // the Earth's curve at the row, metres
  float unbend = 0.0F;          // slope that bent heights are short of, metres per row
  const float* near = nullptr;  // slopes to the near rows, metres per row
  float tangent_per_slope = 1.0F;
  int width = 0;
  std::uint16_t* steps = nullptr;
};
void combine_near_and_far(const FarRead& read);

}  // namespace sunfall

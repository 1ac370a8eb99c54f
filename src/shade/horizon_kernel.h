#pragma once
// The inner loop of the far-horizon sweep.
//
// For one direction of light, parallel lines cross a tile away from the light. `u` counts rows
// along the march (the light comes from small u), `v` columns across it; line l passes v = first_v + l +
// lean·u. Each line keeps the upper hull of the ground it has passed as a chain of parent links: the parent
// of a point is the point that makes its horizon. From a receiver the horizon is found by walking
// the chain while the slope still rises (Dozier and Frew 1990; Timonen and Westerholm 2010, O(1)
// amortised). Rows are taken in groups, of which each line keeps one, at its own distance: the one
// that a line of sight of middling slope meets first.

#include <cstddef>
#include <cstdint>

namespace sunfall {

// A height that hides nothing: outside the data, or missing.
inline constexpr float kNothing = -1.0e20F;

inline constexpr int kLinesPerBlock = 32;
inline constexpr int kRowsPerNode = 4;
inline constexpr float kGroupTangent = 0.25F;  // that middling slope
// Far horizons are found at every eighth row; a receiver there sees the groups that end at least
// kFarDelay rows before it. Rows up to kNearRows before a cell are looked at one by one elsewhere,
// so that none is missed on the rows between.
inline constexpr int kNodeStride = 8;
inline constexpr int kFarDelay = 9;
inline constexpr int kNearRows = kFarDelay - 1 + kNodeStride - 1;
static_assert(kNodeStride % kRowsPerNode == 0 && (kFarDelay - 1) % kRowsPerNode == 0);

// One row of heights across the march. values[i] lies at v = first_v + i·cell.
struct MarchRow {
  const float* values = nullptr;
  int count = 0;
  float first_v = 0.0F;
  float cell = 1.0F;
  float u = 0.0F;     // a multiple of one half
  float sink = 0.0F;  // drop of the horizontal below the Earth's curve at this u, taken off heights
};

struct SweepScratch {
  float* parent_height;       // [node][line of the block]
  std::int32_t* parent_code;  // where the parent lies and which node it is, packed
};

struct SweepJob {
  const MarchRow* rows = nullptr;  // far to near
  int row_count = 0;
  int tile_row =
      0;  // index of the row with u = 0, a multiple of kRowsPerNode; the rows after it are u = 1, 2, …
  float lean = 0.0F;
  float first_v = 0.0F;
  int blocks = 0;
  const float* receivers = nullptr;  // heights at u = 0, v = 0 …; kReceiverMargin cells of margin all round
  int receiver_stride = 0;
  int tile_rows = 0;
  int tile_columns = 0;
  float row_m = 1.0F;  // metres along the ray per row
  float bend = 0.0F;   // the Earth's curve: metres of drop per row²
  // out: [node row][line], the point that makes the far horizon there; its height is kNothing where
  // there is none. Heights are less the Earth's curve, as in the rows.
  float* far_height = nullptr;
  float* far_u = nullptr;
  int far_stride = 0;
  SweepScratch scratch;  // room for (row_count / kRowsPerNode + 2) nodes of one block
};
inline constexpr int kReceiverMargin = 8;
// A million cells: as far as a packed code reaches.
inline constexpr int kMostLevels = 14;
inline constexpr std::size_t kMostRows = 1022 * kRowsPerNode;  // the packed code holds 1024 nodes

// Number of node rows for a tile of that many rows.
constexpr int node_rows(int tile_rows) { return (tile_rows - 1 + kNodeStride - 1) / kNodeStride + 1; }

using SweepKernel = void (*)(const SweepJob&);
void sweep_plain(const SweepJob& job);
#if defined(__x86_64__)
void sweep_avx2(const SweepJob& job);
void sweep_avx512(const SweepJob& job);
#endif
// The fastest kernel that this processor runs (core/instruction_set.h).
SweepKernel best_sweep_kernel();

}  // namespace sunfall

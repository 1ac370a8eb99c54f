#pragma once
// How deep the leaves lie along parallel rays, for all receivers of a tile, by a sheared sweep.
//
// u counts rows away from the light, v the cells of a row. A ray that rises by s metres per row keeps
// c = z + s·u wherever it is. Lines one cell apart march away from the light; each keeps what it has
// passed as optical depth over c, in bins: a column of leaves is a trapezoid there, flat where a ray crosses
// the whole row within it, sloping over the s metres that a ray rises in the row. A receiver reads, at its
// own c, the line that passes it within a quarter of a cell: there are two sets of lines, half a cell apart,
// and each row reads the nearer. What is added is integer, so that leaves can be taken out again once they
// are out of reach, and the same bits come out for every tile: lines, rows and bins lie where they would lie
// for any tile of the map.

#include <cstdint>
#include <vector>

#include "core/aligned.h"
#include "shade/canopy_leaves.h"
#include "shade/caster.h"

namespace sunfall {

// Of the lines' own integers to one of Depth: sums of many small columns keep their precision.
inline constexpr int kFineDepth = 8;

// Readable behind the last receiver.
inline constexpr int kCanopySpare = 16;

struct CanopyJob {
  const LeafLines* leaves = nullptr;  // lines along v
  bool reversed = false;              // u counts the map's lines from their end
  int map_lines = 0;
  int first_u = 0, rows = 0;   // the tile's
  int first_v = 0, width = 0;  // likewise, cells of a line
  // Heights in the order of the map's lines, and the lowest of each line; kCanopySpare values behind.
  const float* receivers = nullptr;
  const float* row_lowest = nullptr;

  double lean = 0.0;       // cells across per row, -1 to 1
  double rise_bins = 0.0;  // of a ray per row
  float bins_per_m = 4.0F;
  float depth = 0.0F;            // in fine units, of a whole row within leaves of density 1
  int reach = 0;                 // rows; leaves farther away do not count
  float lowest_m = 0.0F;         // of all receivers
  float highest_m = 0.0F;        // of all leaves
  std::uint16_t* out = nullptr;  // row by row in the order of u; 0 where nothing is added
};

class CanopySweep {
 public:
  // What the rows before each receiver's own take. False where that is nothing.
  bool run(const CanopyJob& job);

  // One row as a set of lines sees it: all pass their cells at the same place. At a lean they leave the row
  // in other cells than they came.
  struct Piece {
    int cell = 0;         // of line 0
    float part = 0.0F;    // of the row
    float middle = 0.0F;  // rise of a ray from the piece's middle to the row's, in parts of a bin
    int half = 0;         // half the rise within the piece, at least half a bin; likewise
    int step = 0;         // of a slope per bin
  };
  struct Row {
    int map_line = 0;
    int cell = 0;            // that line 0 stands in at the row's middle
    bool read = false;       // by the row's receivers
    bool counts = false;     // some row that its leaves reach is read
    int bin = 0;             // c - z, in bins, rounded down
    float bin_fraction = 0;  // and what that took away, in bins
    int dead = 0;            // no receiver of this row or a later one reads a bin below
    int pieces = 0;
    Piece piece[2];
  };
  struct Block;

 private:
  void lay_rows(const CanopyJob& job, int before, int set);
  static void cut(Row& row, const CanopyJob& job, double place);
  bool run_set(const CanopyJob& job, int before, bool expire);

  std::vector<Row> rows_;
  AlignedVector<std::int32_t> bins_;
};

}  // namespace sunfall

#include "shade/canopy_sweep.h"

#include <algorithm>
#include <array>
#include <bit>
#include <cmath>
#include <limits>

#include "core/clones.h"

namespace sunfall {
namespace {

// Sixteen at a time; the compiler splits them where registers are shorter.
using Floats = float __attribute__((vector_size(64)));
using Ints = std::int32_t __attribute__((vector_size(64)));
constexpr int kGroup = 16;

constexpr int kLines = 32;  // that march together: their bins stay in the nearest cache
constexpr int kSets = 2;    // of lines one cell apart
// Bins behind the last one that a column reaches: those that a receiver reads, and the rest of a group.
constexpr int kSpare = 2 * kGroup;
constexpr int kPartBits = 8;  // heights within a bin
constexpr int kParts = 1 << kPartBits;
constexpr int kSlope = 4096;  // a trapezoid's slopes rise from 0 to this
// A column so deep leaves nothing (Depth ends at e^-16); sums of two a row over a thousand rows keep within
// 31 bits.
constexpr int kDeepest = static_cast<int>(16.0F * kDepthUnits) * kFineDepth;
constexpr float kMostDepth = 1.0e9F;  // of a whole row, before it is cut to kDeepest

[[gnu::always_inline]] inline bool any_of(Ints mask) {
  std::uint64_t words[kGroup / 2];
  __builtin_memcpy(words, &mask, sizeof words);
  return ((words[0] | words[1]) | (words[2] | words[3]) | (words[4] | words[5]) | (words[6] | words[7])) != 0;
}

[[gnu::always_inline]] inline int floor_of(float a) {
  const int whole = static_cast<int>(a);
  return whole - (static_cast<float>(whole) > a ? 1 : 0);
}

}  // namespace

// The lines of one block, and the bins that each has filled.
struct CanopySweep::Block {
  const CanopyJob& job;
  const Row* rows;  // from first_row on
  int first_row;    // u
  int line;         // the first of the block
  std::int32_t* bins;
  int stride;
  int base = 0;  // bin at the start of the lines' bins
  // A bin that is zero, as the next is; what lies above is not there. Readable by whole groups.
  std::array<std::int32_t, kLines + kGroup> top{};
  std::array<std::int32_t, kLines> cleared{};  // the end of those that were zeroed, in whole groups
  int highest = 0;                             // of top

  const Row& row(int u) const { return rows[u - first_row]; }

  // Room for the bins up to and with `last`, a zero one above it, and another to read up to.
  [[gnu::always_inline]] void reach_up(int at, int last, int dead) {
    if (last < top[at]) return;
    std::int32_t* line_bins = bins + static_cast<std::ptrdiff_t>(at) * stride;
    int bin = std::max(cleared[at], dead & -kGroup);
    for (; bin < last + 3; bin += kGroup) {
      constexpr Ints kZero = {};
      __builtin_memcpy(line_bins + bin, &kZero, sizeof kZero);
    }
    cleared[at] = bin;
    top[at] = last + 1;
    highest = std::max(highest, last + 1);
  }

  // Adds a column's trapezoid to a line, or takes it away. Where a ray rises less than a bin within the
  // piece, the slope is made a bin wide: every column then keeps its area whatever bin it begins in.
  template <int kSign>
  [[gnu::always_inline]] void pass(int at, const LeafColumn& column, const Row& row, const Piece& piece,
                                   int dead) {
    const float scale = job.bins_per_m * kParts, offset = row.bin_fraction * kParts + piece.middle;
    const int low = static_cast<int>(column.base_m * scale + offset);
    const int high = static_cast<int>(column.top_m * scale + offset);
    const int origin = base - row.bin;  // bins count from the ray's own height here
    const int last = ((high + piece.half) >> kPartBits) - origin;
    if (last < dead) return;
    const int first = std::max(((low - piece.half) >> kPartBits) - origin, dead) & -kGroup;
    if (kSign > 0) reach_up(at, last, dead);
    const float depth =
        std::min(column.density * job.depth * piece.part, kMostDepth) * (1.0F / static_cast<float>(kSlope));
    // Whole groups, so that what one row stores the next can load at once. Both slopes at the first bin; they
    // pass half their rise at the column's base and top.
    const std::int64_t place = static_cast<std::int64_t>(first + origin) * kParts;
    const int at_base = static_cast<int>((place - low) * piece.step >> kPartBits) + kSlope / 2;
    const int at_top = static_cast<int>((place - high) * piece.step >> kPartBits) + kSlope / 2;
    std::int32_t* to = bins + static_cast<std::ptrdiff_t>(at) * stride + first;
    const int step = piece.step;
    int rising = at_base, falling = at_top;
    for (int bin = first; bin <= last; bin += kGroup, to += kGroup) {
      for (int i = 0; i < kGroup; ++i) {  // the compiler makes this loop wide
        const int share = std::min(std::max(rising + i * step, 0), kSlope) -
                          std::min(std::max(falling + i * step, 0), kSlope);
        const int whole = std::min(static_cast<int>(static_cast<float>(share) * depth + 0.5F), kDeepest);
        to[i] += kSign * whole;
      }
      rising += kGroup * piece.step;
      falling += kGroup * piece.step;
    }
  }

  template <int kSign>
  [[gnu::always_inline]] void pass_row(const Row& row, int dead) {
    if (!row.counts) return;
    for (int i = 0; i < row.pieces; ++i) {
      const Piece& piece = row.piece[i];
      const int cell = line + piece.cell;
      std::uint64_t bits = job.leaves->bits(row.map_line, cell) & ((std::uint64_t{1} << kLines) - 1);
      if (bits == 0) continue;
      const LeafColumn* column = job.leaves->first(row.map_line, cell, bits);
      for (; bits != 0; bits &= bits - 1) pass<kSign>(std::countr_zero(bits), *column++, row, piece, dead);
    }
  }

  // Up to a group of cells, each from its own line.
  [[gnu::always_inline]] bool receive_group(const Row& row, const float* eyes, int at, int count,
                                            std::uint16_t* out) const {
    Floats height;
    __builtin_memcpy(&height, eyes + at, sizeof height);
    height = height * job.bins_per_m + row.bin_fraction;
    Ints whole = __builtin_convertvector(height, Ints);
    whole += __builtin_convertvector(whole, Floats) > height;  // true is -1
    const Floats fraction = height - __builtin_convertvector(whole, Floats);
    whole += row.bin - base;
    Ints above;
    __builtin_memcpy(&above, top.data() + at, sizeof above);
    if (!any_of(whole < above)) return false;
    whole = whole < above ? whole : above;
    std::int32_t bin[kGroup];
    __builtin_memcpy(bin, &whole, sizeof bin);
    const std::int32_t* line_bins = bins + static_cast<std::ptrdiff_t>(at) * stride;
    std::int32_t pairs[2 * kGroup] = {};
    for (int i = 0; i < count; ++i) {
      __builtin_memcpy(pairs + 2 * i, line_bins + static_cast<std::ptrdiff_t>(i) * stride + bin[i],
                       2 * sizeof *pairs);
    }
    Ints x, y;
    __builtin_memcpy(&x, pairs, sizeof x);
    __builtin_memcpy(&y, pairs + kGroup, sizeof y);
    const Floats a = __builtin_convertvector(
        __builtin_shufflevector(x, y, 0, 2, 4, 6, 8, 10, 12, 14, 16, 18, 20, 22, 24, 26, 28, 30), Floats);
    const Floats b = __builtin_convertvector(
        __builtin_shufflevector(x, y, 1, 3, 5, 7, 9, 11, 13, 15, 17, 19, 21, 23, 25, 27, 29, 31), Floats);
    Ints depth = __builtin_convertvector((a + fraction * (b - a)) * (1.0F / kFineDepth) + 0.5F, Ints);
    depth = depth < 65535 ? depth : Ints{} + 65535;
    std::int32_t found[kGroup];
    __builtin_memcpy(found, &depth, sizeof found);
    for (int i = 0; i < count; ++i) out[at + i] = static_cast<std::uint16_t>(found[i]);
    return true;
  }

  [[gnu::always_inline]] bool receive(const Row& row, int u) const {
    const int first_cell = line + row.cell - job.first_v;  // of the block's first line
    const int begin = std::max(0, -first_cell), end = std::min(kLines, job.width - first_cell);
    const int place = job.reversed ? job.rows - 1 - (u - job.first_u) : u - job.first_u;
    const float* eyes = job.receivers + static_cast<std::ptrdiff_t>(place) * job.width + first_cell;
    std::uint16_t* out = job.out + static_cast<std::ptrdiff_t>(u - job.first_u) * job.width + first_cell;
    bool any = false;
    int at = begin;
    for (; at + kGroup <= end; at += kGroup) any |= receive_group(row, eyes, at, kGroup, out);
    if (at < end) any |= receive_group(row, eyes, at, end - at, out);
    return any;
  }
};

namespace {

// From the farthest row that counts to the last row of the tile that the block's cells stand in.
SUNFALL_CLONES bool march(CanopySweep::Block& block, int from, int first_u, int last_u, bool expire) {
  const CanopyJob& job = block.job;
  bool any = false;
  for (int u = from; u <= last_u; ++u) {
    const CanopySweep::Row& row = block.row(u);
    // The block's first receivers stand in first_u.
    const int dead = u > first_u ? row.dead - block.base : 0;
    if (u >= first_u) {
      if (expire && u - job.reach - 1 >= from) block.pass_row<-1>(block.row(u - job.reach - 1), dead);
      if (row.read && block.highest > dead && block.receive(row, u)) any = true;
    }
    block.pass_row<1>(row, dead);
  }
  return any;
}

}  // namespace

// Where a row's lines cross from one cell into another: they all do at the same place, being a cell apart.
// They pass the row's middle at `place` of their cell, -0.5 to 0.5.
void CanopySweep::cut(Row& row, const CanopyJob& job, double place) {
  const auto side = [&](double v) { return v < -0.5 ? -1 : v > 0.5 ? 1 : 0; };
  const int enters = side(place - 0.5 * job.lean), leaves = side(place + 0.5 * job.lean);
  const double border = enters == leaves ? 0.5 : (0.5 * (enters + leaves) - place) / job.lean;
  const auto add = [&](int where, double from, double to) {
    if (!(to > from)) return;
    Piece& piece = row.piece[row.pieces++];
    const double rise = std::max(1.0, job.rise_bins * (to - from));
    piece.cell = row.cell + where;
    piece.part = static_cast<float>(to - from);
    piece.middle = static_cast<float>(job.rise_bins * 0.5 * (from + to) * kParts);
    piece.half = static_cast<int>(std::lround(0.5 * rise * kParts));
    piece.step = static_cast<int>(std::lround(kSlope / rise));
  };
  add(enters, -0.5, border);
  add(leaves, border, 0.5);
}

void CanopySweep::lay_rows(const CanopyJob& job, int before, int set) {
  rows_.assign(static_cast<std::size_t>(before + job.rows), {});
  for (int i = 0; i < before + job.rows; ++i) {
    const int u = job.first_u - before + i;
    Row& row = rows_[static_cast<std::size_t>(i)];
    row.map_line = job.reversed ? job.map_lines - 1 - u : u;
    const double across = job.lean * u, line = across + static_cast<double>(set) / kSets;
    const double cell = std::floor(line + 0.5);
    row.cell = static_cast<int>(cell);
    const int nearest = static_cast<int>(std::floor((across - std::floor(across)) * kSets + 0.5));
    row.read = (kSets - nearest) % kSets == set;
    const double bins = job.rise_bins * u, bin = std::floor(bins);
    row.bin = static_cast<int>(bin);
    row.bin_fraction = static_cast<float>(bins - bin);
    cut(row, job, line - cell);
  }
  int dead = std::numeric_limits<int>::max();
  for (int i = job.rows - 1; i >= 0; --i) {
    Row& row = rows_[static_cast<std::size_t>(before + i)];
    const int place = job.reversed ? job.rows - 1 - i : i;
    dead = std::min(dead, floor_of(job.row_lowest[place] * job.bins_per_m + row.bin_fraction) + row.bin);
    row.dead = dead;
  }
  for (int i = before - 1; i >= 0; --i) rows_[static_cast<std::size_t>(i)].dead = dead;
  // Near the map's axes and diagonals one set of lines serves many rows in a stretch, or all of them.
  int next_read = std::numeric_limits<int>::max();
  for (int i = before + job.rows - 1; i >= 0; --i) {
    Row& row = rows_[static_cast<std::size_t>(i)];
    row.counts = next_read <= i + before;
    if (row.read && i >= before) next_read = i;
  }
}

bool CanopySweep::run(const CanopyJob& job) {
  // Bins and slopes of a bin's width let a column reach up to a bin and a half above its top.
  const double above = static_cast<double>(job.highest_m - job.lowest_m) * job.bins_per_m + 2.0;
  if (above < 0.0) return false;
  const double natural = job.rise_bins > 0.0 ? above / job.rise_bins + 1.0 : 1.0e9;
  const bool expire = natural > job.reach;
  const int before = expire ? job.reach : static_cast<int>(std::ceil(natural));
  bool any = false;
  for (int set = 0; set < kSets; ++set) {
    lay_rows(job, before, set);
    if (run_set(job, before, expire)) any = true;
  }
  return any;
}

bool CanopySweep::run_set(const CanopyJob& job, int before, bool expire) {
  const Row &first_row = rows_[static_cast<std::size_t>(before)], &last_row = rows_.back();
  const int most_bins = static_cast<int>(job.highest_m * job.bins_per_m + job.rise_bins) + last_row.bin + 4 -
                        first_row.dead + kSpare;
  // An odd number of groups, so that the lines' bins do not compete for the same places of the cache.
  const int stride = ((std::max(most_bins, kSpare) / kGroup + 1) | 1) * kGroup;
  bins_.resize(static_cast<std::size_t>(stride) * kLines);

  const int end_u = job.first_u + job.rows, end_v = job.first_v + job.width;
  const int low = std::min(first_row.cell, last_row.cell), high = std::max(first_row.cell, last_row.cell);
  bool any = false;
  for (int line = job.first_v - high; line < end_v - low; line += kLines) {
    const auto stands_in = [&](int u) {
      const int cell = line + rows_[static_cast<std::size_t>(u - job.first_u + before)].cell;
      return cell < end_v && cell + kLines > job.first_v;
    };
    int first_u = job.first_u, last_u = end_u - 1;
    while (first_u <= last_u && !stands_in(first_u)) ++first_u;
    while (last_u >= first_u && !stands_in(last_u)) --last_u;
    if (first_u > last_u) continue;
    Block block{job, rows_.data(), job.first_u - before, line, bins_.data(), stride};
    block.base = block.row(first_u).dead;
    for (int i = 0; i < kLines; ++i)
      std::fill_n(bins_.data() + static_cast<std::ptrdiff_t>(i) * stride, kGroup, 0);
    block.cleared.fill(kGroup);
    if (march(block, first_u - before, first_u, last_u, expire)) any = true;
  }
  return any;
}

}  // namespace sunfall

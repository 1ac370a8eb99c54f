// The body of the far-horizon kernel, compiled once per instruction set. See horizon_kernel.h.

#include "shade/horizon_kernel.h"
#include "shade/lanes.h"

namespace sunfall {
namespace {

using Float = Lanes::Float;
using Int = Lanes::Int;
using Mask = Lanes::Mask;
constexpr int kParts = kLinesPerBlock / Lanes::kWidth;
constexpr int kNodeBits = 10;

// A point of the hull packed in one integer: twice its u above, its node's index below.
inline std::int32_t packed(float u, int node) {
  return static_cast<std::int32_t>(static_cast<std::uint32_t>(static_cast<std::int32_t>(2.0F * u))
                                   << kNodeBits) |
         node;
}
inline Float u_of(Int code) {
  return Lanes::mul(Lanes::to_float(Lanes::shift_right<kNodeBits>(code)), Lanes::set(0.5F));
}

// The walk along the chain, one lane per line: `at` is the best point so far, `next` its parent.
struct Walk {
  Float eye_height, eye_u;
  Float at_height, at_run;  // run: rows from the eye back to the point
  Int at_code;
  Float next_height, next_run;
  Int next_code;

  // Whether the slope to `next` exceeds the slope to `at`.
  Mask rises() const {
    const Float at_rise = Lanes::sub(at_height, eye_height);
    const Float next_rise = Lanes::sub(next_height, eye_height);
    return Lanes::greater(Lanes::mul(next_rise, at_run), Lanes::mul(at_rise, next_run));
  }
  void step(Mask mask, const SweepScratch& scratch, Int lane) {
    at_height = Lanes::choose(mask, next_height, at_height);
    at_run = Lanes::choose(mask, next_run, at_run);
    at_code = Lanes::choose(mask, next_code, at_code);
    const Int node = Lanes::bit_and(next_code, Lanes::set((1 << kNodeBits) - 1));
    const Int index = Lanes::add(Lanes::shift_left<5>(node), lane);
    next_height = Lanes::gather(scratch.parent_height, index, mask, next_height);
    next_code = Lanes::gather(scratch.parent_code, index, mask, next_code);
    next_run = Lanes::sub(eye_u, u_of(next_code));
  }
};
static_assert(kLinesPerBlock == 32, "shift_left<5> above");

inline void walk_all(Walk (&walks)[kParts], const SweepScratch& scratch) {
  Mask masks[kParts];
  bool more = false;
  for (int part = 0; part < kParts; ++part) {
    masks[part] = walks[part].rises();
    more = more | Lanes::any(masks[part]);
  }
  while (more) {
    more = false;
    for (int part = 0; part < kParts; ++part) {
      const Int lane = Lanes::add(Lanes::count(), Lanes::set(part * Lanes::kWidth));
      walks[part].step(masks[part], scratch, lane);
      masks[part] = Lanes::both(masks[part], walks[part].rises());
      more = more | Lanes::any(masks[part]);
    }
  }
}

class BlockSweep {
 public:
  BlockSweep(const SweepJob& job, int block)
      : job_(job), block_(block), first_v_(job.first_v + static_cast<float>(block * kLinesPerBlock)) {
    for (int part = 0; part < kParts; ++part) {
      height_[part] = parent_height_[part] = Lanes::set(kNothing);
      code_[part] = parent_code_[part] = Lanes::set(packed(-1.0e6F, 0));
      store_node(0, part);
    }
  }

  void run() {
    int done = 0;  // groups of rows taken so far
    for (int node_row = 0; node_row < node_rows(job_.tile_rows); ++node_row) {
      const int row = job_.tile_row + node_row * kNodeStride;
      if (!in_tile(node_row * kNodeStride)) continue;
      for (; done < (row - kFarDelay + 1) / kRowsPerNode; ++done) take_group(done);
      look(node_row);
    }
  }

 private:
  // Whether any line of the block is over the tile, with a cell to spare, at rows near u.
  bool in_tile(int u) const {
    const float slack = 2.0F + kNodeStride;
    const float v = first_v_ + job_.lean * static_cast<float>(u);
    return v + kLinesPerBlock >= -slack && v <= static_cast<float>(job_.tile_columns) + slack;
  }

  void store_node(int node, int part) {
    const int at = node * kLinesPerBlock + part * Lanes::kWidth;
    Lanes::store(job_.scratch.parent_height + at, parent_height_[part]);
    Lanes::store(job_.scratch.parent_code + at, parent_code_[part]);
  }

  // The row's heights under the block's lines.
  void sample(const MarchRow& row, Float (&z)[kParts]) const {
    const float v = first_v_ + job_.lean * row.u - row.first_v;
    if (row.cell == 1.0F) {
      const float whole = __builtin_floorf(v);
      const int index = static_cast<int>(whole);
      if (index >= 0 && index + kLinesPerBlock + 1 <= row.count) {
        const Float fraction = Lanes::set(v - whole);
        for (int part = 0; part < kParts; ++part) {
          const float* p = row.values + index + part * Lanes::kWidth;
          z[part] = between(Lanes::load(p), Lanes::load(p + 1), fraction, row.sink);
        }
        return;
      }
    }
    for (int part = 0; part < kParts; ++part) {
      z[part] = sample_coarse(row, v + static_cast<float>(part * Lanes::kWidth));
    }
  }

  // Heights of a row of larger cells, or beside its ends, under the lines from v on.
  static Float sample_coarse(const MarchRow& row, float v) {
    const Float lane = Lanes::to_float(Lanes::count());
    const Float place = Lanes::mul(Lanes::add(lane, Lanes::set(v)), Lanes::set(1.0F / row.cell));
    const Float whole = Lanes::floor(place);
    const Int index = Lanes::to_int(whole);
    const Float fraction = Lanes::sub(place, whole);
    const int first = static_cast<int>(__builtin_floorf(v * (1.0F / row.cell)));
    // The lines stand over less than a register of cells: one load and a shuffle.
    if (row.cell > 1.0F && first >= 0 && first + Lanes::kWidth + 1 <= row.count) {
      const Int offset = Lanes::add(index, Lanes::set(-first));
      const Float left = Lanes::pick(Lanes::load(row.values + first), offset);
      const Float right = Lanes::pick(Lanes::load(row.values + first + 1), offset);
      return between(left, right, fraction, row.sink);
    }
    const Mask inside = Lanes::inside(index, row.count > 0 ? row.count - 1 : 0);
    const Float nothing = Lanes::set(kNothing);
    const Float left = Lanes::gather(row.values, index, inside, nothing);
    const Float right = Lanes::gather(row.values + 1, index, inside, nothing);
    return between(left, right, fraction, row.sink);
  }
  static Float between(Float left, Float right, Float fraction, float sink) {
    const Float mixed = Lanes::add(left, Lanes::mul(fraction, Lanes::sub(right, left)));
    return Lanes::sub(mixed, Lanes::set(sink));
  }

  // Of the rows of a group, each line keeps the one that a line of sight of middling slope meets first.
  void take_group(int group) {
    const MarchRow* rows = job_.rows + kRowsPerNode * group;
    const int node = group + 1;
    const float nearest = rows[kRowsPerNode - 1].u;
    Walk walks[kParts];
    Int codes[kParts];
    Float best[kParts];
    for (int i = 0; i < kRowsPerNode; ++i) {
      Float z[kParts];
      sample(rows[i], z);
      const Float handicap = Lanes::set(kGroupTangent * (nearest - rows[i].u) * job_.row_m);
      for (int part = 0; part < kParts; ++part) {
        Walk& walk = walks[part];
        const Float merit = Lanes::sub(z[part], handicap);
        // The nearer row wins a tie.
        const Mask keep = i == 0 ? Lanes::greater(merit, merit) : Lanes::greater(best[part], merit);
        best[part] = i == 0 ? merit : Lanes::choose(keep, best[part], merit);
        walk.eye_height = i == 0 ? z[part] : Lanes::choose(keep, walk.eye_height, z[part]);
        walk.eye_u = i == 0 ? Lanes::set(rows[i].u) : Lanes::choose(keep, walk.eye_u, Lanes::set(rows[i].u));
        const Int code = Lanes::set(packed(rows[i].u, node));
        codes[part] = i == 0 ? code : Lanes::choose(keep, codes[part], code);
      }
    }
    for (int part = 0; part < kParts; ++part) aim(walks[part], part);
    walk_all(walks, job_.scratch);
    for (int part = 0; part < kParts; ++part) {
      height_[part] = walks[part].eye_height;
      code_[part] = codes[part];
      parent_height_[part] = walks[part].at_height;
      parent_code_[part] = walks[part].at_code;
      store_node(node, part);
    }
  }

  // From the walk's eye to the newest point of the hull and its parent.
  void aim(Walk& walk, int part) const {
    walk.at_height = height_[part];
    walk.at_code = code_[part];
    walk.at_run = Lanes::sub(walk.eye_u, u_of(walk.at_code));
    walk.next_height = parent_height_[part];
    walk.next_code = parent_code_[part];
    walk.next_run = Lanes::sub(walk.eye_u, u_of(walk.next_code));
  }

  // The horizons of the receivers on one node row, over the pairs taken so far.
  void look(int node_row) {
    const int u = node_row * kNodeStride;
    const float eye_sink = job_.bend * static_cast<float>(u) * static_cast<float>(u);
    Walk walks[kParts];
    for (int part = 0; part < kParts; ++part) {
      walks[part].eye_u = Lanes::set(static_cast<float>(u));
      walks[part].eye_height = Lanes::sub(receiver_height(u, part), Lanes::set(eye_sink));
      aim(walks[part], part);
    }
    walk_all(walks, job_.scratch);
    for (int part = 0; part < kParts; ++part) {
      const int at = node_row * job_.far_stride + block_ * kLinesPerBlock + part * Lanes::kWidth;
      Lanes::store(job_.far_height + at, walks[part].at_height);
      Lanes::store(job_.far_u + at, u_of(walks[part].at_code));
    }
  }

  // Receiver heights at the lines' own places on row u; lines beyond the margin use its edge.
  Float receiver_height(int u, int part) const {
    const float v = first_v_ + job_.lean * static_cast<float>(u);
    const float whole = __builtin_floorf(v);
    const Float fraction = Lanes::set(v - whole);
    const int row = u < job_.tile_rows + kReceiverMargin - 1 ? u : job_.tile_rows + kReceiverMargin - 1;
    const float* values = job_.receivers + row * job_.receiver_stride;
    const int first = static_cast<int>(whole) + part * Lanes::kWidth;
    const int low = -kReceiverMargin;
    const int high = job_.tile_columns + kReceiverMargin - 2;
    if (first >= low && first + Lanes::kWidth - 1 <= high) {
      return between(Lanes::load(values + first), Lanes::load(values + first + 1), fraction, 0.0F);
    }
    float left[Lanes::kWidth], right[Lanes::kWidth];
    for (int lane = 0; lane < Lanes::kWidth; ++lane) {
      int column = first + lane;
      column = column < low ? low : column > high ? high : column;
      left[lane] = values[column];
      right[lane] = values[column + 1];
    }
    return between(Lanes::load(left), Lanes::load(right), fraction, 0.0F);
  }

  const SweepJob& job_;
  int block_;
  float first_v_;
  // The newest node of the hull.
  Float height_[kParts];
  Int code_[kParts];
  Float parent_height_[kParts];
  Int parent_code_[kParts];
};

inline void sweep_blocks(const SweepJob& job) {
  for (int block = 0; block < job.blocks; ++block) BlockSweep(job, block).run();
}

}  // namespace
}  // namespace sunfall

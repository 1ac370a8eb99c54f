#pragma once
// What a horizon takes: for every look and every horizon step, the share of each
// period's open-field beam and sky light that lies below the horizon.

#include <cstdint>
#include <vector>

#include "core/aligned.h"
#include "dome/horizon_steps.h"
#include "sunfall/dome.h"

namespace sunfall {

// A direction that horizons are looked for in, and the lines of the dome that it stands for.
struct Look {
  int first_line = 0;
  int lines = 1;
  Azimuth azimuth;
};
// Thin things far away cast their spokes in the beam of a low sun: a sector gets so many looks (a
// divisor of its lines) that none stands for more than Dome::beam_per_look of any period's beam from
// below 30 degrees, and at least one.
std::vector<Look> looks_of(const DomeLight& light);

// Columns: the beam share of every period, then the sky share of every period, padded with zeros.
inline constexpr int kColumnBlock = 32;
// So many entries of one column add up within 16 bits.
inline constexpr int kLooksPerWord = 4;

// For level receivers. Entries are integers in a unit of each column's own, so that sums are exact
// and in any order the same. Rounding an entry errs by at most 1/32766 of the strongest look.
class LossTable {
 public:
  LossTable(const DomeLight& light, const std::vector<Look>& looks);

  int columns() const { return columns_; }
  int blocks() const { return blocks_; }
  // [step][kColumnBlock] of one look and block of columns.
  const std::uint16_t* look(std::size_t look, int block) const {
    return entries_.data() + (static_cast<std::size_t>(block) * looks_ + look) * kHorizonSteps * kColumnBlock;
  }
  // Share of the open field for one unit of an entry.
  const std::vector<double>& units() const { return units_; }

 private:
  std::size_t looks_;
  int columns_;
  int blocks_;
  AlignedVector<std::uint16_t> entries_;
  std::vector<double> units_;
};

// For receivers in the plane of the ground: light taken from the level plane and from the vertical
// plane that faces the look, both as shares of the level open field; and the totals per look.
class SlopeLossTable {
 public:
  SlopeLossTable(const DomeLight& light, const std::vector<Look>& looks);

  int columns() const { return columns_; }
  int padded() const { return padded_; }
  // [step][2][padded]: level, then facing.
  const float* look(std::size_t look) const { return entries_.data() + look * kHorizonSteps * 2 * padded_; }
  // [padded]: the open light of a look on the vertical plane that faces it.
  const float* open_facing(std::size_t look) const { return open_facing_.data() + look * padded_; }

 private:
  int columns_;
  int padded_;
  std::vector<float> entries_;
  std::vector<float> open_facing_;
};

}  // namespace sunfall

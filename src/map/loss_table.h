#pragma once
// What a horizon takes: for every line of the dome and every horizon step, the share of each
// period's open-field beam and sky light that lies below the horizon.

#include <cstdint>
#include <vector>

#include "dome/horizon_steps.h"
#include "sunfall/dome.h"

namespace sunfall {

// Columns: the beam share of every period, then the sky share of every period, padded with zeros.
inline constexpr int kColumnBlock = 32;

// For level receivers. Entries are integers in a unit of each column's own, so that sums are exact
// and in any order the same. Rounding an entry errs by at most 1/131070 of the strongest line.
class LossTable {
 public:
  explicit LossTable(const DomeLight& light);

  int columns() const { return columns_; }
  int blocks() const { return blocks_; }
  // [step][kColumnBlock] of one line and block of columns.
  const std::uint16_t* line(int line, int block) const {
    return entries_.data() + (static_cast<std::size_t>(block) * lines_ + line) * kHorizonSteps * kColumnBlock;
  }
  // Share of the open field for one unit of an entry.
  const std::vector<double>& units() const { return units_; }

 private:
  int lines_;
  int columns_;
  int blocks_;
  std::vector<std::uint16_t> entries_;
  std::vector<double> units_;
};

// For receivers in the plane of the ground: light taken from the level plane and from the vertical
// plane that faces the line, both as shares of the level open field; and the totals per line.
class SlopeLossTable {
 public:
  explicit SlopeLossTable(const DomeLight& light);

  int columns() const { return columns_; }
  int padded() const { return padded_; }
  // [step][2][padded]: level, then facing.
  const float* line(int line) const {
    return entries_.data() + static_cast<std::size_t>(line) * kHorizonSteps * 2 * padded_;
  }
  // [padded]: the open light of a line on the vertical plane that faces it.
  const float* open_facing(int line) const {
    return open_facing_.data() + static_cast<std::size_t>(line) * padded_;
  }

 private:
  int columns_;
  int padded_;
  std::vector<float> entries_;
  std::vector<float> open_facing_;
};

}  // namespace sunfall

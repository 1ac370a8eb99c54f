#include "shade/canopy_leaves.h"

#include <cassert>

namespace sunfall {

LeafLines::LeafLines(int first_line, int lines, int first_cell, int cells)
    : first_line_(first_line),
      lines_(lines),
      first_cell_(first_cell),
      cells_(cells),
      words_(static_cast<std::size_t>(cells + 63) / 64 + 2),
      bits_(words_ * static_cast<std::size_t>(lines)) {}

void LeafLines::append(int line, int cell, const LeafColumn& column) {
  const int at = cell - first_cell_;
  assert(line >= first_line_ && line < first_line_ + lines_ && at >= 0 && at < cells_);
  bits_[word(line, at)] |= std::uint64_t{1} << at % 64;
  columns_.push_back(column);
}

void LeafLines::finish() {
  counts_.resize(bits_.size());
  std::uint32_t count = 0;
  for (std::size_t i = 0; i < bits_.size(); ++i) {
    counts_[i] = count;
    count += static_cast<std::uint32_t>(std::popcount(bits_[i]));
  }
  assert(count == columns_.size());
}

LeafLines LeafLines::turned() const {
  LeafLines out(first_cell_, cells_, first_line_, lines_);
  for_each([&](int line, int cell, const LeafColumn&) {
    const int at = line - first_line_;
    out.bits_[out.word(cell, at)] |= std::uint64_t{1} << at % 64;
  });
  out.columns_.resize(columns_.size());
  std::vector<std::uint32_t> next(static_cast<std::size_t>(cells_) + 1);
  for_each(
      [&](int, int cell, const LeafColumn&) { ++next[static_cast<std::size_t>(cell - first_cell_) + 1]; });
  for (std::size_t i = 1; i < next.size(); ++i) next[i] += next[i - 1];
  for_each([&](int, int cell, const LeafColumn& column) {
    out.columns_[next[static_cast<std::size_t>(cell - first_cell_)]++] = column;
  });
  out.finish();
  return out;
}

}  // namespace sunfall

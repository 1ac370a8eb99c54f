#pragma once
// Columns of leaves of a window, only those cells that have any: a bit per cell, and the columns behind
// them in the order of the bits.

#include <bit>
#include <cstdint>
#include <vector>

namespace sunfall {

struct LeafColumn {
  float base_m = 0.0F;   // above the map's own zero (Canopy::zero_m)
  float top_m = 0.0F;    // likewise
  float density = 0.0F;  // m2 of leaf (one side) per m3
};

// Lines of cells, rows of the map or columns of it; both are counted in map cells.
class LeafLines {
 public:
  LeafLines() = default;
  LeafLines(int first_line, int lines, int first_cell, int cells);

  // Only upwards, line by line and cell by cell.
  void append(int line, int cell, const LeafColumn& column);
  // After the last one.
  void finish();
  // The same leaves with lines and cells exchanged.
  LeafLines turned() const;

  bool empty() const { return columns_.empty(); }
  std::size_t size() const { return columns_.size(); }
  int first_line() const { return first_line_; }
  int lines() const { return lines_; }
  int first_cell() const { return first_cell_; }
  int cells() const { return cells_; }

  // One bit for each of the 64 cells from `cell` on, the lowest first; 0 outside the window.
  std::uint64_t bits(int line, int cell) const {
    const int at = cell - first_cell_;
    if (line < first_line_ || line >= first_line_ + lines_ || at <= -64 || at >= cells_) return 0;
    const std::uint64_t* words = bits_.data() + word(line, at);
    const int shift = (at + 64) % 64;
    return shift == 0 ? words[0] : words[0] >> shift | words[1] << (64 - shift);
  }
  // The column of the first bit of `bits(line, cell)`; those of the bits after it follow in memory.
  const LeafColumn* first(int line, int cell, std::uint64_t some_bits) const {
    const int at = cell - first_cell_ + std::countr_zero(some_bits);
    const std::size_t place = word(line, at);
    const std::uint64_t before = bits_[place] & ((std::uint64_t{1} << (at + 64) % 64) - 1);
    return columns_.data() + counts_[place] + std::popcount(before);
  }

  template <typename Function>
  void for_each(const Function& function) const {
    for (int line = first_line_; line < first_line_ + lines_; ++line) {
      for (int cell = first_cell_; cell < first_cell_ + cells_; cell += 64) {
        std::uint64_t left = bits(line, cell);
        const LeafColumn* column = left == 0 ? nullptr : first(line, cell, left);
        for (; left != 0; left &= left - 1) function(line, cell + std::countr_zero(left), *column++);
      }
    }
  }

 private:
  // A word without cells stands before and after those of a line.
  std::size_t word(int line, int at) const {
    return static_cast<std::size_t>(line - first_line_) * words_ + static_cast<std::size_t>(at + 64) / 64;
  }

  int first_line_ = 0, lines_ = 0, first_cell_ = 0, cells_ = 0;
  std::size_t words_ = 0;  // of a line
  std::vector<std::uint64_t> bits_;
  std::vector<std::uint32_t> counts_;  // columns before each word
  std::vector<LeafColumn> columns_;
};

}  // namespace sunfall

#pragma once
// Which shapes touch a window: their numbers by blocks of cells. Private to geo.

#include <cstdint>
#include <vector>

#include "sunfall/grid.h"

namespace sunfall {

class ShapeIndex {
 public:
  explicit ShapeIndex(const GridFrame& frame);
  // `cells` lies in the frame.
  void add(std::uint32_t shape, const CellWindow& cells);
  // In order, each once; some that only come near are among them. `window` lies in the frame.
  std::vector<std::uint32_t> near(const CellWindow& window) const;

 private:
  template <typename Use>
  void each_block(const CellWindow& window, Use use) const;

  int side_;  // of a block, cells
  int across_;
  std::vector<std::vector<std::uint32_t>> blocks_;
};

}  // namespace sunfall

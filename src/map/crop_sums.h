#pragma once
// What each plot of crop rows takes, summed over tiles in one order.

#include <vector>

#include "map/tile_solver.h"
#include "sunfall/map.h"

namespace sunfall {

class CropSums {
 public:
  CropSums(std::size_t crops, std::size_t tiles) : crops_(crops), by_tile_(tiles) {}
  // From several threads, each tile once.
  void add(std::size_t tile, const TileShares& shares, const OpenField& open);
  std::vector<CropLight> means(std::size_t periods) const;

 private:
  std::size_t crops_;
  std::vector<std::vector<CropLight>> by_tile_;  // sums, [tile][crop]
};

}  // namespace sunfall

#pragma once
// The mean shares of each plot's cells, gathered tile by tile.

#include <vector>

#include "map/tile_solver.h"

namespace sunfall {

class PlotShares {
 public:
  // `cells` of each plot are sorted by row, then column, and outlive this. Tiles are told apart by their
  // place in the map, so that sums do not depend on which comes first.
  PlotShares(const std::vector<std::vector<CellIndex>>& cells, std::size_t tiles);

  // From several threads, each tile once.
  void add(std::size_t tile, const TileShares& shares);
  // [plot][column]; missing (NaN) for a plot without a receiver.
  std::vector<std::vector<double>> means() const;

 private:
  struct Sum {
    std::size_t plot = 0;
    std::size_t cells = 0;
    std::vector<double> shares;
  };
  const std::vector<std::vector<CellIndex>>& cells_;
  std::vector<std::vector<Sum>> sums_;  // [tile]
};

}  // namespace sunfall

#include "map/plot_shares.h"

#include <algorithm>

namespace sunfall {
namespace {

bool before(const CellIndex& a, const CellIndex& b) {
  return a.row != b.row ? a.row < b.row : a.column < b.column;
}

}  // namespace

PlotShares::PlotShares(const std::vector<std::vector<CellIndex>>& cells, std::size_t tiles)
    : cells_(cells), sums_(tiles) {}

void PlotShares::add(std::size_t tile, const TileShares& shares) {
  const CellWindow& window = shares.window;
  for (std::size_t plot = 0; plot < cells_.size(); ++plot) {
    const std::vector<CellIndex>& cells = cells_[plot];
    Sum sum{plot, 0, std::vector<double>(static_cast<std::size_t>(shares.columns), 0.0)};
    auto at = std::lower_bound(cells.begin(), cells.end(), CellIndex{window.column, window.row}, before);
    while (at != cells.end() && at->row < window.row + window.rows) {
      if (at->column < window.column) {
        at = std::lower_bound(at, cells.end(), CellIndex{window.column, at->row}, before);
        continue;
      }
      if (at->column >= window.column + window.columns) {
        at = std::lower_bound(at, cells.end(), CellIndex{window.column, at->row + 1}, before);
        continue;
      }
      const std::size_t cell = static_cast<std::size_t>(at->row - window.row) * window.columns +
                               static_cast<std::size_t>(at->column - window.column);
      ++at;
      if (!shares.usable[cell]) continue;
      ++sum.cells;
      for (std::size_t c = 0; c < sum.shares.size(); ++c) sum.shares[c] += shares.of(cell)[c];
    }
    if (sum.cells > 0) sums_[tile].push_back(std::move(sum));
  }
}

std::vector<std::vector<double>> PlotShares::means() const {
  std::vector<std::vector<double>> means(cells_.size());
  std::vector<std::size_t> counts(cells_.size(), 0);
  std::size_t columns = 0;
  for (const std::vector<Sum>& tile : sums_) {
    for (const Sum& sum : tile) {
      columns = sum.shares.size();
      means[sum.plot].resize(columns, 0.0);
      counts[sum.plot] += sum.cells;
      for (std::size_t c = 0; c < columns; ++c) means[sum.plot][c] += sum.shares[c];
    }
  }
  for (std::size_t plot = 0; plot < means.size(); ++plot) {
    means[plot].resize(columns, kMissing);
    for (double& mean : means[plot]) mean /= static_cast<double>(counts[plot]);
  }
  return means;
}

}  // namespace sunfall

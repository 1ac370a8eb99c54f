#include "geo/shape_index.h"

#include <algorithm>

namespace sunfall {
namespace {

constexpr int kLeastSide = 64;
constexpr int kMostAcross = 256;

}  // namespace

ShapeIndex::ShapeIndex(const GridFrame& frame)
    : side_(std::max(kLeastSide, std::max(frame.columns, frame.rows) / kMostAcross + 1)),
      across_((frame.columns - 1) / side_ + 1),
      blocks_(static_cast<std::size_t>(across_) * static_cast<std::size_t>((frame.rows - 1) / side_ + 1)) {}

template <typename Use>
void ShapeIndex::each_block(const CellWindow& window, Use use) const {
  for (int row = window.row / side_; row <= (window.row + window.rows - 1) / side_; ++row) {
    for (int column = window.column / side_; column <= (window.column + window.columns - 1) / side_; ++column)
      use(static_cast<std::size_t>(row) * static_cast<std::size_t>(across_) +
          static_cast<std::size_t>(column));
  }
}

void ShapeIndex::add(std::uint32_t shape, const CellWindow& cells) {
  each_block(cells, [&](std::size_t block) { blocks_[block].push_back(shape); });
}

std::vector<std::uint32_t> ShapeIndex::near(const CellWindow& window) const {
  std::vector<std::uint32_t> shapes;
  each_block(window, [&](std::size_t block) {
    shapes.insert(shapes.end(), blocks_[block].begin(), blocks_[block].end());
  });
  std::sort(shapes.begin(), shapes.end());
  shapes.erase(std::unique(shapes.begin(), shapes.end()), shapes.end());
  return shapes;
}

}  // namespace sunfall

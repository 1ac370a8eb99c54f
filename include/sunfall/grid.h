#pragma once
// Georeferenced grids of square cells, north up, in metres. Row 0 is the northern row, column 0
// the western column; values are stored row by row. A missing float is NaN.

#include <cstddef>
#include <cstdint>
#include <limits>
#include <string>
#include <utility>
#include <vector>

namespace sunfall {

inline constexpr float kMissing = std::numeric_limits<float>::quiet_NaN();

// A point in map coordinates, metres.
struct MapPoint {
  double east = 0.0;
  double north = 0.0;
};

struct CellIndex {
  int column = 0;
  int row = 0;
  bool operator==(const CellIndex&) const = default;
};

// A rectangle of cells; may reach outside the frame that it refers to.
struct CellWindow {
  int column = 0;
  int row = 0;
  int columns = 0;
  int rows = 0;
  bool operator==(const CellWindow&) const = default;
};

// Where a grid lies. `west` and `north` are the outer edges of the corner cell.
struct GridFrame {
  int columns = 0;
  int rows = 0;
  double west = 0.0;
  double north = 0.0;
  double cell_m = 1.0;
  std::string crs_wkt;  // projected, metres; empty for a local plane

  std::size_t size() const { return static_cast<std::size_t>(columns) * static_cast<std::size_t>(rows); }
  MapPoint centre(CellIndex cell) const {
    return {west + (cell.column + 0.5) * cell_m, north - (cell.row + 0.5) * cell_m};
  }
  MapPoint middle() const { return {west + 0.5 * columns * cell_m, north - 0.5 * rows * cell_m}; }
};

template <typename T>
class Grid {
 public:
  Grid() = default;
  explicit Grid(GridFrame frame, T fill = T{}) : frame_(std::move(frame)), values_(frame_.size(), fill) {}

  const GridFrame& frame() const { return frame_; }
  int columns() const { return frame_.columns; }
  int rows() const { return frame_.rows; }
  T& at(int column, int row) { return values_[index(column, row)]; }
  const T& at(int column, int row) const { return values_[index(column, row)]; }
  std::vector<T>& values() & { return values_; }
  const std::vector<T>& values() const& { return values_; }
  // By value from a temporary, so that a loop over `read(...).values()` does not outlive its grid.
  std::vector<T> values() && { return std::move(values_); }

 private:
  std::size_t index(int column, int row) const {
    return static_cast<std::size_t>(row) * static_cast<std::size_t>(frame_.columns) +
           static_cast<std::size_t>(column);
  }
  GridFrame frame_;
  std::vector<T> values_;
};

}  // namespace sunfall

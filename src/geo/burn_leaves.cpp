#include "geo/burn_leaves.h"

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <numbers>

namespace sunfall {
namespace {

// A crown is looked at in this many lines at least, and each cell in so many.
constexpr double kLeastLines = 32.0;
constexpr double kLeastLinesPerCell = 4.0;
// Coverage is rounded to this part of a cell: sums of edges are good to 1e-15 only, and must not leave
// leaves where nothing grows.
constexpr double kCoverageSteps = 1048576.0;

// In cells to the east and south of the frame's corner.
double column_of(MapPoint point, const GridFrame& frame) { return (point.east - frame.west) / frame.cell_m; }
double row_of(MapPoint point, const GridFrame& frame) { return (frame.north - point.north) / frame.cell_m; }

// The whole cells of a span, clipped so far that they fit an int.
int whole_cell(double value, double least, double most) {
  return static_cast<int>(std::clamp(std::floor(value), least, most));
}

CellWindow window_of(double west, double east, double north, double south, const GridFrame& frame) {
  if (!(east > 0.0 && west < frame.columns && south > 0.0 && north < frame.rows)) return {};
  const int column = whole_cell(west, 0.0, frame.columns - 1.0);
  const int row = whole_cell(north, 0.0, frame.rows - 1.0);
  return {column, row, whole_cell(east, 0.0, frame.columns - 1.0) - column + 1,
          whole_cell(south, 0.0, frame.rows - 1.0) - row + 1};
}

// Sums over a cell's lines through the crown, each with the height s of the ellipsoid there, 1 on its axis.
struct CellLines {
  double heights = 0.0;
  double cubes = 0.0;
};

struct LineRange {
  int first = 0;
  int last = -1;
};

// The lines of a cell, `per_side` of them, within the radius of a centre that is counted from the cell's
// edge.
LineRange lines_within(double centre, double radius, int per_side) {
  return {static_cast<int>(std::max(0.0, std::ceil((centre - radius) * per_side - 0.5))),
          static_cast<int>(std::min(per_side - 1.0, std::floor((centre + radius) * per_side - 0.5)))};
}

// The centre counts from the cell's north-western corner.
CellLines lines_in(double centre_column, double centre_row, double radius, int per_side) {
  CellLines sums;
  const LineRange down = lines_within(centre_row, radius, per_side);
  const LineRange along = lines_within(centre_column, radius, per_side);
  const double step = 1.0 / (per_side * radius);
  const double west = (0.5 / per_side - centre_column) / radius;
  const double north = (0.5 / per_side - centre_row) / radius;
  for (int j = down.first; j <= down.last; ++j) {
    const double y = north + j * step;
    for (int i = along.first; i <= along.last; ++i) {
      const double x = west + i * step;
      const double square = std::max(0.0, 1.0 - x * x - y * y);
      const double height = std::sqrt(square);
      sums.heights += height;
      sums.cubes += height * square;
    }
  }
  return sums;
}

// What lies right of an edge, summed along each row of cells; the running sum along a row is then the part
// of each cell that the rings hold.
class Coverage {
 public:
  explicit Coverage(const CellWindow& window)
      : window_(window),
        stride_(static_cast<std::size_t>(window.columns) + 1),
        right_(stride_ * static_cast<std::size_t>(window.rows), 0.0) {}

  // In cells from the window's corner. Edges that run south have their polygon to the east.
  void add_edge(double x0, double y0, double x1, double y1) {
    if (y0 == y1) return;
    const double sign = y1 > y0 ? 1.0 : -1.0;
    if (y1 < y0) {
      std::swap(x0, x1);
      std::swap(y0, y1);
    }
    if (y1 <= 0.0 || y0 >= window_.rows) return;
    const double slope = (x1 - x0) / (y1 - y0);
    const int first = static_cast<int>(std::max(0.0, std::floor(y0)));
    for (int row = first; row < window_.rows && row < y1; ++row) {
      const double top = std::max<double>(y0, row);
      const double bottom = std::min<double>(y1, row + 1);
      if (bottom > top)
        add_piece(row, x0 + slope * (top - y0), x0 + slope * (bottom - y0), sign * (bottom - top));
    }
  }

  template <typename Use>
  void each(Use use) const {
    for (int row = 0; row < window_.rows; ++row) {
      double sum = 0.0;
      for (int column = 0; column < window_.columns; ++column) {
        sum += right_[static_cast<std::size_t>(row) * stride_ + static_cast<std::size_t>(column)];
        const double part = std::round(std::clamp(sum, 0.0, 1.0) * kCoverageSteps) / kCoverageSteps;
        if (part > 0.0) use(window_.column + column, window_.row + row, part);
      }
    }
  }

 private:
  // A piece of an edge within one row, `height` of it tall (signed).
  void add_piece(int row, double from, double to, double height) {
    double* right = &right_[static_cast<std::size_t>(row) * stride_];
    const double west = std::min(from, to);
    const double east = std::max(from, to);
    const double columns = window_.columns;
    if (west >= columns) return;
    if (east <= 0.0) {
      right[0] += height;
      return;
    }
    const double width = east - west;
    if (width <= 0.0) {
      share(right, west, west, height);
      return;
    }
    if (west < 0.0) right[0] += height * (-west / width);
    const double last = std::min(east, columns);
    for (double at = std::max(west, 0.0); at < last;) {
      const double end = std::min(std::floor(at) + 1.0, last);
      share(right, at, end, height * ((end - at) / width));
      at = end;
    }
  }

  // The part that crosses one cell, between two columns.
  void share(double* right, double from, double to, double height) {
    const int column = static_cast<int>(std::min(std::floor(from), window_.columns - 1.0));
    const double middle = (from + to) / 2.0 - column;
    right[column] += height * (1.0 - middle);
    right[column + 1] += height * middle;
  }

  CellWindow window_;
  std::size_t stride_;
  std::vector<double> right_;
};

}  // namespace

CellWindow common_cells(const CellWindow& one, const CellWindow& other) {
  const int column = std::max(one.column, other.column);
  const int row = std::max(one.row, other.row);
  const int columns = std::min(one.column + one.columns, other.column + other.columns) - column;
  const int rows = std::min(one.row + one.rows, other.row + other.rows) - row;
  return columns > 0 && rows > 0 ? CellWindow{column, row, columns, rows} : CellWindow{};
}

CellWindow cells_around(const Crown& crown, const GridFrame& frame) {
  const double radius = 0.5 * crown.width_m / frame.cell_m;
  const double column = column_of(crown.centre, frame);
  const double row = row_of(crown.centre, frame);
  return window_of(column - radius, column + radius, row - radius, row + radius, frame);
}

CellWindow cells_around(const Hedge& hedge, const GridFrame& frame) {
  double west = HUGE_VAL, east = -HUGE_VAL, north = HUGE_VAL, south = -HUGE_VAL;
  for (const std::vector<MapPoint>& ring : hedge.rings) {
    for (const MapPoint point : ring) {
      west = std::min(west, column_of(point, frame));
      east = std::max(east, column_of(point, frame));
      north = std::min(north, row_of(point, frame));
      south = std::max(south, row_of(point, frame));
    }
  }
  return window_of(west, east, north, south, frame);
}

// The ellipsoid's height over a place at the distance r from its axis is s = sqrt(1 - r²/R²) of that on the
// axis. Leaves go with s; those of a cell lie symmetric about the crown's middle with the variance
// a² Σs³ / 3 Σs, a being half the crown's height: an even layer that reaches a sqrt(Σs³ / Σs) up and down has
// the same. Lines are counted over the whole crown, also off the window, so that all of them together hold
// the volume 4/3 π a R².
void burn(const Crown& crown, const GridFrame& frame, LeafCells& cells) {
  const double radius = 0.5 * crown.width_m / frame.cell_m;
  const double column = column_of(crown.centre, frame);
  const double row = row_of(crown.centre, frame);
  const int per_side =
      static_cast<int>(std::max(kLeastLinesPerCell, std::ceil(kLeastLines / (2.0 * radius))));
  const auto west = static_cast<std::int64_t>(std::floor(column - radius));
  const auto north = static_cast<std::int64_t>(std::floor(row - radius));
  const auto columns = static_cast<std::int64_t>(std::floor(column + radius)) - west + 1;
  const auto rows = static_cast<std::int64_t>(std::floor(row + radius)) - north + 1;
  std::vector<CellLines> lines;
  lines.reserve(static_cast<std::size_t>(columns * rows));
  double all = 0.0;
  for (std::int64_t j = 0; j < rows; ++j) {
    for (std::int64_t i = 0; i < columns; ++i) {
      lines.push_back(lines_in(column - static_cast<double>(west + i), row - static_cast<double>(north + j),
                               radius, per_side));
      all += lines.back().heights;
    }
  }
  const double half_m = (crown.top_m - crown.base_m) / 2.0;
  const double middle_m = crown.base_m + half_m;
  const double radius_m = 0.5 * crown.width_m;
  const double leaf_m2 = crown.leaf_density * 4.0 / 3.0 * std::numbers::pi * half_m * radius_m * radius_m;
  const double index_per_height = leaf_m2 / all / (frame.cell_m * frame.cell_m);
  const CellWindow wanted = common_cells(cells.window(), cells_around(crown, frame));
  for (int j = wanted.row; j < wanted.row + wanted.rows; ++j) {
    for (int i = wanted.column; i < wanted.column + wanted.columns; ++i) {
      const CellLines& cell = lines[static_cast<std::size_t>((j - north) * columns + (i - west))];
      if (cell.heights <= 0.0) continue;
      const double reach_m = half_m * std::sqrt(cell.cubes / cell.heights);
      cells.add(i, j, index_per_height * cell.heights, middle_m - reach_m, middle_m + reach_m);
    }
  }
}

void burn(const Hedge& hedge, const GridFrame& frame, LeafCells& cells) {
  const CellWindow window = common_cells(cells.window(), cells_around(hedge, frame));
  if (window.columns == 0) return;
  Coverage coverage(window);
  for (const std::vector<MapPoint>& ring : hedge.rings) {
    for (std::size_t i = 0; i < ring.size(); ++i) {
      const MapPoint from = ring[i];
      const MapPoint to = ring[(i + 1) % ring.size()];
      coverage.add_edge(column_of(from, frame) - window.column, row_of(from, frame) - window.row,
                        column_of(to, frame) - window.column, row_of(to, frame) - window.row);
    }
  }
  const double index = hedge.leaf_density * (hedge.top_m - hedge.base_m);
  coverage.each([&](int column, int row, double part) {
    cells.add(column, row, part * index, hedge.base_m, hedge.top_m);
  });
}

}  // namespace sunfall

// Which cells belong to a plot: by their centres, or for a plot too small to hold one, by touch.

#include <algorithm>
#include <cmath>

#include "geo/plots.h"

namespace sunfall {
namespace {

// A point in cell units: column to the east and row to the south of the frame's north-west corner.
struct CellPoint {
  double column = 0.0;
  double row = 0.0;
};

struct Edge {
  CellPoint from;
  CellPoint to;
};

std::vector<Edge> edges_of(const Plot& plot, const GridFrame& frame) {
  std::vector<Edge> edges;
  const auto cell_point = [&](MapPoint point) {
    return CellPoint{(point.east - frame.west) / frame.cell_m, (frame.north - point.north) / frame.cell_m};
  };
  for (const std::vector<MapPoint>& ring : plot.rings) {
    for (std::size_t i = 0; i < ring.size(); ++i) {
      edges.push_back({cell_point(ring[i]), cell_point(ring[(i + 1) % ring.size()])});
    }
  }
  return edges;
}

double column_at(const Edge& edge, double row) {
  const double part = (row - edge.from.row) / (edge.to.row - edge.from.row);
  return edge.from.column + part * (edge.to.column - edge.from.column);
}

struct RowRange {
  int first = 0;
  int last = -1;
};

RowRange rows_of(const std::vector<Edge>& edges, const GridFrame& frame) {
  double least = HUGE_VAL;
  double most = -HUGE_VAL;
  for (const Edge& edge : edges) {
    least = std::min(least, edge.from.row);
    most = std::max(most, edge.from.row);
  }
  if (!(least <= most)) return {};
  const auto row = [&](double value) {
    return static_cast<int>(std::clamp(std::floor(value), 0.0, frame.rows - 1.0));
  };
  return {row(least), row(most)};
}

// Even-odd rule along each row of centres. Intervals are closed in the west and open in the east,
// edges closed at one end, so that neighbouring plots share no cell and leave none out.
std::vector<CellIndex> cells_with_centre_in(const std::vector<Edge>& edges, const GridFrame& frame) {
  std::vector<CellIndex> cells;
  std::vector<double> crossings;
  const RowRange rows = rows_of(edges, frame);
  for (int row = rows.first; row <= rows.last; ++row) {
    const double centre = row + 0.5;
    crossings.clear();
    for (const Edge& edge : edges) {
      if ((edge.from.row <= centre) != (edge.to.row <= centre)) crossings.push_back(column_at(edge, centre));
    }
    std::sort(crossings.begin(), crossings.end());
    for (std::size_t i = 0; i + 1 < crossings.size(); i += 2) {
      const double first = std::max(0.0, std::ceil(crossings[i] - 0.5));
      const double end = std::min<double>(frame.columns, std::ceil(crossings[i + 1] - 0.5));
      for (double column = first; column < end; ++column) cells.push_back({static_cast<int>(column), row});
    }
  }
  return cells;
}

// The cells that the edges run through. With no centre inside, no cell lies wholly inside either,
// so these are all that the plot touches.
std::vector<CellIndex> cells_touched_by(const std::vector<Edge>& edges, const GridFrame& frame) {
  std::vector<CellIndex> cells;
  const RowRange rows = rows_of(edges, frame);
  for (int row = rows.first; row <= rows.last; ++row) {
    for (const Edge& edge : edges) {
      const double top = std::max<double>(row, std::min(edge.from.row, edge.to.row));
      const double bottom = std::min<double>(row + 1, std::max(edge.from.row, edge.to.row));
      if (top > bottom) continue;
      const bool level = edge.from.row == edge.to.row;
      const double one = level ? edge.from.column : column_at(edge, top);
      const double other = level ? edge.to.column : column_at(edge, bottom);
      const int first =
          static_cast<int>(std::clamp(std::floor(std::min(one, other)), 0.0, frame.columns - 1.0));
      const int last =
          static_cast<int>(std::clamp(std::floor(std::max(one, other)), 0.0, frame.columns - 1.0));
      for (int column = first; column <= last; ++column) cells.push_back({column, row});
    }
  }
  const auto before = [](CellIndex a, CellIndex b) {
    return a.row != b.row ? a.row < b.row : a.column < b.column;
  };
  std::sort(cells.begin(), cells.end(), before);
  cells.erase(std::unique(cells.begin(), cells.end()), cells.end());
  return cells;
}

}  // namespace

std::vector<std::vector<CellIndex>> cells_of_plots(const std::vector<Plot>& plots, const GridFrame& frame) {
  std::vector<std::vector<CellIndex>> result;
  result.reserve(plots.size());
  for (const Plot& plot : plots) {
    const std::vector<Edge> edges = edges_of(plot, frame);
    std::vector<CellIndex> cells = cells_with_centre_in(edges, frame);
    if (cells.empty()) cells = cells_touched_by(edges, frame);
    result.push_back(std::move(cells));
  }
  return result;
}

}  // namespace sunfall

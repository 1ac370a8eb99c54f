// Cells of plots against GEOS as an oracle, and the borders between neighbours.

#include <gtest/gtest.h>
#include <ogr_geometry.h>

#include <cmath>
#include <random>
#include <set>

#include "geo/geo_support.h"
#include "geo/plots.h"

namespace sunfall::test {
namespace {

using Ring = std::vector<MapPoint>;
using Cells = std::vector<CellIndex>;

Plot plot_of(std::vector<Ring> rings) {
  Plot plot;
  plot.id = "A";
  plot.rings = std::move(rings);
  return plot;
}

Cells cells_of(const Plot& plot, const GridFrame& frame) { return cells_of_plots({plot}, frame).at(0); }

// A star-shaped polygon with corners at random distances, so that it is valid and rarely convex.
Ring star(std::mt19937& random, MapPoint centre, double reach_m, bool clockwise) {
  std::uniform_real_distribution<double> part(0.3, 1.0);
  Ring ring;
  for (int i = 0; i < 17; ++i) {
    const double angle = (clockwise ? -1 : 1) * 2.0 * std::numbers::pi * i / 17.0;
    const double radius = reach_m * part(random);
    ring.push_back({centre.east + radius * std::cos(angle), centre.north + radius * std::sin(angle)});
  }
  return ring;
}

OGRPolygon polygon_of(const Plot& plot) {
  OGRPolygon polygon;
  for (const Ring& points : plot.rings) {
    OGRLinearRing ring;
    for (const MapPoint& point : points) ring.addPoint(point.east, point.north);
    ring.closeRings();
    polygon.addRing(&ring);
  }
  return polygon;
}

TEST(PlotCells, AgreeWithGeosForRandomPlotsWithHoles) {
  const GridFrame frame = utm_frame(60, 50, 2.0);
  std::mt19937 random(7);
  for (int round = 0; round < 20; ++round) {
    const MapPoint centre{frame.west + 60.0 + round * 0.37, frame.north - 50.0 - round * 0.23};
    const Plot plot = plot_of({star(random, centre, 48.0, false), star(random, centre, 14.0, true)});
    const OGRPolygon polygon = polygon_of(plot);
    Cells expected;
    for (int row = 0; row < frame.rows; ++row) {
      for (int column = 0; column < frame.columns; ++column) {
        const MapPoint middle = frame.centre({column, row});
        const OGRPoint point(middle.east, middle.north);
        if (polygon.Contains(&point)) expected.push_back({column, row});
      }
    }
    ASSERT_GT(expected.size(), 100U);
    EXPECT_EQ(cells_of(plot, frame), expected) << round;
  }
}

// Plots whose borders run exactly through cell centres: each cell goes to exactly one of them.
TEST(PlotCells, NeighboursShareNoCellAndLoseNone) {
  const GridFrame frame = utm_frame(20, 20, 1.0);
  std::vector<Plot> plots;
  for (int block = 0; block < 4; ++block) {
    const double west = frame.west + (block % 2 == 0 ? 0.0 : 10.5);
    const double east = frame.west + (block % 2 == 0 ? 10.5 : 20.0);
    const double north = frame.north - (block / 2 == 0 ? 0.0 : 7.5);
    const double south = frame.north - (block / 2 == 0 ? 7.5 : 20.0);
    plots.push_back(plot_of({{{west, south}, {east, south}, {east, north}, {west, north}}}));
  }
  std::set<std::pair<int, int>> seen;
  std::size_t total = 0;
  for (const Cells& cells : cells_of_plots(plots, frame)) {
    total += cells.size();
    for (const CellIndex& cell : cells) seen.insert({cell.row, cell.column});
  }
  EXPECT_EQ(total, 400U);
  EXPECT_EQ(seen.size(), 400U);
}

TEST(PlotCells, TwoPartsAndClosedRings) {
  const GridFrame frame = utm_frame(10, 10, 1.0);
  const auto square = [&](double column, double row) {
    const double west = frame.west + column;
    const double north = frame.north - row;
    return Ring{
        {west, north - 2}, {west + 2, north - 2}, {west + 2, north}, {west, north}, {west, north - 2}};
  };
  const Cells expected{{1, 1}, {2, 1}, {1, 2}, {2, 2}, {6, 5}, {7, 5}, {6, 6}, {7, 6}};
  EXPECT_EQ(cells_of(plot_of({square(1, 1), square(6, 5)}), frame), expected);
}

// A bed narrower than a cell, at a slant, holds no centre: it gets what it touches.
TEST(PlotCells, ASliverGetsTheCellsThatItTouches) {
  const GridFrame frame = utm_frame(12, 12, 10.0);
  const auto at = [&](double x, double y) { return MapPoint{frame.west + x, frame.north - y}; };
  const Plot plot = plot_of({{at(21.0, 33.3), at(68.2, 42.1), at(68.2, 42.6), at(21.0, 33.8)}});
  const OGRPolygon polygon = polygon_of(plot);
  Cells expected;
  for (int row = 0; row < 12; ++row) {
    for (int column = 0; column < 12; ++column) {
      const MapPoint a = at(10.0 * column, 10.0 * row);
      const OGRPolygon cell = polygon_of(plot_of(
          {{a, {a.east + 10.0, a.north}, {a.east + 10.0, a.north - 10.0}, {a.east, a.north - 10.0}}}));
      if (polygon.Intersects(&cell)) expected.push_back({column, row});
    }
  }
  ASSERT_GT(expected.size(), 4U);
  EXPECT_EQ(cells_of(plot, frame), expected);
}

TEST(PlotCells, ASpeckGetsItsCell) {
  const GridFrame frame = utm_frame(5, 5, 10.0);
  const double east = frame.west + 32.0;
  const double north = frame.north - 12.0;
  const Plot plot = plot_of({{{east, north}, {east + 0.5, north}, {east + 0.5, north + 0.5}}});
  EXPECT_EQ(cells_of(plot, frame), (Cells{{3, 1}}));
}

TEST(PlotCells, TheWholeMap) {
  const GridFrame frame = utm_frame(7, 5, 3.0);
  const Plot plot = plot_of({{{frame.west, frame.north - 15.0},
                              {frame.west + 21.0, frame.north - 15.0},
                              {frame.west + 21.0, frame.north},
                              {frame.west, frame.north}}});
  EXPECT_EQ(cells_of(plot, frame).size(), 35U);
  EXPECT_TRUE(cells_of_plots({}, frame).empty());
}

}  // namespace
}  // namespace sunfall::test

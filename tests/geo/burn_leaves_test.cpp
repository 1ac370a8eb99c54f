// Crowns and hedges on cells: leaf area, height and spread against the shapes' own closed forms, coverage
// against the geometry library.

#include "geo/burn_leaves.h"

#include <gtest/gtest.h>
#include <ogr_geometry.h>

#include <cmath>
#include <numbers>
#include <random>

#include "geo/geo_support.h"

namespace sunfall::test {
namespace {

GridFrame frame_of(double cell_m, double side_m = 120.0) {
  const int cells = static_cast<int>(std::lround(side_m / cell_m));
  return {cells, cells, 600000.0, 5800000.0, cell_m, ""};
}

MapPoint at(double east, double south) { return {600000.0 + east, 5800000.0 - south}; }

CellWindow whole(const GridFrame& frame) { return {0, 0, frame.columns, frame.rows}; }

// Over all cells: leaf area, mean height of leaf and its variance, as a caster meets them.
struct Sums {
  double leaf_m2 = 0.0;
  double mean_m = 0.0;
  double variance_m2 = 0.0;
  int cells = 0;
};

Sums sums_of(const CanopyCells& cells, double cell_m) {
  Sums sums;
  double first = 0.0, second = 0.0;
  for (std::size_t i = 0; i < cells.top_m.size(); ++i) {
    const double base = cells.base_m[i], top = cells.top_m[i];
    const double leaf = cells.leaf_density[i] * (top - base) * cell_m * cell_m;
    if (leaf <= 0.0) continue;
    ++sums.cells;
    sums.leaf_m2 += leaf;
    first += leaf * (base + top) / 2.0;
    second += leaf * (base * base + base * top + top * top) / 3.0;
  }
  sums.mean_m = first / sums.leaf_m2;
  sums.variance_m2 = second / sums.leaf_m2 - sums.mean_m * sums.mean_m;
  return sums;
}

template <typename Shape>
CanopyCells burned(const Shape& shape, const GridFrame& frame) {
  LeafCells cells(whole(frame));
  burn(shape, frame, cells);
  return cells.cells();
}

// The ellipsoid's volume, 4/3 π a R², at every cell size, from 24 cells across to a sixtieth of a cell. What
// is kept is kept in floats, good to 1e-7 each; layers 1 cm thick, of 4-digit heights, to 1e-4 of their small
// part.
TEST(BurnLeaves, ACrownKeepsItsLeafAreaAtEveryCellSize) {
  for (const double width : {0.5, 6.0, 12.0}) {
    for (const double cell : {0.5, 1.0, 2.0, 5.0, 30.0}) {
      SCOPED_TRACE(testing::Message() << "width " << width << " cell " << cell);
      const Crown crown{at(61.37, 58.91), width, 2.0, 9.0, 0.8};
      const Sums sums = sums_of(burned(crown, frame_of(cell)), cell);
      const double exact = 0.8 * 4.0 / 3.0 * std::numbers::pi * 3.5 * width * width / 4.0;
      EXPECT_NEAR(sums.leaf_m2, exact, 1e-5 * exact);
      EXPECT_NEAR(sums.mean_m, 5.5, 1e-4);
      // An ellipsoid's heights vary by a²/5 about its middle, exactly so on lines without end; 32 of them
      // across a disc, with s = sqrt(1 - r²) and thus an edge where it ends steeply, leave some 1/32^1.5 of
      // that.
      EXPECT_NEAR(sums.variance_m2, 3.5 * 3.5 / 5.0, 3.5 * 3.5 / 5.0 * 0.006);
    }
  }
}

TEST(BurnLeaves, FineCellsFollowTheEllipsoid) {
  const double cell = 0.25;
  const GridFrame frame = frame_of(cell, 20.0);
  const Crown crown{at(10.0, 10.0), 8.0, 2.0, 8.0, 1.3};
  const CanopyCells cells = burned(crown, frame);
  for (int i = 0; i < frame.columns; ++i) {
    const std::size_t k = 40U * 80U + static_cast<std::size_t>(i);
    const double x = (i + 0.5) * cell - 10.0, y = 0.5 * cell;
    const double square = 1.0 - (x * x + y * y) / 16.0;
    if (square < 0.3) continue;  // the steep edge
    const double half = 3.0 * std::sqrt(square);
    // Within a cell the height bends by (cell/2)² / (2 R²) · a / s³, under 0.01 m here.
    EXPECT_NEAR(cells.top_m[k], 5.0 + half, 0.05) << i;
    EXPECT_NEAR(cells.base_m[k], 5.0 - half, 0.05) << i;
    // Of a layer as spread as the cell's lines, less than theirs by the variance of s over the cell: s
    // changes by x dx / (R² s) = 9 % to either side at s² = 0.3, 0.09² / 3 = 0.25 %; 32 lines across find the
    // volume to 1/32^1.5 = 0.55 %.
    EXPECT_NEAR(cells.leaf_density[k], 1.3, 1.3 * 0.008) << i;
  }
}

TEST(BurnLeaves, AHedgeKeepsItsLeafAreaAtEveryCellSize) {
  // 60 m long, 0.8 m wide, turned by 20 degrees.
  const double turn = 20.0 * std::numbers::pi / 180.0;
  Hedge hedge{{{}}, 0.5, 3.0, 2.0};
  for (const auto& [along, across] :
       {std::pair(0.0, 0.0), std::pair(60.0, 0.0), std::pair(60.0, 0.8), std::pair(0.0, 0.8)}) {
    hedge.rings[0].push_back(at(20.0 + along * std::cos(turn) - across * std::sin(turn),
                                70.0 - along * std::sin(turn) - across * std::cos(turn)));
  }
  for (const double cell : {0.25, 1.0, 3.0, 10.0, 60.0}) {
    SCOPED_TRACE(cell);
    const CanopyCells cells = burned(hedge, frame_of(cell));
    const Sums sums = sums_of(cells, cell);
    // Coverage is rounded to 2^-20 of a cell, either way.
    EXPECT_NEAR(sums.leaf_m2, 60.0 * 0.8 * 2.5 * 2.0, sums.cells * cell * cell * 5.0 / 1048576.0 + 1e-4);
    EXPECT_NEAR(sums.mean_m, 1.75, 1e-5);
    for (std::size_t i = 0; i < cells.top_m.size(); ++i) {
      if (cells.leaf_density[i] <= 0.0F) continue;
      EXPECT_NEAR(cells.top_m[i], 3.0, 1e-5);
      EXPECT_NEAR(cells.base_m[i], 0.5, 1e-5);
      EXPECT_LE(cells.leaf_density[i], 2.0 * (1 + 1e-5));
    }
  }
}

// Every cell's part against the geometry library's intersection, for a polygon with a hole and a second part.
TEST(BurnLeaves, CoverageIsThatOfTheGeometryLibrary) {
  const GridFrame frame = frame_of(2.0, 24.0);
  std::mt19937 dice(20260401);
  std::uniform_real_distribution<double> wobble(-0.9, 0.9);
  const auto star = [&](double east, double south, double radius, int corners, bool outer) {
    std::vector<MapPoint> ring;
    for (int i = 0; i < corners; ++i) {
      const double angle = (outer ? 1.0 : -1.0) * 2.0 * std::numbers::pi * i / corners;
      const double r = radius + wobble(dice);
      ring.push_back({600000.0 + east + r * std::cos(angle), 5800000.0 - south + r * std::sin(angle)});
    }
    return ring;
  };
  // The first part reaches over the map's western edge.
  const Hedge hedge{
      {star(6.0, 9.0, 8.0, 17, true), star(6.0, 9.0, 3.0, 7, false), star(18.5, 18.5, 3.0, 9, true)},
      0.0,
      1.0,
      1.0};
  OGRMultiPolygon drawn;
  const auto ring_of = [](const std::vector<MapPoint>& points) {
    OGRLinearRing ring;
    for (const MapPoint p : points) ring.addPoint(p.east, p.north);
    ring.closeRings();
    return ring;
  };
  OGRPolygon first, second;
  for (const std::size_t i : {0U, 1U}) {
    OGRLinearRing ring = ring_of(hedge.rings[i]);
    first.addRing(&ring);
  }
  OGRLinearRing ring = ring_of(hedge.rings[2]);
  second.addRing(&ring);
  drawn.addGeometry(&first);
  drawn.addGeometry(&second);
  ASSERT_TRUE(drawn.IsValid());

  // Whole, and by a window whose western and southern edges cut the shape.
  for (const CellWindow& window : {whole(frame), CellWindow{3, 2, 7, 6}}) {
    LeafCells cells(window);
    burn(hedge, frame, cells);
    const CanopyCells got = cells.cells();
    for (int row = 0; row < window.rows; ++row) {
      for (int column = 0; column < window.columns; ++column) {
        const double west = frame.west + (window.column + column) * 2.0,
                     north = frame.north - (window.row + row) * 2.0;
        OGRLinearRing square;
        square.addPoint(west, north);
        square.addPoint(west, north - 2.0);
        square.addPoint(west + 2.0, north - 2.0);
        square.addPoint(west + 2.0, north);
        square.closeRings();
        OGRPolygon cell;
        cell.addRing(&square);
        const std::unique_ptr<OGRGeometry> common(drawn.Intersection(&cell));
        const double part = OGR_G_Area(OGRGeometry::ToHandle(common.get())) / 4.0;
        const auto i = static_cast<std::size_t>(row * window.columns + column);
        // Rounding to 2^-20, and map coordinates of seven digits before the point.
        EXPECT_NEAR(got.leaf_density[i] * (got.top_m[i] - got.base_m[i]), part, 1e-6) << row << " " << column;
      }
    }
  }
}

TEST(BurnLeaves, CrownsThatShareACellAddUp) {
  const GridFrame frame = frame_of(10.0, 20.0);
  LeafCells cells(whole(frame));
  const Crown low{at(3.0, 3.0), 2.0, 1.0, 3.0, 1.0};
  const Crown high{at(7.0, 7.0), 4.0, 6.0, 12.0, 0.5};
  burn(low, frame, cells);
  burn(high, frame, cells);
  const Sums both = sums_of(cells.cells(), 10.0);
  const double low_m2 = 4.0 / 3.0 * std::numbers::pi * 1.0 * 1.0 * 1.0;
  const double high_m2 = 0.5 * 4.0 / 3.0 * std::numbers::pi * 3.0 * 4.0;
  EXPECT_EQ(both.cells, 1);
  EXPECT_NEAR(both.leaf_m2, low_m2 + high_m2, 1e-5 * high_m2);
  EXPECT_NEAR(both.mean_m, (low_m2 * 2.0 + high_m2 * 9.0) / (low_m2 + high_m2), 1e-4);

  LeafCells other_way(whole(frame));
  burn(high, frame, other_way);
  burn(low, frame, other_way);
  const Sums swapped = sums_of(other_way.cells(), 10.0);
  EXPECT_NEAR(swapped.leaf_m2, both.leaf_m2, 1e-6);
  EXPECT_NEAR(swapped.mean_m, both.mean_m, 1e-6);
}

TEST(BurnLeaves, LeavesReachNoHigherThanTheHighest) {
  LeafCells cells({0, 0, 1, 1});
  cells.add(0, 0, 1.0, 0.0, 0.5);
  cells.add(0, 0, 1.0, 9.5, 10.0);  // an even layer of this spread would end above 10 and below 0
  const CanopyCells got = cells.cells();
  EXPECT_EQ(got.top_m[0], 10.0F);
  EXPECT_EQ(got.base_m[0], 0.0F);
  EXPECT_FLOAT_EQ(got.leaf_density[0] * 10.0F, 2.0F);
}

TEST(BurnLeaves, ShapesOffTheMapTouchNoCell) {
  const GridFrame frame = frame_of(1.0, 10.0);
  EXPECT_EQ(cells_around(Crown{at(-3.0, 5.0), 4.0, 0.0, 5.0, 1.0}, frame).columns, 0);
  EXPECT_EQ(cells_around(Crown{at(-1.5, 5.0), 4.0, 0.0, 5.0, 1.0}, frame), (CellWindow{0, 3, 1, 5}));
  EXPECT_EQ(cells_around(Hedge{{{at(1, 11), at(2, 11), at(2, 12)}}, 0.0, 1.0, 1.0}, frame).columns, 0);
  LeafCells cells(whole(frame));
  burn(Crown{at(-3.0, 5.0), 4.0, 0.0, 5.0, 1.0}, frame, cells);
  EXPECT_EQ(sums_of(cells.cells(), 1.0).cells, 0);
}

}  // namespace
}  // namespace sunfall::test

// Where rows stand in a plot, and which stretches of a ray lie in it.

#include "shade/row_plot.h"

#include <gtest/gtest.h>

#include <cmath>

#include "shade/some_rows.h"

namespace sunfall {
namespace {

using testing::grid;

// 20 m east to west, 30 m north to south, at coordinates as maps have them.
const std::vector<MapPoint> kField = {
    {691000, 5759000}, {691020, 5759000}, {691020, 5759030}, {691000, 5759030}};

TEST(RowPlot, RowsStandInTheMiddle) {
  const RowPlot plot({kField}, grid(0), 3.0);  // six rows take 18 m; 1 m is left at either side
  EXPECT_EQ(plot.rows(), 6);
  EXPECT_NEAR(plot.across_m({691002.5, 5759010}), 0.0, 1e-6);
  EXPECT_NEAR(plot.across_m({691003.0, 5759025}), 0.5, 1e-6);
  EXPECT_NEAR(plot.across_m({691017.0, 5759001}), -0.5, 1e-6);
  EXPECT_NEAR(plot.across_m({691010.0, 5759001}), -1.5, 1e-6);  // between rows 3 and 4
  EXPECT_EQ(RowPlot({kField}, grid(90), 3.0).rows(), 10);
  EXPECT_EQ(RowPlot({kField}, grid(0), 50.0).rows(), 1);
  // Rows to the east: right is south.
  EXPECT_NEAR(RowPlot({kField}, grid(90), 3.0).across_m({691001, 5759028}), 0.5, 1e-6);
}

TEST(RowPlot, StretchesOfARay) {
  const RowPlot plot({kField}, grid(0), 3.0);
  RowStretches found;
  plot.stretches({691005, 5759010}, grid(90), 1000.0, found);  // from inside
  ASSERT_EQ(found.size(), 1u);
  EXPECT_EQ(found[0].from_m, 0.0);
  EXPECT_NEAR(found[0].to_m, 15.0, 1e-6);
  plot.stretches({690990, 5759010}, grid(90), 1000.0, found);  // from the west
  ASSERT_EQ(found.size(), 1u);
  EXPECT_NEAR(found[0].from_m, 10.0, 1e-6);
  EXPECT_NEAR(found[0].to_m, 30.0, 1e-6);
  plot.stretches({690990, 5759010}, grid(90), 12.0, found);  // leaves end at 12 m
  EXPECT_NEAR(found[0].to_m, 12.0, 1e-6);
  plot.stretches({690990, 5759010}, grid(90), 9.0, found);
  EXPECT_TRUE(found.empty());
  plot.stretches({690990, 5759010}, grid(270), 1000.0, found);  // away
  EXPECT_TRUE(found.empty());
  plot.stretches({691005, 5759010}, grid(45), 1000.0, found);
  EXPECT_NEAR(found[0].to_m, 15.0 * std::sqrt(2.0), 1e-6);
}

// A hole, a bay, and two polygons: in order, out between.
TEST(RowPlot, HolesBaysAndParts) {
  const std::vector<MapPoint> hole = {
      {691008, 5759005}, {691008, 5759015}, {691012, 5759015}, {691012, 5759005}, {691008, 5759005}};
  const std::vector<MapPoint> part = {{691040, 5759000}, {691050, 5759000}, {691050, 5759030}};
  const RowPlot plot({kField, hole, part}, grid(0), 3.0);
  RowStretches found;
  plot.stretches({690990, 5759010}, grid(90), 1000.0, found);
  ASSERT_EQ(found.size(), 3u);
  EXPECT_NEAR(found[0].from_m, 10.0, 1e-6);
  EXPECT_NEAR(found[0].to_m, 18.0, 1e-6);
  EXPECT_NEAR(found[1].from_m, 22.0, 1e-6);
  EXPECT_NEAR(found[1].to_m, 30.0, 1e-6);
  EXPECT_NEAR(found[2].from_m, 50.0 + 10.0 / 3.0, 1e-6);
  EXPECT_NEAR(found[2].to_m, 60.0, 1e-6);
  EXPECT_TRUE(plot.contains({691005, 5759010}));
  EXPECT_FALSE(plot.contains({691010, 5759010}));  // in the hole
  EXPECT_FALSE(plot.contains({691030, 5759010}));
  EXPECT_TRUE(plot.contains({691049, 5759010}));
}

// A ray through a corner enters once.
TEST(RowPlot, Corners) {
  const RowPlot plot({kField}, grid(0), 3.0);
  RowStretches found;
  plot.stretches({690990, 5758990}, grid(45), 1000.0, found);
  ASSERT_EQ(found.size(), 1u);
  EXPECT_NEAR(found[0].from_m, 10.0 * std::sqrt(2.0), 1e-6);
  EXPECT_NEAR(found[0].to_m, 30.0 * std::sqrt(2.0), 1e-6);
  // Touching a corner from outside: nothing, or a stretch of no length.
  plot.stretches({690990, 5759010}, grid(135), 1000.0, found);
  double inside = 0.0;
  for (const RowReach& reach : found) inside += reach.to_m - reach.from_m;
  EXPECT_NEAR(inside, 0.0, 1e-6);
}

}  // namespace
}  // namespace sunfall

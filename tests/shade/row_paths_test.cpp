// Paths through rows: closed forms against hand values and against rays walked through explicit rows.

#include "shade/row_paths.h"

#include <gtest/gtest.h>

#include <cmath>
#include <random>

#include "shade/marched_rows.h"
#include "shade/row_plot.h"
#include "shade/some_rows.h"

namespace sunfall {
namespace {

using testing::ExplicitRows;
using testing::grid;
using testing::kDegree;
using testing::kSections;
using testing::rows_of;

// Chords of an ellipsoid with axes 1, 1, 2 (the formula is Norman and Welles's, 1983): plumb through the
// middle 4, at 45° 2.52982, plumb half a metre aside 3.46410; and almost level through the middle 2.
TEST(RowPaths, ChordsOfAnEllipse) {
  const CropRows rows = rows_of(RowSection::ellipse, 100.0, 5.0, 2.0, 1.0);  // middle 3 m above the ground
  const auto through = [&](double tangent, double aside) {
    const RowRay ray = row_ray(grid(0), grid(90), tangent);
    return row_path(rows, ray, aside - 3.0 / tangent, 0.0);
  };
  EXPECT_NEAR(through(1e9, 0.0), 4.0, 1e-6);
  EXPECT_NEAR(through(1.0, 0.0), 2.52982, 0.6e-5);
  EXPECT_NEAR(through(1e9, 0.5), 3.46410, 0.6e-5);
  // From beside the row, at its own middle height, no farther than 4 m.
  EXPECT_NEAR(row_path(rows, row_ray(grid(0), grid(90), 1e-6), -1.5, 3.0, {0.0, 4.0}), 2.0, 1e-5);
}

TEST(RowPaths, BoxesAndWedgesByHand) {
  const CropRows box = rows_of(RowSection::box, 4.0, 3.0, 1.0, 1.0);
  const RowRay across = row_ray(grid(0), grid(90), 1.0), plumb = row_ray(grid(0), grid(90), 1e9);
  const double root2 = std::sqrt(2.0);
  EXPECT_NEAR(row_path(box, plumb, 0.3, 0.0), 2.0, 1e-6);
  EXPECT_EQ(row_path(box, plumb, 2.0, 0.0), 0.0);
  // At 45 degrees the ray is 1 to 3 m aside of its foot while it is 1 to 3 m up.
  EXPECT_NEAR(row_path(box, across, -2.0, 0.0), root2, 1e-12);       // all through the next row
  EXPECT_NEAR(row_path(box, across, 0.0, 0.0), 0.0, 1e-12);          // out under this row's edge
  EXPECT_NEAR(row_path(box, across, 0.0, 2.0), 0.5 * root2, 1e-12);  // from inside to its side
  EXPECT_NEAR(row_path(box, across, 0.0, 2.8), 0.2 * root2, 1e-12);  // from inside to its top
  EXPECT_EQ(row_path(box, across, 0.0, 3.0), 0.0);                   // on top
  // Along the rows: all the way within, or nothing.
  const RowRay along = row_ray(grid(30), grid(210), 0.5);
  EXPECT_NEAR(row_path(box, along, 0.1, 0.0), 2.0 * std::sqrt(5.0), 1e-6);
  EXPECT_EQ(row_path(box, along, 0.6, 0.0), 0.0);
  // A wedge 2 m wide and 2 m tall: from the middle of its base plumb 2 m; at 45° it leaves where the ray
  // meets the side, aside = 1 − up/2, up = 2/3.
  const CropRows wedge = rows_of(RowSection::wedge, 100.0, 2.0, 2.0, 0.0);
  EXPECT_NEAR(row_path(wedge, plumb, 0.0, 0.0), 2.0, 1e-6);
  EXPECT_NEAR(row_path(wedge, plumb, 0.5, 0.0), 1.0, 1e-6);
  EXPECT_NEAR(row_path(wedge, across, 0.0, 0.0), 2.0 / 3.0 * root2, 1e-9);
}

// Random rows, places (in the alley, under, in and beside rows, above them) and directions, on level and
// sloping ground, within a plot's bounds: each ray against the same ray walked in steps of 1 mm. A walk
// errs by at most a step at each row crossed.
TEST(RowPaths, AgreeWithRaysWalkedThroughExplicitRows) {
  std::mt19937 random(20260301);
  const auto between = [&](double low, double high) {
    return std::uniform_real_distribution<double>(low, high)(random);
  };
  constexpr double kStep = 1e-3;
  double sum = 0.0, walked_sum = 0.0;
  int hits = 0;
  for (int trial = 0; trial < 1500; ++trial) {
    const RowSection section = kSections[trial % 3];
    const double spacing = between(1.5, 5.0), base = between(0.0, 1.0);
    ExplicitRows rows{rows_of(section, spacing, base + between(0.5, 3.0), spacing * between(0.2, 1.0), base)};
    const double azimuth_deg = between(0.0, 360.0);
    rows.azimuth = azimuth_deg * kDegree;
    const int count = 9;
    const double length = between(5.0, 40.0), half = 0.5 * count * spacing;
    for (int k = 0; k < count; ++k) rows.middles.push_back((k - 4) * spacing);
    rows.left = -half;
    rows.right = half;
    rows.back = -0.5 * length;
    rows.front = 0.5 * length;
    GroundPlane ground;
    if (trial % 2) ground = {between(-0.15, 0.15), between(-0.15, 0.15)};
    rows.rise_east = ground.rise_east;
    rows.rise_north = ground.rise_north;

    const auto corner = [&](double right, double front) {
      return MapPoint{right * std::cos(rows.azimuth) + front * std::sin(rows.azimuth),
                      -right * std::sin(rows.azimuth) + front * std::cos(rows.azimuth)};
    };
    const RowPlot plot({{corner(-half, rows.back), corner(half, rows.back), corner(half, rows.front),
                         corner(-half, rows.front)}},
                       grid(azimuth_deg), spacing);
    ASSERT_EQ(plot.rows(), count);
    // Also from outside the plot.
    const MapPoint place = corner(between(-1.3, 1.3) * half, between(-0.8, 0.8) * length);
    const double height = between(0.0, 1.1) * rows.rows.height_m;
    const double light_deg = between(0.0, 360.0), tangent = std::tan(between(15.0, 89.0) * kDegree);
    const RowRay ray = row_ray(grid(azimuth_deg), grid(light_deg), tangent, ground);
    RowStretches stretches;
    plot.stretches(place, grid(light_deg), farthest_leaf_m(rows.rows, ray, height), stretches);
    double path = 0.0;
    for (const RowReach& reach : stretches) {
      path += row_path(rows.rows, ray, plot.across_m(place), height, reach);
    }
    const double walked = rows.walk(place.east, place.north, height, light_deg * kDegree, tangent, kStep);
    EXPECT_NEAR(path, walked, (count + 1) * kStep) << trial;
    sum += path;
    walked_sum += walked;
    if (walked > 0.0) ++hits;
  }
  EXPECT_GT(hits, 300);  // rays that met leaves at all
  EXPECT_NEAR(sum / walked_sum, 1.0, 1e-3);
}

TEST(RowPaths, MirroredAndReversed) {
  for (const RowSection section : kSections) {
    const CropRows rows = rows_of(section, 3.0, 2.5, 1.2, 0.4);
    for (double light = 3.0; light < 360.0; light += 37.0) {
      for (const double tangent : {0.05, 0.7, 3.0}) {
        for (const double across : {-1.4, -0.5, 0.0, 0.3, 1.1}) {
          for (const double height : {0.0, 1.0}) {
            const double path = row_path(rows, row_ray(grid(20), grid(light), tangent), across, height);
            // Rows turned end to end: right becomes left.
            EXPECT_NEAR(path, row_path(rows, row_ray(grid(200), grid(light), tangent), -across, height),
                        1e-9);
            // The mirror image, in the vertical plane along the rows.
            EXPECT_NEAR(path, row_path(rows, row_ray(grid(20), grid(40 - light), tangent), -across, height),
                        1e-9);
            // A cycle farther, and 1000 cycles.
            EXPECT_NEAR(path, row_path(rows, row_ray(grid(20), grid(light), tangent), across + 3.0, height),
                        1e-9);
            EXPECT_NEAR(
                path, row_path(rows, row_ray(grid(20), grid(light), tangent), across - 3000.0, height), 1e-9);
          }
        }
      }
    }
  }
}

// Level ground is a slope of zero; ground that rises along a level ray hides it.
TEST(RowPaths, SlopesBeginAtZero) {
  const CropRows rows = rows_of(RowSection::wedge, 3.0, 2.5, 1.2, 0.4);
  const RowRay level = row_ray(grid(20), grid(75), 0.4), flat = row_ray(grid(20), grid(75), 0.4, {0.0, 0.0});
  EXPECT_EQ(row_path(rows, level, 0.7, 0.0), row_path(rows, flat, 0.7, 0.0));
  const RowRay uphill = row_ray(grid(20), grid(90), 0.1, {0.2, 0.0});
  EXPECT_TRUE(uphill.meets_ground());
  EXPECT_TRUE(std::isinf(row_path(rows, uphill, 0.7, 0.0)));
}

// Beyond 256 rows they count as evenly spread. Elevation 0.03°, rows 0.5 m apart: some 7600 rows are crossed;
// summed here in stretches of 200 rows each, which are followed row by row.
TEST(RowPaths, ManyRowsCountAsEvenlySpread) {
  for (const RowSection section : kSections) {
    const CropRows rows = rows_of(section, 0.5, 2.5, 0.3, 0.5);
    const RowRay ray = row_ray(grid(0), grid(90), std::tan(0.03 * kDegree));
    for (const double height : {0.0, 1.1}) {
      double sum = 0.0;
      for (int k = 0; k < 60; ++k) {
        sum += row_path(rows, ray, 0.1, height, {100.0 * k, 100.0 * (k + 1)});
      }
      EXPECT_NEAR(row_path(rows, ray, 0.1, height) / sum, 1.0, 0.5 / 256.0) << int(section);
    }
  }
}

TEST(RowPaths, ManyReceiversAsOneByOne) {
  const CropRows rows = rows_of(RowSection::ellipse, 3.0, 2.5, 1.2, 0.4);
  const RowRay ray = row_ray(grid(20), grid(75), 0.4);
  std::vector<double> across, height, path(50);
  std::vector<RowReach> reach;
  for (int i = 0; i < 50; ++i) {
    across.push_back(-1.5 + 0.06 * i);
    height.push_back(0.05 * i);
    reach.push_back({0.1 * i, 3.0 + i});
  }
  row_paths(rows, ray, {across, height, reach}, path);
  for (int i = 0; i < 50; ++i) EXPECT_EQ(path[i], row_path(rows, ray, across[i], height[i], reach[i]));
}

}  // namespace
}  // namespace sunfall

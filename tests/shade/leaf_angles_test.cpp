// Leaf angles and scatter against published figures.

#include "shade/leaf_angles.h"

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

#include "shade/leaf_scatter.h"

namespace sunfall {
namespace {

double sine_at_zenith(double zenith_deg) { return std::cos(zenith_deg * std::numbers::pi / 180.0); }

// K of Campbell's ellipsoid. Computed for these tests by integrating the published density of leaf angles
// with the shadow of a leaf at each; four digits.
TEST(LeafAngles, ExtinctionOfTheEllipsoid) {
  struct Row {
    double x;
    double k[7];
  };
  const double zeniths_deg[] = {0, 15, 30, 45, 60, 75, 85};
  const Row rows[] = {{0.1, {.0634, .1812, .3713, .6369, 1.0994, 2.3658, 7.2435}},
                      {0.5, {.2925, .3319, .4469, .6541, 1.0547, 2.2030, 6.6938}},
                      {1.0, {.5000, .5176, .5774, .7071, 1.0000, 1.9319, 5.7369}},
                      {1.5, {.6354, .6454, .6808, .7636, .9705, 1.7037, 4.8831}},
                      {2.0, {.7245, .7310, .7541, .8101, .9585, 1.5339, 4.2037}},
                      {3.0, {.8280, .8313, .8432, .8728, .9561, 1.3216, 3.2615}},
                      {5.0, {.9144, .9157, .9205, .9325, .9677, 1.1411, 2.2816}}};
  for (const Row& row : rows) {
    const LeafAngles angles(row.x);
    for (int i = 0; i < 7; ++i) {
      EXPECT_NEAR(angles.extinction(sine_at_zenith(zeniths_deg[i])), row.k[i], 0.51e-4)
          << row.x << " at " << zeniths_deg[i];
    }
  }
}

// The fit that Campbell and Norman (1998, eq. 15.4; digits compared) give for practice differs from the exact
// form by up to 0.154 %, near x = 0.4.
TEST(LeafAngles, PublishedFitIsClose) {
  for (double x = 0.1; x <= 10.0; x *= 1.1) {
    const double fit = x / (x + 1.774 * std::pow(x + 1.182, -0.733));  // K at the zenith
    EXPECT_NEAR(LeafAngles(x).extinction(1.0) / fit, 1.0, 0.0016) << x;
  }
}

// A flat leaf's shadow is half its area on average over all directions, however it stands, so G is one half
// on average over the sky's solid angle, for any x. Midpoint rule in the sine.
TEST(LeafAngles, MeanShadowOfAnyLeafIsHalfItsArea) {
  for (const double x : {0.1, 0.5, 0.999999, 1.0, 1.000001, 2.0, 10.0}) {
    const LeafAngles angles(x);
    double sum = 0.0;
    constexpr int kSteps = 20'000;
    for (int i = 0; i < kSteps; ++i) sum += angles.projection((i + 0.5) / kSteps) / kSteps;
    EXPECT_NEAR(sum, 0.5, 1e-6) << x;
  }
}

TEST(LeafAngles, UprightAndFlatLimits) {
  // Vertical leaves: K = (2/π) tan Z; level ones: 1.
  EXPECT_NEAR(LeafAngles(1e-4).extinction(sine_at_zenith(60)), 1.10266, 2e-4);
  EXPECT_NEAR(LeafAngles(1e4).extinction(sine_at_zenith(60)), 1.0, 2e-4);
}

// Goudriaan (1977) as in Campbell and Norman (1998); figures from the formulas, five digits.
TEST(LeafScatter, CanopyReflectionAndDepth) {
  const LeafScatter scatter(0.8);
  const LeafAngles sphere(1.0);
  const double zeniths_deg[] = {0, 45, 70};
  const double reflected[] = {.03715, .04617, .06618};
  const double passed[] = {.26142, .14996, .01979};  // leaf area index 3
  for (int i = 0; i < 3; ++i) {
    const double k = sphere.extinction(sine_at_zenith(zeniths_deg[i]));
    EXPECT_NEAR(scatter.reflected(k), reflected[i], 0.6e-5);
    EXPECT_NEAR(std::exp(-scatter.depth_factor() * k * 3.0), passed[i], 0.6e-5);
  }
  EXPECT_EQ(LeafScatter(1.0).reflected(1.0), 0.0);
}

}  // namespace
}  // namespace sunfall

#include "sunfall/angle.h"

#include <gtest/gtest.h>

namespace sunfall {
namespace {

TEST(Angle, ConvertsBothWays) {
  EXPECT_DOUBLE_EQ(Angle::degrees(180.0).radians(), std::numbers::pi);
  EXPECT_DOUBLE_EQ(Angle::radians(std::numbers::pi / 6.0).degrees(), 30.0);
  EXPECT_DOUBLE_EQ(sin(Angle::degrees(30.0)), 0.5);
  EXPECT_NEAR(cos(Angle::degrees(60.0)), 0.5, 1e-15);
  EXPECT_NEAR(tan(Angle::degrees(45.0)), 1.0, 1e-15);
}

TEST(Angle, Computes) {
  EXPECT_NEAR((Angle::degrees(350.0) + Angle::degrees(20.0)).degrees(), 370.0, 1e-12);
  EXPECT_NEAR((Angle::degrees(10.0) - Angle::degrees(20.0)).degrees(), -10.0, 1e-12);
  EXPECT_NEAR((-Angle::degrees(10.0) * 3.0).degrees(), -30.0, 1e-12);
  EXPECT_LT(Angle::degrees(1.0), Angle::degrees(2.0));
}

TEST(Angle, WrapsIntoOneTurn) {
  EXPECT_NEAR(wrapped(Angle::degrees(370.0)).degrees(), 10.0, 1e-12);
  EXPECT_NEAR(wrapped(Angle::degrees(-10.0)).degrees(), 350.0, 1e-12);
  EXPECT_EQ(wrapped(Angle::degrees(360.0)).degrees(), 0.0);
  // So small a negative angle rounds to a whole turn, which is no turn.
  EXPECT_LT(wrapped(Angle::radians(-1e-20)).degrees(), 360.0);
}

// Where grid north lies 3 degrees east of true north, true north is 357 on the grid.
TEST(Angle, TurnsBetweenTrueAndGridNorth) {
  const Angle convergence = Angle::degrees(3.0);
  EXPECT_NEAR(to_grid({Angle::degrees(0.0)}, convergence).from_grid_north.degrees(), 357.0, 1e-12);
  EXPECT_NEAR(to_true({Angle::degrees(357.0)}, convergence).from_true_north.degrees(), 0.0, 1e-12);
  const Azimuth there_and_back = to_true(to_grid({Angle::degrees(123.4)}, convergence), convergence);
  EXPECT_NEAR(there_and_back.from_true_north.degrees(), 123.4, 1e-12);
}

}  // namespace
}  // namespace sunfall

// Horizons in steps: what the header promises.

#include "dome/horizon_steps.h"

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace sunfall {
namespace {

double degrees_of(double tangent) { return std::atan(tangent) * 180.0 / std::numbers::pi; }

TEST(HorizonSteps, StepZeroIsTheOpenHorizon) {
  EXPECT_EQ(step_tangent(0), 0.0F);
  for (const float tangent : {-1.0e20F, -1.0F, -0.0F, 0.0F, 0.00097F}) EXPECT_EQ(horizon_step(tangent), 0);
  EXPECT_EQ(horizon_step(0.00098F), 1);
}

// A sweep that lost its numbers must not read beyond a table.
TEST(HorizonSteps, EveryFloatHasAStep) {
  for (const float tangent :
       {1.0e20F, 3.0e38F, 30.0F, 31.0F, std::numeric_limits<float>::infinity(),
        -std::numeric_limits<float>::infinity(), std::numeric_limits<float>::quiet_NaN()}) {
    EXPECT_LT(horizon_step(tangent), kHorizonSteps) << tangent;
  }
}

TEST(HorizonSteps, RiseWithTheHorizon) {
  for (int step = 1; step < kHorizonSteps; ++step) EXPECT_GT(step_tangent(step), step_tangent(step - 1));
  int previous = 0;
  for (double degrees = 0.0; degrees < 89.0; degrees += 0.01) {
    const int step = horizon_step(static_cast<float>(std::tan(degrees * std::numbers::pi / 180.0)));
    EXPECT_GE(step, previous) << degrees;
    previous = step;
  }
}

TEST(HorizonSteps, MiddlesComeBack) {
  const int last = horizon_step(30.0F);
  for (int step = 0; step <= last; ++step) EXPECT_EQ(horizon_step(step_tangent(step)), step);
}

// Within half of the wider neighbouring step, and 1e-6 for the floats.
TEST(HorizonSteps, RoundTripIsWithinHalfAStep) {
  for (double degrees = 0.0; degrees < 88.0; degrees += 0.003) {
    const auto tangent = static_cast<float>(std::tan(degrees * std::numbers::pi / 180.0));
    const int step = horizon_step(tangent);
    const double half = 0.5 * (step_tangent(step + 1) - step_tangent(step));
    EXPECT_NEAR(step_tangent(step), tangent, half * (1.0 + 1e-6) + 1e-6 * tangent) << degrees;
  }
}

TEST(HorizonSteps, WidthsAreThoseOfTheHeader) {
  const auto width_at = [](double degrees) {
    const int step = horizon_step(static_cast<float>(std::tan(degrees * std::numbers::pi / 180.0)));
    return degrees_of(step_tangent(step + 1)) - degrees_of(step_tangent(step));
  };
  EXPECT_NEAR(width_at(0.0), 0.11, 0.005);
  EXPECT_NEAR(width_at(20.0), 0.20, 0.005);
  EXPECT_NEAR(width_at(60.0), 0.22, 0.005);
  double widest = 0.0, where = 0.0;
  for (double degrees = 0.0; degrees < 88.0; degrees += 0.1) {
    if (width_at(degrees) > widest) widest = width_at(where = degrees);
  }
  EXPECT_NEAR(widest, 0.50, 0.005) << where;
  EXPECT_NEAR(where, 41.0, 1.0);
}

}  // namespace
}  // namespace sunfall

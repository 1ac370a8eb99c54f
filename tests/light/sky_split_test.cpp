#include "light/sky_split.h"

#include <gtest/gtest.h>

#include <numeric>
#include <random>

namespace sunfall {
namespace {

double sum(const std::vector<double>& values) { return std::accumulate(values.begin(), values.end(), 0.0); }

TEST(SpreadSky, FollowsTheShapeWhereNothingBinds) {
  const std::vector<StepShare> steps{{1.0, 0.0, 10.0}, {2.0, 0.0, 10.0}, {1.0, 0.0, 10.0}};
  const std::vector<double> sky = spread_sky(steps, 8.0);
  EXPECT_NEAR(sky[0], 2.0, 1e-12);
  EXPECT_NEAR(sky[1], 4.0, 1e-12);
  EXPECT_NEAR(sky[2], 2.0, 1e-12);
}

// By hand: the first step holds only 1, the rest (7) goes 2:1.
TEST(SpreadSky, HandsOnWhatAStepCannotHold) {
  const std::vector<StepShare> steps{{1.0, 0.0, 1.0}, {2.0, 0.0, 10.0}, {1.0, 0.0, 10.0}};
  const std::vector<double> sky = spread_sky(steps, 8.0);
  EXPECT_NEAR(sky[0], 1.0, 1e-12);
  EXPECT_NEAR(sky[1], 14.0 / 3.0, 1e-12);
  EXPECT_NEAR(sky[2], 7.0 / 3.0, 1e-12);
}

TEST(SpreadSky, KeepsToTheBoundsWhereTheTotalDoesNotFit) {
  const std::vector<StepShare> steps{{1.0, 1.0, 2.0}, {1.0, 1.0, 2.0}};
  EXPECT_NEAR(sum(spread_sky(steps, 0.5)), 2.0, 1e-12);
  EXPECT_NEAR(sum(spread_sky(steps, 9.0)), 4.0, 1e-12);
  EXPECT_TRUE(spread_sky({}, 1.0).empty());
}

TEST(SpreadSky, KeepsTheTotalAndTheBoundsForAnySteps) {
  std::mt19937_64 random(11);
  std::uniform_real_distribution<double> unit(0.0, 1.0);
  for (int round = 0; round < 300; ++round) {
    std::vector<StepShare> steps(40);
    double least = 0.0;
    double most = 0.0;
    for (StepShare& step : steps) {
      step.shape = unit(random) < 0.2 ? 0.0 : unit(random);
      step.most = step.shape > 0.0 ? unit(random) : 0.0;
      step.least = step.most * unit(random) * 0.5;
      least += step.least;
      most += step.most;
    }
    const double total = least + (most - least) * unit(random);
    const std::vector<double> sky = spread_sky(steps, total);
    EXPECT_NEAR(sum(sky), total, 1e-9) << round;
    for (std::size_t i = 0; i < sky.size(); ++i) {
      EXPECT_GE(sky[i], steps[i].least);
      EXPECT_LE(sky[i], steps[i].most);
    }
  }
}

}  // namespace
}  // namespace sunfall

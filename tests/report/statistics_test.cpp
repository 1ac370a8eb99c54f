// Plot statistics against values worked by hand and against R.

#include "report/statistics.h"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <random>

namespace sunfall {
namespace {

TEST(PlotStatistics, OneToTenByHand) {
  const PlotStatistics light = statistics({7, 1, 10, 4, kMissing, 2, 9, 3, 8, kMissing, 5, 6});
  EXPECT_EQ(light.count, 10U);
  EXPECT_DOUBLE_EQ(light.mean, 5.5);
  EXPECT_DOUBLE_EQ(light.least, 1.0);
  EXPECT_DOUBLE_EQ(light.most, 10.0);
  // R, quantile(1:10, 0.1): 1.9 (its default is definition 7).
  EXPECT_NEAR(light.p10, 1.9, 1e-12);
  // Variance of 1..n over n is (n² - 1) / 12 = 8.25.
  EXPECT_NEAR(light.cv, std::sqrt(8.25) / 5.5, 1e-12);
}

// Definition 7 by hand: rank (n - 1) p counted from 0, straight between its neighbours.
TEST(PlotStatistics, QuantileFollowsItsDefinition) {
  EXPECT_DOUBLE_EQ(quantile({5}, 0.1), 5.0);
  EXPECT_DOUBLE_EQ(quantile({0, 10}, 0.1), 1.0);
  EXPECT_DOUBLE_EQ(quantile({0, 10, 20, 30, 40, 50, 60, 70, 80, 90, 100}, 0.1), 10.0);
  EXPECT_NEAR(quantile({2, 4, 8, 16}, 0.1), 2.0 + 0.3 * 2.0, 1e-12);
  EXPECT_NEAR(quantile({2, 4, 8, 16}, 0.5), 6.0, 1e-12);
  EXPECT_DOUBLE_EQ(quantile({2, 4, 8, 16}, 0.0), 2.0);
  EXPECT_DOUBLE_EQ(quantile({2, 4, 8, 16}, 1.0), 16.0);
}

TEST(PlotStatistics, NothingGivesMissing) {
  for (const auto& values : {std::vector<float>{}, std::vector<float>{kMissing, kMissing}}) {
    const PlotStatistics light = statistics(values);
    EXPECT_EQ(light.count, 0U);
    for (const double value : {light.mean, light.p10, light.least, light.most, light.cv}) {
      EXPECT_TRUE(std::isnan(value));
    }
  }
}

TEST(PlotStatistics, AnEvenPlotHasNoVariation) {
  EXPECT_EQ(statistics({4, 4, 4}).cv, 0.0);
  EXPECT_EQ(statistics({4}).p10, 4.0);
  EXPECT_TRUE(std::isnan(statistics({0, 0}).cv));
}

TEST(PlotStatistics, DoNotDependOnTheOrder) {
  std::mt19937 random(5);
  std::uniform_real_distribution<float> light(0.0F, 40.0F);
  std::vector<float> values(1001);
  for (float& value : values) value = light(random);
  const PlotStatistics first = statistics(values);
  for (int i = 0; i < 20; ++i) {
    std::shuffle(values.begin(), values.end(), random);
    const PlotStatistics other = statistics(values);
    EXPECT_EQ(other.mean, first.mean);  // to the last bit
    EXPECT_EQ(other.cv, first.cv);
    EXPECT_EQ(other.p10, first.p10);
  }
  EXPECT_LE(first.least, first.p10);
  EXPECT_LE(first.p10, first.mean);
  EXPECT_LE(first.mean, first.most);
}

}  // namespace
}  // namespace sunfall

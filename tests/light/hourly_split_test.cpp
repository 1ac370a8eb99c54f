// Check values computed elsewhere from the published equations, to five digits.

#include "light/hourly_split.h"

#include <gtest/gtest.h>

#include <utility>

namespace sunfall {
namespace {

TEST(HourlySplit, ErbsHasItsPublishedValues) {
  for (const auto& [clearness, part] : {std::pair{0.1, 0.99100},
                                        {0.22, 0.98020},
                                        {0.3, 0.94860},
                                        {0.4, 0.83999},
                                        {0.5, 0.65915},
                                        {0.6, 0.43948},
                                        {0.7, 0.24398},
                                        {0.8, 0.16527},
                                        {0.9, 0.16500}}) {
    EXPECT_NEAR(erbs_hourly_diffuse_part(clearness), part, 1e-5) << clearness;
  }
}

// The published pieces meet to within 0.0003; a wrong digit in a coefficient makes a step.
TEST(HourlySplit, ErbsIsNearlyContinuous) {
  for (const double edge : {0.22, 0.80}) {
    const double jump = erbs_hourly_diffuse_part(edge + 1e-9) - erbs_hourly_diffuse_part(edge);
    EXPECT_NEAR(jump, -0.00027, 1e-5) << edge;
  }
  EXPECT_EQ(erbs_hourly_diffuse_part(-0.1), 1.0);
  EXPECT_EQ(erbs_hourly_diffuse_part(3.0), 0.165);
}

TEST(HourlySplit, BolandRidleyLauretHasItsPublishedValues) {
  const auto part = [](double kt, double hour, double elevation_deg, double day, double neighbours) {
    return brl_diffuse_part({kt, day, neighbours, hour, Angle::degrees(elevation_deg)});
  };
  EXPECT_NEAR(part(0.5, 12, 45, 0.5, 0.5), 0.68525, 1e-5);
  EXPECT_NEAR(part(0.3, 9, 30, 0.4, 0.35), 0.91595, 1e-5);
  EXPECT_NEAR(part(0.7, 12, 60, 0.65, 0.68), 0.28064, 1e-5);
  EXPECT_NEAR(part(0.1, 15, 20, 0.2, 0.15), 0.98552, 1e-5);
  // The published sign: a later hour has less sky.
  EXPECT_LT(part(0.5, 15, 45, 0.5, 0.5), part(0.5, 9, 45, 0.5, 0.5));
}

TEST(HourlySplit, BolandRidleyLauretStaysAPart) {
  for (double kt = 0.0; kt < 5.0; kt += 0.1) {
    const double part = brl_diffuse_part({kt, kt, kt, 24.0 * kt / 5.0, Angle::degrees(18.0 * kt)});
    EXPECT_GE(part, 0.0);
    EXPECT_LE(part, 1.0);
  }
}

}  // namespace
}  // namespace sunfall

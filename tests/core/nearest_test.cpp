#include "core/nearest.h"

#include <gtest/gtest.h>

namespace sunfall {
namespace {

const std::vector<std::string> kKnown{"ground", "surface", "far_ground", "clock"};

TEST(NearestName, MendsEachKindOfSlip) {
  EXPECT_EQ(nearest_name("groud", kKnown), "ground");     // left out
  EXPECT_EQ(nearest_name("grounds", kKnown), "ground");   // added
  EXPECT_EQ(nearest_name("surfase", kKnown), "surface");  // replaced
  EXPECT_EQ(nearest_name("colck", kKnown), "clock");      // swapped
  EXPECT_EQ(nearest_name("CLOCK", kKnown), "clock");      // case
}

TEST(NearestName, PrefersTheNearer) { EXPECT_EQ(nearest_name("farground", kKnown), "far_ground"); }

TEST(NearestName, SaysNothingWhereNothingIsNear) {
  EXPECT_EQ(nearest_name("zebra", kKnown), "");
  EXPECT_EQ(nearest_name("ground", {}), "");
}

}  // namespace
}  // namespace sunfall

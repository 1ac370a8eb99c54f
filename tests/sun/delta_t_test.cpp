#include "sun/delta_t.h"

#include <gtest/gtest.h>

#include "sun/utc.h"

namespace sunfall {
namespace {

// TT - TAI = 32.184 s by definition, plus TAI - UTC by IERS Bulletin C.
TEST(DeltaT, FollowsTheLeapSeconds) {
  EXPECT_DOUBLE_EQ(tt_minus_utc_s(utc(1972, 1, 1)), 42.184);
  EXPECT_DOUBLE_EQ(tt_minus_utc_s(utc(2003, 10, 17)), 64.184);
  EXPECT_DOUBLE_EQ(tt_minus_utc_s(utc(2016, 12, 31, 23, 59, 59)), 68.184);
  EXPECT_DOUBLE_EQ(tt_minus_utc_s(utc(2017, 1, 1)), 69.184);
  EXPECT_DOUBLE_EQ(tt_minus_utc_s(utc(2026, 6, 1)), 69.184);
}

// Observed Delta T, Astronomical Almanac: 1955.0 31.07, 1960.0 33.15, 1970.0 40.18 s (from memory);
// the polynomials fit such values to 0.2 s.
TEST(DeltaT, FollowsTheObservedEarthBeforeLeapSeconds) {
  EXPECT_NEAR(tt_minus_utc_s(utc(1955, 1, 1)), 31.07, 0.2);
  EXPECT_NEAR(tt_minus_utc_s(utc(1960, 1, 1)), 33.15, 0.2);
  EXPECT_NEAR(tt_minus_utc_s(utc(1970, 1, 1)), 40.18, 0.2);
}

// A leap second is the largest step.
TEST(DeltaT, NeverJumpsByMoreThanASecond) {
  double before_s = tt_minus_utc_s(utc(1950, 1, 1));
  for (UtcTime time = utc(1950, 1, 2); time < utc(2101, 1, 1); time += std::chrono::days{1}) {
    const double now_s = tt_minus_utc_s(time);
    EXPECT_LE(std::abs(now_s - before_s), 1.0) << time.time_since_epoch().count();
    before_s = now_s;
  }
}

}  // namespace
}  // namespace sunfall

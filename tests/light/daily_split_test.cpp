// Beam and sky of days, and of months by the second split.

#include <gtest/gtest.h>

#include "light/daily_ratios.h"

namespace sunfall {
namespace {

const Angle kShortDay = Angle::degrees(75.0);
const Angle kLongDay = Angle::degrees(95.0);

// Erbs, Klein and Duffie (1982), daily; evaluations by an independent program of coefficients that several
// public copies agree on.
TEST(DailySplit, FollowsErbs) {
  EXPECT_NEAR(erbs_daily_diffuse_part(0.3, kShortDay), 0.89200, 1e-5);
  EXPECT_NEAR(erbs_daily_diffuse_part(0.5, kShortDay), 0.56884, 1e-5);
  EXPECT_NEAR(erbs_daily_diffuse_part(0.7, kShortDay), 0.16407, 1e-5);
  EXPECT_NEAR(erbs_daily_diffuse_part(0.75, kShortDay), 0.14300, 1e-5);
  EXPECT_NEAR(erbs_daily_diffuse_part(0.3, kLongDay), 0.87776, 1e-5);
  EXPECT_NEAR(erbs_daily_diffuse_part(0.5, kLongDay), 0.60828, 1e-5);
  EXPECT_NEAR(erbs_daily_diffuse_part(0.7, kLongDay), 0.23571, 1e-5);
  EXPECT_NEAR(erbs_daily_diffuse_part(0.75, kLongDay), 0.17500, 1e-5);
}

// The polynomial of long days is 1.0078 at 0.06: no day has more sky than light. The polynomials end at
// 0.1422 and 0.1902, by hand, where the constants 0.143 and 0.175 take over.
TEST(DailySplit, ErbsIsAPartAndJumpsOnlyAsPublished) {
  for (const Angle sunset : {kShortDay, kLongDay}) {
    const double edge = sunset == kShortDay ? 0.715 : 0.722;
    double before = erbs_daily_diffuse_part(0.0, sunset);
    EXPECT_EQ(before, 1.0);
    for (double k = 0.0; k <= 1.2; k += 0.001) {
      const double part = erbs_daily_diffuse_part(k, sunset);
      EXPECT_LE(part, 1.0) << k;
      EXPECT_GE(part, 0.14) << k;
      if (std::abs(k - edge) > 0.0015) {
        EXPECT_LE(std::abs(part - before), 0.005) << k;
      }
      before = part;
    }
  }
  EXPECT_EQ(erbs_daily_diffuse_part(0.06, kLongDay), 1.0);
  EXPECT_NEAR(erbs_daily_diffuse_part(0.715 - 1e-9, kShortDay), 0.1422, 1e-4);
  EXPECT_NEAR(erbs_daily_diffuse_part(0.722 - 1e-9, kLongDay), 0.1902, 1e-4);
}

// Collares-Pereira and Rabl (1979), daily, evaluated in the same way.
TEST(DailySplit, FollowsCollaresPereiraAndRabl) {
  EXPECT_NEAR(collares_pereira_daily_diffuse_part(0.17), 0.99, 1e-5);
  EXPECT_NEAR(collares_pereira_daily_diffuse_part(0.3), 0.88751, 1e-5);
  EXPECT_NEAR(collares_pereira_daily_diffuse_part(0.5), 0.60375, 1e-5);
  EXPECT_NEAR(collares_pereira_daily_diffuse_part(0.7), 0.25975, 1e-5);
  EXPECT_NEAR(collares_pereira_daily_diffuse_part(0.75), 0.22700, 1e-5);
  EXPECT_NEAR(collares_pereira_daily_diffuse_part(0.78), 0.21080, 1e-5);
  EXPECT_EQ(collares_pereira_daily_diffuse_part(0.9), 0.2);
}

// By hand, the polynomial begins at 0.9804, a step of 0.0096 below 0.99, and ends 0.0002 from the line; with
// 21.865, as some copies have it, that would be 0.004.
TEST(DailySplit, CollaresPereiraAndRablMeetsItsPieces) {
  for (const auto& [edge, step] : {std::pair{0.17, 0.0096}, {0.75, -0.0002}, {0.80, 0.0}}) {
    const double below = collares_pereira_daily_diffuse_part(edge - 1e-9);
    EXPECT_NEAR(below - collares_pereira_daily_diffuse_part(edge + 1e-9), step, 1e-4) << edge;
  }
  double before = 1.0;
  for (double k = 0.0; k <= 1.2; k += 0.001) {
    const double part = collares_pereira_daily_diffuse_part(k);
    EXPECT_LE(part, before + 0.0003) << k;
    EXPECT_GE(part, 0.2 - 1e-12) << k;
    before = part;
  }
}

// Two forms of the monthly relation are in print: in radians, and in degrees, 0.775 + 0.00653 (ws − 90) −
// [0.505 + 0.00455 (ws − 90)] cos(115 K − 103). They are not the same: 0.00653 a degree is 0.374 a radian,
// not 0.347, which makes 0.0095 at 20 degrees; the rounding of 115 and 103 makes at most 0.003 more.
TEST(MonthlySplit, CollaresPereiraAndRablInDegrees) {
  for (const double sunset_deg : {70.0, 90.0, 110.0}) {
    for (const double k : {0.3, 0.5, 0.7}) {
      const double in_degrees =
          0.775 + 0.00653 * (sunset_deg - 90.0) -
          (0.505 + 0.00455 * (sunset_deg - 90.0)) * cos(Angle::degrees(115.0 * k - 103.0));
      const double ours = collares_pereira_monthly_diffuse_part(k, Angle::degrees(sunset_deg));
      EXPECT_NEAR(ours, in_degrees, 0.0125) << sunset_deg << " " << k;
      EXPECT_EQ(monthly_diffuse_part(DaySplit::collares_pereira, k, Angle::degrees(sunset_deg)), ours);
    }
  }
}

// Where both are usual (clearness 0.3 to 0.7) the two daily models differ by at most 0.1.
TEST(DailySplit, ModelsAgreeInKind) {
  for (double k = 0.3; k <= 0.7; k += 0.01) {
    for (const Angle sunset : {kShortDay, kLongDay}) {
      EXPECT_NEAR(daily_diffuse_part(DaySplit::erbs, k, sunset),
                  daily_diffuse_part(DaySplit::collares_pereira, k, sunset), 0.1)
          << k;
    }
  }
}

}  // namespace
}  // namespace sunfall

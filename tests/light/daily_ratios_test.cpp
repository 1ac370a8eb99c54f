#include "light/daily_ratios.h"

#include <gtest/gtest.h>

#include <numbers>
#include <vector>

#include "light/series_checks.h"

namespace sunfall {
namespace {

// Liu and Jordan (1960), the ratio of an hour's diffuse to the day's.
double liu_and_jordan(double hour_angle_deg, double sunset_deg) {
  const double w = hour_angle_deg * std::numbers::pi / 180.0;
  const double ws = sunset_deg * std::numbers::pi / 180.0;
  return std::numbers::pi / 24.0 * (std::cos(w) - std::cos(ws)) / (std::sin(ws) - ws * std::cos(ws));
}

struct Row {
  double hour_angle_deg, sunset_deg, r_t, r_d;
};

// Evaluations of both formulas by an independent program.
TEST(DailyRatios, FollowCollaresPereiraAndRabl) {
  const std::vector<Row> rows{{0, 90, .14168, .13090},    {7.5, 90, .14000, .12978},
                              {37.5, 90, .10333, .10385}, {82.5, 90, .01222, .01709},
                              {22.5, 66, .15607, .15211}, {7.5, 110, .11880, .10935}};
  for (const Row& row : rows) {
    const double r_d = liu_and_jordan(row.hour_angle_deg, row.sunset_deg);
    EXPECT_NEAR(r_d, row.r_d, 1e-5);
    EXPECT_NEAR(
        collares_pereira_rabl(Angle::degrees(row.hour_angle_deg), Angle::degrees(row.sunset_deg)) * r_d,
        row.r_t, 1e-5);
  }
}

// Which is why a day is renormalised: the sums found by quadrature are not 1.
TEST(DailyRatios, DoNotIntegrateToOne) {
  const std::vector<std::pair<double, double>> sums{
      {60, 1.0017}, {75, .9927}, {90, .9917}, {105, .9978}, {120, 1.0073}};
  for (const auto& [sunset_deg, expected] : sums) {
    double sum = 0.0;
    constexpr int parts = 20000;
    for (int i = 0; i < parts; ++i) {
      const double w_deg = sunset_deg * (-1.0 + (2.0 * i + 1.0) / parts);
      sum += collares_pereira_rabl(Angle::degrees(w_deg), Angle::degrees(sunset_deg)) *
             liu_and_jordan(w_deg, sunset_deg) * (2.0 * sunset_deg / parts) / 15.0;
    }
    EXPECT_NEAR(sum, expected, 1e-4) << sunset_deg;
  }
}

// The mean sine of the steps is the shape r_d: hour by hour at the equinox, to the 4 minutes by which
// true solar noon drifts from the hour's middle (0.001 of the day at the steepest).
TEST(DailyRatios, MeanSineFollowsLiuAndJordan) {
  const LightSeries series = light_of(ClearSource{}, place_at(40.0, 0.0), 2025);
  const std::size_t day = 78;  // 20 March; the equation of time is -7.4 minutes
  double sum = 0.0;
  for (std::size_t i = 0; i < kStepsPerDay; ++i) sum += series.sun.mean_sine[day * kStepsPerDay + i];
  for (int hour = 7; hour < 17; ++hour) {
    double hour_sum = 0.0;
    for (std::size_t i = 0; i < 6; ++i) {
      hour_sum += series.sun.mean_sine[day * kStepsPerDay + static_cast<std::size_t>(hour) * 6 + i];
    }
    const double hour_angle_deg = 15.0 * (hour + 0.5 - 12.0 - 7.4 / 60.0);
    EXPECT_NEAR(hour_sum / sum, liu_and_jordan(hour_angle_deg, 90.0), 1e-3) << hour;
  }
}

// Erbs, Klein and Duffie (1982), monthly, evaluated; sunset below and above 81.4 degrees.
TEST(MonthlySplit, FollowsErbs) {
  const Angle short_day = Angle::degrees(75.0);
  const Angle long_day = Angle::degrees(95.0);
  EXPECT_NEAR(erbs_monthly_diffuse_part(0.3, short_day), 0.64231, 1e-5);
  EXPECT_NEAR(erbs_monthly_diffuse_part(0.3, long_day), 0.66366, 1e-5);
  EXPECT_NEAR(erbs_monthly_diffuse_part(0.5, short_day), 0.39113, 1e-5);
  EXPECT_NEAR(erbs_monthly_diffuse_part(0.5, long_day), 0.42913, 1e-5);
  EXPECT_NEAR(erbs_monthly_diffuse_part(0.7, short_day), 0.21862, 1e-5);
  EXPECT_NEAR(erbs_monthly_diffuse_part(0.7, long_day), 0.25023, 1e-5);
}

// Outside 0.3 to 0.8, where it was fitted: continuous, falling, from 1 to a positive rest.
TEST(MonthlySplit, IsContinuousAndBoundedOutsideItsRange) {
  for (const double sunset_deg : {0.0, 60.0, 81.4, 90.0, 180.0}) {
    double before = 1.0;
    for (double k = 0.0; k <= 1.2; k += 0.001) {
      const double part = erbs_monthly_diffuse_part(k, Angle::degrees(sunset_deg));
      EXPECT_LE(part, before + 1e-12) << k;
      EXPECT_GE(part, before - 0.004) << k;  // the polynomials' slope is nowhere steeper than -3.6
      EXPECT_GT(part, 0.1) << k;
      before = part;
    }
    EXPECT_EQ(erbs_monthly_diffuse_part(0.05, Angle::degrees(sunset_deg)), 1.0);
  }
}

TEST(SunsetHourAngle, IsZeroInPolarNightAndHalfATurnUnderTheMidnightSun) {
  EXPECT_NEAR(sunset_hour_angle(Angle::degrees(0.0), Angle::degrees(20.0)).degrees(), 90.0, 1e-12);
  EXPECT_NEAR(sunset_hour_angle(Angle::degrees(70.0), Angle::degrees(-23.0)).degrees(), 0.0, 1e-12);
  EXPECT_NEAR(sunset_hour_angle(Angle::degrees(70.0), Angle::degrees(23.0)).degrees(), 180.0, 1e-12);
  EXPECT_NEAR(sunset_hour_angle(Angle::degrees(90.0), Angle::degrees(23.0)).degrees(), 180.0, 1e-12);
  // FAO-56 example 8: 20 S, declination 0.120 rad, sunset 1.527 rad.
  EXPECT_NEAR(sunset_hour_angle(Angle::degrees(-20.0), Angle::radians(0.120)).radians(), 1.527, 5e-4);
}

}  // namespace
}  // namespace sunfall

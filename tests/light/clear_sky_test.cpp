#include "light/clear_sky.h"

#include <gtest/gtest.h>

#include <vector>

#include "light/bird.h"

namespace sunfall {
namespace {

// Kasten and Young (1989), eq. 3, evaluated; below 1 at the zenith.
TEST(AirMass, FollowsKastenAndYoung) {
  const std::vector<std::pair<double, double>> table{
      {0, 0.99971},   {10, 1.01507},  {30, 1.15399}, {45, 1.41260},  {60, 1.99429},
      {70, 2.90315},  {75, 3.81291},  {80, 5.58604}, {85, 10.30579}, {87, 15.14774},
      {88, 19.43325}, {89, 26.31056}, {90, 37.91961}};
  for (const auto& [zenith_deg, mass] : table) {
    EXPECT_NEAR(air_mass(Angle::degrees(90.0 - zenith_deg)), mass, 1e-5) << zenith_deg;
  }
  EXPECT_NEAR(air_mass(Angle::degrees(-5.0)), 37.91961, 1e-5);
}

struct Row {
  double zenith_deg, height_m, linke_turbidity;
  double global_w_m2, corrected_global_w_m2, beam_normal_w_m2;
};

// Ineichen and Perez (2002) evaluated for 1367 W m-2; the second global with exp(0.01 m^1.8).
const std::vector<Row> kRows{
    {0, 0, 2, 1098.205, 1109.237, 1016.642},    {0, 0, 3, 1056.528, 1067.141, 944.329},
    {30, 0, 3, 898.737, 910.443, 918.466},      {60, 0, 3, 470.655, 487.246, 789.540},
    {60, 1500, 2.5, 524.339, 537.620, 939.731}, {80, 0, 3, 107.721, 134.390, 413.615},
};

ClearSkyInput input_at(double zenith_deg, double height_m, double linke_turbidity) {
  const Angle elevation = Angle::degrees(90.0 - zenith_deg);
  return {.extraterrestrial_normal_w_m2 = 1367.0,
          .sine_of_elevation = sin(elevation),
          .air_mass = air_mass(elevation),
          .height_m = height_m,
          .linke_turbidity = linke_turbidity};
}

TEST(ClearSky, FollowsIneichenAndPerez) {
  for (const Row& row : kRows) {
    const ClearSkyInput input = input_at(row.zenith_deg, row.height_m, row.linke_turbidity);
    const ClearSky published = clear_sky(input, LowSun::published);
    const ClearSky corrected = clear_sky(input, LowSun::corrected);
    EXPECT_NEAR(published.global_w_m2, row.global_w_m2, 0.05) << row.zenith_deg << ' ' << row.height_m;
    EXPECT_NEAR(corrected.global_w_m2, row.corrected_global_w_m2, 0.05)
        << row.zenith_deg << ' ' << row.height_m;
    EXPECT_NEAR(published.beam_normal_w_m2, row.beam_normal_w_m2, 0.05)
        << row.zenith_deg << ' ' << row.height_m;
    EXPECT_EQ(corrected.beam_normal_w_m2, published.beam_normal_w_m2);
  }
}

// Why the correction is on: Bird and Hulstrom (1981), who claim 5 % against rigorous codes, for an
// atmosphere of turbidity 3 (broadband optical depth 0.27 at air mass 2, 1.5 cm of water, 0.3 cm of
// ozone). As published, the model is 11 % low at 15 degrees.
TEST(ClearSky, AgreesWithBirdAndHulstromDownToALowSun) {
  for (const double zenith_deg : {0.0, 30.0, 60.0, 70.0, 75.0}) {
    const double bird_w_m2 = bird_and_hulstrom(zenith_deg, kBirdExample).global_w_m2;
    const ClearSky sky = clear_sky(input_at(zenith_deg, 0.0, 3.0));
    EXPECT_NEAR(sky.global_w_m2, bird_w_m2, 0.05 * bird_w_m2) << zenith_deg;
  }
  const double low_bird_w_m2 = bird_and_hulstrom(75.0, kBirdExample).global_w_m2;
  EXPECT_LT(clear_sky(input_at(75.0, 0.0, 3.0), LowSun::published).global_w_m2, 0.9 * low_bird_w_m2);
}

// The sky part is never negative, the sky never clears as the sun sinks, and neither global nor beam
// exceeds what comes in above the air.
TEST(ClearSky, StaysSaneDownToTheHorizon) {
  for (const double height_m : {-400.0, 0.0, 1500.0, 3000.0, 5000.0}) {
    for (const double linke_turbidity : {1.0, 1.5, 2.0, 3.0, 5.0, 8.0, 12.0}) {
      double clearness_above = 2.0;
      for (double zenith_deg = 0.0; zenith_deg < 90.0; zenith_deg += 0.25) {
        const ClearSkyInput input = input_at(zenith_deg, height_m, linke_turbidity);
        const ClearSky sky = clear_sky(input);
        const double beam_w_m2 = sky.beam_normal_w_m2 * input.sine_of_elevation;
        EXPECT_GE(sky.global_w_m2, beam_w_m2) << zenith_deg << ' ' << height_m << ' ' << linke_turbidity;
        EXPECT_GE(sky.beam_normal_w_m2, 0.0);
        EXPECT_LE(sky.beam_normal_w_m2, 1367.0);
        const double clearness = sky.global_w_m2 / (1367.0 * input.sine_of_elevation);
        EXPECT_LE(clearness, clearness_above * (1.0 + 1e-12))
            << zenith_deg << ' ' << height_m << ' ' << linke_turbidity;
        EXPECT_LE(clearness, 1.0) << zenith_deg << ' ' << height_m << ' ' << linke_turbidity;
        clearness_above = clearness;
      }
    }
  }
  EXPECT_EQ(clear_sky(input_at(90.5, 0.0, 3.0)).global_w_m2, 0.0);
}

TEST(ClearSky, IsDimmerWithMoreHazeAndBrighterHigherUp) {
  EXPECT_GT(clear_sky(input_at(45, 0, 2)).global_w_m2, clear_sky(input_at(45, 0, 4)).global_w_m2);
  EXPECT_GT(clear_sky(input_at(45, 0, 2)).beam_normal_w_m2, clear_sky(input_at(45, 0, 4)).beam_normal_w_m2);
  EXPECT_GT(clear_sky(input_at(45, 2000, 3)).global_w_m2, clear_sky(input_at(45, 0, 3)).global_w_m2);
}

// The yardstick itself against formula evaluations of the report (no printed example is at hand).
TEST(BirdAndHulstrom, IsTranscribedRight) {
  EXPECT_NEAR(bird_and_hulstrom(0.0, kBirdExample).beam_normal_w_m2, 952.743, 0.01);
  EXPECT_NEAR(bird_and_hulstrom(60.0, kBirdExample).global_w_m2, 491.232, 0.01);
  EXPECT_NEAR(bird_and_hulstrom(75.0, kBirdExample).global_w_m2, 222.473, 0.01);
  EXPECT_NEAR(bird_and_hulstrom(85.0, kBirdExample).diffuse_w_m2, 25.365, 0.01);
  EXPECT_NEAR(
      bird_and_hulstrom(48.2, {.ozone_cm = 0.34, .water_cm = 1.42, .depth_380 = 0.3538, .depth_500 = 0.2661})
          .diffuse_w_m2,
      167.370, 0.01);
}

}  // namespace
}  // namespace sunfall

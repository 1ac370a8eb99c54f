#include "light/photons.h"

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <random>
#include <vector>

#include "light/bird.h"
#include "light/series_checks.h"

namespace sunfall {
namespace {

// Spitters, Toussaint and Goudriaan (1986): [1 + 0.3 (1 - q²)] q, evaluated.
TEST(Photons, SplitAsSpittersDoes) {
  EXPECT_NEAR(diffuse_part_of_photons(0.17098), 0.22078, 1e-5);
  EXPECT_NEAR(diffuse_part_of_photons(0.44147), 0.54810, 1e-5);
  EXPECT_NEAR(diffuse_part_of_photons(0.87306), 0.93534, 1e-5);
  EXPECT_DOUBLE_EQ(diffuse_part_of_photons(1.0), 1.0);
  EXPECT_DOUBLE_EQ(diffuse_part_of_photons(0.0), 0.0);
}

// Jacovides and others (2007): 1.971 ± 0.031 clear, 2.099 ± 0.025 overcast, 6.5 % between.
TEST(Photons, RunFromClearToOvercast) {
  EXPECT_DOUBLE_EQ(photons_per_joule_umol(0.8), 1.971);
  EXPECT_DOUBLE_EQ(photons_per_joule_umol(0.1), 2.099);
  double before = 2.1;
  for (double clearness = 0.0; clearness < 1.2; clearness += 0.01) {
    EXPECT_LE(photons_per_joule_umol(clearness), before);
    before = photons_per_joule_umol(clearness);
  }
}

// What "height-free" means: one clear atmosphere (Bird and Hulstrom) at any height of the sun. Perez
// and others fitted it to 5 %.
TEST(Photons, ClearnessDoesNotFallWithTheSun) {
  const double overhead =
      height_free_clearness(bird_and_hulstrom(0.0, kBirdExample).global_w_m2 / 1367.0, Angle::degrees(90.0));
  for (const double zenith_deg : {30.0, 60.0, 75.0}) {
    const Angle elevation = Angle::degrees(90.0 - zenith_deg);
    const double clearness =
        bird_and_hulstrom(zenith_deg, kBirdExample).global_w_m2 / (1367.0 * sin(elevation));
    EXPECT_NEAR(height_free_clearness(clearness, elevation), overhead, 0.05 * overhead) << zenith_deg;
  }
}

struct SpectralRow {
  double zenith_deg, global_umol, diffuse_part;
};

// Bird and Riordan's spectral model (1986), 400-700 nm: optical depth 0.084 at 500 nm with exponent 1.14,
// 1.42 cm of water, 0.344 cm of ozone, albedo 0.2, evaluated independently.
const std::vector<SpectralRow> kSpectral{{0.0, 2218.93, 0.1295},   {30.0, 1889.85, 0.1435},
                                         {48.19, 1401.24, 0.1732}, {60.0, 995.82, 0.2133},
                                         {75.0, 429.00, 0.3445},   {85.0, 94.10, 0.6834}};

// The broadband beam and sky of the same atmosphere come from Bird and Hulstrom. Both models claim 5 %;
// the fit of Jacovides has a spread of 1.6 %. A diffuse part is a difference of two such numbers: 5 % of
// the whole is 0.05. At 5 degrees of elevation the two models themselves part (0.68 against our 0.58),
// so the diffuse part is compared down to 15.
TEST(Photons, AgreeWithASpectralModel) {
  const BirdAtmosphere air{.ozone_cm = 0.344,
                           .water_cm = 1.42,
                           .depth_380 = 0.084 * std::pow(0.38 / 0.5, -1.14),
                           .depth_500 = 0.084};
  for (const SpectralRow& row : kSpectral) {
    const Angle elevation = Angle::degrees(90.0 - row.zenith_deg);
    const BirdSky sky = bird_and_hulstrom(row.zenith_deg, air);
    const PhotonSplit ours =
        photons(sky.global_w_m2 - sky.diffuse_w_m2, sky.diffuse_w_m2, 1367.0 * sin(elevation), elevation);
    const double ours_umol = ours.beam_umol + ours.sky_umol;
    EXPECT_NEAR(ours_umol, row.global_umol, (0.05 + 0.016) * row.global_umol) << row.zenith_deg;
    if (row.zenith_deg > 75.0) continue;
    EXPECT_NEAR(ours.sky_umol / ours_umol, row.diffuse_part, 0.05) << row.zenith_deg;
  }
}

struct Band {
  double global_w, direct_w, global_umol;
};

// ASTM G173-03 in 20 nm bands from 400 to 700 nm, W m-2 a band: global on a plane tilted 37 degrees,
// direct and circumsolar, photons of the global. Integrated from the standard's own table.
constexpr std::array<Band, 15> kG173{{{23.558, 18.176, 80.763},
                                      {23.876, 19.144, 85.837},
                                      {29.784, 24.602, 112.097},
                                      {31.380, 26.530, 123.299},
                                      {30.981, 26.670, 126.904},
                                      {30.329, 26.439, 129.271},
                                      {30.786, 27.095, 136.402},
                                      {30.544, 27.077, 140.427},
                                      {29.910, 26.720, 142.504},
                                      {29.444, 26.439, 145.194},
                                      {29.297, 26.404, 149.382},
                                      {28.516, 25.764, 150.181},
                                      {27.803, 25.153, 151.033},
                                      {28.119, 25.462, 157.491},
                                      {25.504, 23.140, 147.084}}};

TEST(Photons, AgreeWithAstmG173) {
  constexpr double global_w = 1000.371;  // 280-4000 nm
  constexpr double direct_w = 900.139;
  double global_umol = 0.0;
  double direct_umol = 0.0;
  for (const Band& band : kG173) {
    global_umol += band.global_umol;
    direct_umol += band.direct_w * band.global_umol / band.global_w;  // the yield of the band
  }
  ASSERT_NEAR(global_umol, 1977.868, 0.02);
  ASSERT_NEAR(direct_umol, 1735.2, 1.7);  // 0.1 %: the yield within a band is not quite even

  // The standard's sun stands at air mass 1.5, 48.19 degrees from the zenith, 11.19 off the plane.
  const double beam_w = direct_w * std::cos(11.19 * std::numbers::pi / 180.0);
  const Angle elevation = Angle::degrees(90.0 - 48.19);
  const PhotonSplit ours = photons(beam_w, global_w - beam_w, 1347.934, elevation);
  // The spread of the clear days behind the factor: 0.031 in 1.971.
  EXPECT_NEAR((ours.beam_umol + ours.sky_umol) / global_w, global_umol / global_w, 0.031);
  // Beam: the same, and the light around the sun, which Spitters counts to the sky and G173 to the
  // beam: 0.0127 of all photons, 1.5 % of the beam's.
  EXPECT_NEAR(ours.beam_umol / beam_w, direct_umol / direct_w, 0.031 + 0.015 * direct_umol / direct_w);
  EXPECT_LT(ours.beam_umol / beam_w, ours.sky_umol / (global_w - beam_w));
}

TEST(Photons, CloseAndStayFiniteForAnyInput) {
  std::mt19937_64 random(5);
  std::uniform_real_distribution<double> unit(0.0, 1.0);
  for (int i = 0; i < 10000; ++i) {
    const double elevation_deg = -1.0 + 91.0 * unit(random);
    const double above_w = 1400.0 * std::max(0.0, std::sin(elevation_deg * std::numbers::pi / 180.0));
    const double global = 1.2 * above_w * unit(random);
    const double sky = global * unit(random);
    const PhotonSplit split = photons(global - sky, sky, above_w, Angle::degrees(elevation_deg));
    ASSERT_TRUE(std::isfinite(split.beam_umol) && std::isfinite(split.sky_umol));
    ASSERT_GE(split.beam_umol, -1e-9 * global);
    ASSERT_GE(split.sky_umol, 0.0);
    ASSERT_GE(split.beam_umol + split.sky_umol, 1.971 * global * (1 - 1e-12));
    ASSERT_LE(split.beam_umol + split.sky_umol, 2.099 * global * (1 + 1e-12));
  }
  EXPECT_EQ(photons(0.0, 0.0, 500.0, Angle::degrees(30.0)).sky_umol, 0.0);
  // Twilight: light without a sun is overcast light, all from the sky.
  EXPECT_NEAR(photons(0.0, 1.0, 0.0, Angle::degrees(-1.0)).sky_umol, 2.099, 1e-12);
}

// Daily totals of whole years, every latitude that grows anything: the bounds of the design. Turbidity 2
// to 3 is clear air; 5 and more is haze, which at a low sun counts as cloud.
double umol_per_joule_of_day(const LightSeries& series, std::size_t day) {
  double umol = 0.0;
  double watts = 0.0;
  for (std::size_t i = day * kStepsPerDay; i < (day + 1) * kStepsPerDay; ++i) {
    umol += global_umol(series.steps[i]);
    watts += global_w(series.steps[i]);
  }
  return watts > 0.0 ? umol / watts : 0.0;
}

TEST(Photons, AreNear197AJouleOnClearDays) {
  for (const double latitude_deg : {-35.0, 0.0, 30.0, 52.0, 65.0}) {
    for (const double turbidity : {2.0, 3.0}) {
      ClearSource source;
      source.linke_turbidity.fill(turbidity);
      const LightSeries series = light_of(source, place_at(latitude_deg));
      for (std::size_t day = 0; day < 365; day += 7) {
        EXPECT_NEAR(umol_per_joule_of_day(series, day), 1.97, 0.03)
            << latitude_deg << ' ' << turbidity << ' ' << day;
      }
    }
  }
}

TEST(Photons, AreNear210AJouleOnOvercastDays) {
  for (const double latitude_deg : {-35.0, 0.0, 30.0, 52.0, 65.0}) {
    const Place place = place_at(latitude_deg);
    // A ninth of what comes in: overcast (height-free 0.30) even with the sun of December at 65 N, 2 degrees
    // high, where the height-free clearness is 2.7 times the plain one.
    MonthlyGlobalSource overcast;
    const LightSeries open = light_of(ClearSource{}, place);
    overcast.global_mj_m2_d = monthly_mean_mj_m2_d(
        open, [&open](std::size_t i) { return 0.11 * extraterrestrial_level_w_m2(open, i); });
    const LightSeries series = light_of(overcast, place);
    for (std::size_t day = 0; day < 365; day += 7) {
      EXPECT_NEAR(umol_per_joule_of_day(series, day), 2.10, 0.03) << latitude_deg << ' ' << day;
    }
  }
}

}  // namespace
}  // namespace sunfall

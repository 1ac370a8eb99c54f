// The all-weather sky on the dome: its shape against published radiances, and what must hold for
// every sky that a weather file could ask for.

#include "dome/sky_patch.h"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <numbers>

namespace sunfall {
namespace {

SkyDirection sun_at(double zenith_deg, double azimuth_deg = 137.0) {
  return direction({Angle::degrees(azimuth_deg)}, Angle::degrees(90.0 - zenith_deg));
}

void expect_sound(const std::vector<float>& fraction) {
  double sum = 0.0;
  for (const float value : fraction) {
    ASSERT_TRUE(std::isfinite(value));
    ASSERT_GE(value, 0.0F);
    sum += value;
  }
  ASSERT_NEAR(sum, 1.0, 1e-5);
}

// How much brighter a patch is than the same sky evened out: its fraction over its solid angle and sine.
double brightest(const std::vector<float>& fraction, const Dome& dome) {
  double most = 0.0;
  for (std::size_t k = 0; k < fraction.size(); ++k) {
    const double sine = (double(k % dome.bands) + 0.5) / dome.bands;
    const double even = 2.0 * sine / (double(dome.sectors) * dome.bands);
    most = std::max(most, fraction[k] / even);
  }
  return most;
}

// Published radiances (see perez_test.cpp) come back from the patches: fraction = l · sine · patch /
// integral. The patches of this dome are 1 degree wide.
TEST(SkyPatches, HoldThePublishedRadiance) {
  const Dome dome{360, 180, 1, 1};
  SkyPatches patches(dome);
  const SkyShape shape{-0.98304, -0.19868, 22.02504, -5.86461, 1.34516};
  constexpr double kIntegral = 2.16784;
  const std::vector<float>& fraction = patches.perez(shape, sun_at(30.0, 0.0));
  const int band = static_cast<int>(std::cos(std::numbers::pi / 4) * dome.bands);
  const double sine = (band + 0.5) / dome.bands;
  const double patch = 2.0 * std::numbers::pi / (dome.sectors * dome.bands);
  const auto radiance = [&](int sector) {
    return fraction[static_cast<std::size_t>(sector) * dome.bands + band] * kIntegral / (sine * patch);
  };
  // 45 degrees from the zenith, 0, 90 and 180 from the sun's azimuth. Half a degree off in azimuth and
  // 0.2 in elevation moves l by at most |dl/dgap| = 3.5 a radian · 0.2 degrees near the sun: 1.5 %.
  EXPECT_NEAR(radiance(0), 1.80399, 0.015 * 1.80399);
  EXPECT_NEAR(radiance(90), 0.41481, 0.01 * 0.41481);
  EXPECT_NEAR(radiance(180), 0.28361, 0.01 * 0.28361);
}

// The patches are equation 1 in floats. Their polynomials err by 3e-7; the gap is an arc cosine, whose
// float argument leaves 4e-5 of a radian at 2 degrees from the sun, times |d| = 6.
TEST(SkyPatches, AreTheEquation) {
  const Dome dome = Dome::of(DomeQuality::fine);
  SkyPatches patches(dome);
  const SkyShape s{-0.98304, -0.19868, 22.02504, -5.86461, 1.34516};
  const SkyDirection sun = sun_at(30.0);
  const std::vector<float>& fraction = patches.perez(s, sun);
  std::vector<double> light;
  double sum = 0.0;
  for (int sector = 0; sector < dome.sectors; ++sector) {
    const double azimuth = 2.0 * std::numbers::pi * (sector + 0.5) / dome.sectors;
    for (int band = 0; band < dome.bands; ++band) {
      const double up = (band + 0.5) / dome.bands, flat = std::sqrt(1.0 - up * up);
      const double cosine =
          up * sun.up + flat * (std::sin(azimuth) * sun.east + std::cos(azimuth) * sun.north);
      light.push_back(up * (1.0 + s.a * std::exp(s.b / up)) *
                      (1.0 + s.c * std::exp(s.d * std::acos(cosine)) + s.e * cosine * cosine));
      sum += light.back();
    }
  }
  for (std::size_t k = 0; k < fraction.size(); ++k) {
    ASSERT_NEAR(fraction[k], light[k] / sum, 3e-4 * light[k] / sum) << k;
  }
  // Away from the sun, where the gap is not at stake.
  for (int band = 0; band < dome.bands; ++band) {
    const int opposite = (137 + 180) * dome.sectors / 360 % dome.sectors;
    const std::size_t k = static_cast<std::size_t>(opposite) * dome.bands + band;
    ASSERT_NEAR(fraction[k], light[k] / sum, 2e-6 * light[k] / sum) << band;
  }
}

// Diffuse from a trace to all there is, beam from none to the extraterrestrial, the sun from the zenith
// to below the horizon; many of them no real sky.
//
// Nothing absurdly concentrated: by equation 1 a radiance exceeds the darkest by at most (1 + c + e)
// times the span of the horizon term. Table 1 reaches c + e = 33 (class 8, a faint sky, high sun),
// gathered within 1 / |d| of the sun; the level's mean is at least that of the background. A sky 70
// times brighter somewhere than its mean is a runaway exponent, not weather.
TEST(SkyPatches, EveryWeatherGivesASoundSky) {
  double most = 0.0;
  for (const DomeQuality quality : {DomeQuality::draft, DomeQuality::standard}) {
    const Dome dome = Dome::of(quality);
    SkyPatches patches(dome);
    for (const double diffuse : {1e-6, 0.1, 1.0, 5.0, 20.0, 60.0, 120.0, 250.0, 450.0, 700.0, 1000.0}) {
      for (const double beam :
           {0.0, 1e-3, 1.0, 10.0, 40.0, 100.0, 200.0, 350.0, 550.0, 800.0, 1000.0, 1361.0}) {
        for (const double zenith :
             {0.0, 5.0, 20.0, 35.0, 50.0, 60.0, 70.0, 78.0, 84.0, 87.0, 89.0, 89.9, 90.0, 90.5}) {
          const SkyState state{diffuse, beam, 1361.0, Angle::degrees(zenith)};
          const SkyShape shape = perez_shape(sky_indices(state), state.sun_zenith);
          const std::vector<float>& fraction = patches.perez(shape, sun_at(zenith));
          expect_sound(fraction);
          const double here = brightest(fraction, dome);
          ASSERT_LT(here, 70.0) << "Ed " << diffuse << " En " << beam << " Z " << zenith;
          most = std::max(most, here);
        }
      }
    }
  }
  EXPECT_GT(most, 8.0) << "the sky around the sun has gone missing";
  RecordProperty("brightest", std::to_string(most));
}

// Shapes that no guard has seen: negative, overflowing and undefined numbers.
TEST(SkyPatches, NoShapeBreaksTheSum) {
  SkyPatches patches(Dome::of(DomeQuality::draft));
  const double nan = std::numeric_limits<double>::quiet_NaN(), huge = 1e30;
  for (const SkyShape& shape : {SkyShape{-5, 3, 0, -1, 0}, SkyShape{-50, -0.01, -90, 2, -3},
                                SkyShape{1, huge, 1, huge, 1}, SkyShape{huge, -1, huge, -1, huge},
                                SkyShape{nan, nan, nan, nan, nan}, SkyShape{-huge, -0.1, 5, -1, 0}}) {
    expect_sound(patches.perez(shape, sun_at(40.0)));
  }
}

// The guard leaves the published skies alone where they are sound. Rows of the check values in classes
// 1, 3, 4, 7 and 8 and one of class 6 lie there.
TEST(SkyPatches, TheGuardLeavesSoundSkiesAlone) {
  struct Row {
    double zenith_deg, diffuse, beam;
  };
  for (const Row& row :
       {Row{30, 100, 850}, {60, 80, 700}, {45, 300, 0}, {45, 250, 150}, {60, 200, 250}, {45, 150, 500}}) {
    const Angle zenith = Angle::degrees(row.zenith_deg);
    const SkyIndices indices = sky_indices({row.diffuse, row.beam, 1367.0, zenith});
    const SkyShape with = perez_shape(indices, zenith), without = perez_shape_unguarded(indices, zenith);
    EXPECT_EQ(with.a, without.a);
    EXPECT_EQ(with.b, without.b);
    EXPECT_EQ(with.c, without.c);
    EXPECT_EQ(with.d, without.d);
    EXPECT_EQ(with.e, without.e);
  }
}

// Outside the region the published form itself is broken: most of its light is negative, or it is not
// finite. If this test fails the guard has become needless.
TEST(SkyPatches, TheGuardedRegionIsBroken) {
  const auto negative_part = [](const SkyIndices& indices, Angle zenith) {
    const SkyShape s = perez_shape_unguarded(indices, zenith);
    double negative = 0.0, all = 0.0;
    for (int band = 0; band < 60; ++band) {
      const double sine = (band + 0.5) / 60;
      const double value = (1.0 + s.a * std::exp(s.b / sine)) * sine;
      (value < 0.0 ? negative : all) += std::abs(value);
    }
    return negative / (negative + all);
  };
  EXPECT_GT(negative_part({1.15, 0.08}, Angle::degrees(75)), 0.3);
  EXPECT_GT(negative_part({1.36, 0.05}, Angle::degrees(30)), 0.9);
  EXPECT_GT(negative_part({1.70, 0.08}, Angle::degrees(5)), 0.9);
  EXPECT_GT(negative_part({2.40, 0.08}, Angle::degrees(60)), 0.9);
  EXPECT_GT(negative_part({3.60, 0.04}, Angle::degrees(5)), 0.9);
  EXPECT_GT(negative_part({8.00, 0.40}, Angle::degrees(60)), 0.9);
}

// The light around the sun moves with it.
TEST(SkyPatches, BrightestTowardsTheSun) {
  const Dome dome = Dome::of(DomeQuality::fine);
  SkyPatches patches(dome);
  for (const double azimuth : {0.5, 90.0, 213.0, 359.0}) {
    const SkyState state{100.0, 700.0, 1361.0, Angle::degrees(55.0)};
    const std::vector<float>& fraction =
        patches.perez(perez_shape(sky_indices(state), state.sun_zenith), sun_at(55.0, azimuth));
    const auto at = std::max_element(fraction.begin(), fraction.end()) - fraction.begin();
    const double sector = 360.0 * (double(at / dome.bands) + 0.5) / dome.sectors;
    EXPECT_LE(std::abs(std::remainder(sector - azimuth, 360.0)), 360.0 / dome.sectors) << azimuth;
  }
}

}  // namespace
}  // namespace sunfall

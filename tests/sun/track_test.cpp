#include <gtest/gtest.h>

#include <numbers>
#include <random>

#include "sun/observer.h"
#include "sun/positive_mean.h"
#include "sun/utc.h"
#include "sunfall/sun.h"

namespace sunfall {
namespace {

constexpr double kDegree = 180.0 / std::numbers::pi;
constexpr std::chrono::seconds kTenMinutes{600};

const Place kWageningen{Angle::degrees(51.9692), Angle::degrees(5.6654), 10};
const Place kTromso{Angle::degrees(69.6492), Angle::degrees(18.9553), 5};
const Place kQuito{Angle::degrees(-0.1807), Angle::degrees(-78.4678), 2850};

double distance(const SkyDirection& a, const SkyDirection& b) {
  return std::sqrt(std::pow(a.east - b.east, 2) + std::pow(a.north - b.north, 2) + std::pow(a.up - b.up, 2));
}

TEST(PositiveMean, IsExactForParabolas) {
  EXPECT_DOUBLE_EQ(positive_mean(1.0, 1.0, 1.0), 1.0);
  EXPECT_DOUBLE_EQ(positive_mean(-1.0, -1.0, -1.0), 0.0);
  EXPECT_DOUBLE_EQ(positive_mean(-1.0, 0.0, 1.0), 0.25);  // a line through the middle
  EXPECT_DOUBLE_EQ(positive_mean(1.0, 0.0, -1.0), 0.25);
  EXPECT_DOUBLE_EQ(positive_mean(1.0, 0.0, 1.0), 1.0 / 3.0);      // x²
  EXPECT_NEAR(positive_mean(-3.0, 1.0, -3.0), 1.0 / 3.0, 1e-15);  // 1 - 4x²: a hump from -1/2 to 1/2
  EXPECT_NEAR(positive_mean(3.0, -1.0, 3.0), 4.0 / 3.0 - 1.0 + 1.0 / 3.0, 1e-15);  // the same, upside down
}

// Brute force: a thousand samples on each of random parabolas.
TEST(PositiveMean, AgreesWithBruteForce) {
  std::mt19937_64 random(7);
  std::uniform_real_distribution<double> value(-1.0, 1.0);
  for (int i = 0; i < 500; ++i) {
    const double left = value(random);
    const double middle = value(random);
    const double right = value(random);
    double sum = 0.0;
    constexpr int samples = 1000;
    for (int k = 0; k < samples; ++k) {
      const double x = -1.0 + (2.0 * k + 1.0) / samples;
      sum += std::max(0.0, (0.5 * (left + right) - middle) * x * x + 0.5 * (right - left) * x + middle);
    }
    // The midpoint rule errs by at most h²/24 |p''| + h/8 |p'| h at a kink: below 1e-5 for h = 0.002.
    EXPECT_NEAR(positive_mean(left, middle, right), sum / samples, 1e-5)
        << left << ' ' << middle << ' ' << right;
  }
}

TEST(SunTrack, InterpolatesTheFullModel) {
  for (const Place& place : {kWageningen, kTromso, kQuito}) {
    const UtcTime begin = utc(2024, 1, 1);
    const SunTrack track = sun_track(begin, kTenMinutes, 366 * 144, place);
    ASSERT_EQ(track.edges.size(), track.size() + 1);
    for (std::size_t i = 0; i < track.edges.size(); i += 997) {
      const UtcTime time = begin + kTenMinutes * static_cast<long long>(i);
      const SunPosition sun = sun_position(time, place);
      EXPECT_LT(distance(track.edges[i], direction(sun.azimuth, sun.apparent_elevation)) * kDegree, 1e-5)
          << i;
    }
  }
}

// The mean sine against 600 samples of the full path in the step: the brute-force oracle.
TEST(SunTrack, MeansTheSineOverTheStep) {
  for (const Place& place : {kWageningen, kTromso, kQuito}) {
    const UtcTime begin = utc(2025, 1, 14);
    const std::size_t steps = 2 * 144;
    const SunTrack track = sun_track(begin, kTenMinutes, steps, place);
    const SunPath path(begin, begin + kTenMinutes * static_cast<long long>(steps));
    const Observer observer(place);
    for (std::size_t i = 0; i < steps; ++i) {
      double sum = 0.0;
      for (int k = 0; k < 600; ++k) {
        const double time_s = unix_seconds(begin) + static_cast<double>(i) * 600.0 + k + 0.5;
        sum += std::max(0.0, observer.geometric(path.at(time_s), time_s).up);
      }
      // The oracle's own kink error is far below; the track keeps a float.
      EXPECT_NEAR(track.mean_sine[i], sum / 600.0, 1e-6) << i;
    }
  }
}

TEST(SunTrack, HoldsForLongSteps) {
  const UtcTime begin = utc(2025, 6, 1);
  const SunTrack fine = sun_track(begin, kTenMinutes, 24 * 6, kWageningen);
  const SunTrack coarse = sun_track(begin, std::chrono::hours{3}, 8, kWageningen);
  for (std::size_t i = 0; i < coarse.size(); ++i) {
    double sum = 0.0;
    for (std::size_t k = 0; k < 18; ++k) sum += fine.mean_sine[18 * i + k];
    EXPECT_NEAR(coarse.mean_sine[i], sum / 18.0, 1e-5) << i;
  }
}

TEST(SunTrack, KnowsHowStrongTheSunIs) {
  const SunTrack track = sun_track(utc(2024, 1, 15, 12), kTenMinutes, 1, kWageningen);
  // R = 0.983651 au on 15 January 2024 (astropy 5.2.1).
  EXPECT_NEAR(track.normal_w_m2[0], 1361.0 / (0.983651 * 0.983651), 0.03);
  EXPECT_TRUE(sun_track(utc(2024, 1, 1), kTenMinutes, 0, kWageningen).mean_sine.empty());
}

}  // namespace
}  // namespace sunfall

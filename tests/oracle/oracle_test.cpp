// The oracle itself against closed forms: a test that leans on it is worth no more than it is.

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

#include "light/series_checks.h"
#include "map/scene.h"
#include "oracle/oracle_light.h"
#include "oracle/ray_surface.h"

namespace sunfall::oracle {
namespace {

using testing::Scene;
using testing::SceneOptions;

RayHorizon even_horizon(double elevation_deg, int azimuths = 720) {
  return {std::vector<float>(azimuths, static_cast<float>(elevation_deg * std::numbers::pi / 180.0))};
}

// A wall 10 m high whose top edge is the first wall cell's centre, 20 m to the east: at azimuth A its
// horizon is atan(height · sin A / distance). Halving stops at 0.006 degrees; the Earth's curve adds 1e-4.
TEST(RaySurface, WallHorizonIsItsArcTangent) {
  SceneOptions options;
  options.columns = options.rows = 301;
  Scene scene([](double, double) { return 0.0; },
              [](double east, double) { return east > 19.5 ? 10.5 : 0.0; }, options);
  for (const Diagonal diagonal : {Diagonal::falling, Diagonal::rising}) {
    const RaySurface surface(scene.terrain(), diagonal);
    const RayHorizon horizon = surface.horizon({150, 150}, 0.5, 720);
    for (const int azimuth_deg : {30, 45, 60, 90, 120, 137}) {
      const double expected = std::atan(10.0 * std::sin(azimuth_deg * std::numbers::pi / 180.0) / 20.0);
      EXPECT_NEAR(horizon.elevation[2 * azimuth_deg], expected, 1.2e-4) << azimuth_deg;
    }
    for (const int azimuth_deg : {180, 200, 270, 359})
      EXPECT_NEAR(horizon.elevation[2 * azimuth_deg], 0.0, 1.2e-4);
  }
}

TEST(OracleLight, OpenHorizonHidesNothing) {
  const OracleLight light(light_of(ClearSource{}, place_at(52.0)), SkyModel::clearness, Angle());
  const MonthShares shares = light.under(even_horizon(0.0));
  for (int month = 0; month < 12; ++month) {
    EXPECT_EQ(shares.beam[month], 1.0);
    EXPECT_EQ(shares.sky[month], 1.0);
  }
}

// In a basin of an even horizon a uniform sky leaves cos² of it; the overcast one 1 - (3 s² + 4 s³) / 7.
TEST(OracleLight, BasinUnderKnownSkies) {
  const LightSeries series = light_of(ClearSource{}, place_at(52.0));
  for (const double elevation_deg : {10.0, 30.0, 45.0}) {
    const double s = std::sin(elevation_deg * std::numbers::pi / 180.0);
    const MonthShares uniform =
        OracleLight(series, SkyModel::isotropic, Angle()).under(even_horizon(elevation_deg));
    const MonthShares overcast =
        OracleLight(series, SkyModel::overcast, Angle()).under(even_horizon(elevation_deg));
    // Bands are 1/90 of the sine; a float keeps the sums of 360 azimuths to 1e-5.
    EXPECT_NEAR(uniform.sky[5], 1.0 - s * s, 2e-5);
    EXPECT_NEAR(overcast.sky[5], 1.0 - (3.0 * s * s + 4.0 * s * s * s) / 7.0, 2e-4);
  }
}

// The beam under an even horizon is the light of the minutes when the sun stands higher. Here by the
// steps' own edges: a step counts by the part of its sines that lies above.
TEST(OracleLight, BasinHidesTheLowSun) {
  const LightSeries series = light_of(ClearSource{}, place_at(40.0));
  const OracleLight light(series, SkyModel::isotropic, Angle());
  const double limit = std::sin(15.0 * std::numbers::pi / 180.0);
  double all = 0.0, above = 0.0;
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    if (month_of_step(series, i) != 2) continue;
    const double low = std::min(series.sun.edges[i].up, series.sun.edges[i + 1].up);
    const double high = std::max(series.sun.edges[i].up, series.sun.edges[i + 1].up);
    all += series.steps[i].beam_umol;
    if (high > limit) above += series.steps[i].beam_umol * std::min(1.0, (high - limit) / (high - low));
  }
  // Steps across the limit: two a day of about seventy, their light even or rising within: 1e-4.
  EXPECT_NEAR(light.under(even_horizon(15.0)).beam[2], above / all, 3e-4);
}

}  // namespace
}  // namespace sunfall::oracle

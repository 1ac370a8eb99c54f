// Beam on receivers in the plane of an endless slope against direct integration of the sun's track.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "map/map_run.h"

namespace sunfall::testing {
namespace {

struct Slope {
  double steepness_deg;
  double facing_deg;  // the azimuth that it faces, true
};

SkyDirection between(const SkyDirection& from, const SkyDirection& to, double part) {
  SkyDirection d{from.east + part * (to.east - from.east), from.north + part * (to.north - from.north),
                 from.up + part * (to.up - from.up)};
  const double length = std::sqrt(d.east * d.east + d.north * d.north + d.up * d.up);
  return {d.east / length, d.north / length, d.up / length};
}

// Beam on the slope over beam on the level, by month: within a step the normal beam is even, so
// the slope gets mean(cos of incidence) / mean(sine of elevation) of the level's, both counted only
// where positive.
std::vector<double> direct_ratios(const LightSeries& series, const Slope& slope) {
  const Angle steepness = Angle::degrees(slope.steepness_deg), facing = Angle::degrees(slope.facing_deg);
  const SkyDirection normal{sin(steepness) * sin(facing), sin(steepness) * cos(facing), cos(steepness)};
  constexpr int kPieces = 40;
  std::vector<double> on_slope(12, 0.0), on_level(12, 0.0);
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const double beam = series.steps[i].beam_umol;
    if (beam <= 0.0) continue;
    double incidence = 0.0, sine = 0.0;
    for (int k = 0; k < kPieces; ++k) {
      const SkyDirection sun = between(series.sun.edges[i], series.sun.edges[i + 1], (k + 0.5) / kPieces);
      if (sun.up <= 0.0) continue;
      sine += sun.up;
      incidence += std::max(0.0, sun.east * normal.east + sun.north * normal.north + sun.up * normal.up);
    }
    const auto month = static_cast<std::size_t>(month_of_step(series, i));
    on_level[month] += beam;
    if (sine > 0.0) on_slope[month] += beam * incidence / sine;
  }
  for (std::size_t m = 0; m < 12; ++m) on_slope[m] /= on_level[m];
  return on_slope;
}

void compare(int epsg, double longitude_deg, double latitude_deg, const Slope& slope, double tolerance) {
  SceneOptions options;
  options.columns = options.rows = 40;
  options = centred(options, epsg, longitude_deg, latitude_deg);
  const Angle facing = Angle::degrees(slope.facing_deg);
  const double fall = tan(Angle::degrees(slope.steepness_deg));
  Scene scene([&](double east, double north) { return -fall * (east * sin(facing) + north * cos(facing)); },
              {}, options);
  Plan plan = clear_plan(scene, options);
  plan.dome = {DomeQuality::standard, SkyModel::isotropic};
  const PlanLight light = light_of_plan(plan);
  const TileShares shares = whole_shares(scene, light.dome, ReceiverPlane::ground);
  const std::vector<double> expected = direct_ratios(light.site.series, slope);
  const std::size_t middle = 20 * 40 + 20;
  for (std::size_t m = 0; m < 12; ++m) {
    EXPECT_NEAR(shares.of(middle)[m] / expected[m], 1.0, tolerance)
        << "month " << m + 1 << ", " << slope.steepness_deg << " degrees facing " << slope.facing_deg
        << " at " << latitude_deg;
  }
}

constexpr double kWithin = 0.003;

TEST(Slope, BeamOnASlopeThatFacesTheEquator) {
  compare(25831, 3.0, 52.0, {10.0, 180.0}, kWithin);
  compare(25831, 3.0, 52.0, {30.0, 180.0}, kWithin);
  compare(32734, 21.0, -34.0, {20.0, 0.0}, kWithin);
}

TEST(Slope, BeamOnASlopeThatFacesAside) {
  compare(25831, 3.0, 52.0, {25.0, 90.0}, kWithin);
  compare(25831, 3.0, 52.0, {25.0, 225.0}, kWithin);
}

}  // namespace
}  // namespace sunfall::testing

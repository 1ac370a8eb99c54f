// The shadow of a post at exact sun directions: length h / tan(elevation), pointing away from the
// sun (published values: h = 3 m at 10, 20, 30, 45 degrees: 17.01, 8.24, 5.20, 3.00 m).

#include <gtest/gtest.h>

#include <cmath>

#include "dome/horizon_steps.h"
#include "map/scene.h"
#include "shade/horizon_sweep.h"

namespace sunfall::testing {
namespace {

constexpr double kCell = 0.25;

// Metres from the post's middle to the end of its shadow along the direction away from the sun.
double shadow_length(double azimuth_deg, double elevation_deg, double height, double reach) {
  SceneOptions options;
  options.columns = options.rows = 240;
  options.cell_m = kCell;
  const Height post = [&](double e, double n) {
    return std::abs(e) < 0.5 && std::abs(n) < 0.5 ? height : 0.0;
  };
  Scene scene([](double, double) { return 0.0; }, post, options);
  const TerrainTile tile = scene.terrain().tile({0, 0, 240, 240});
  HorizonSweep sweep(tile, {kCell});
  const GridAzimuth sun{Angle::degrees(azimuth_deg)};
  std::vector<std::uint16_t> steps(tile.usable.size());
  sweep.look_near(sun);
  sweep.look_far(sun, steps.data());
  const double a = azimuth_deg * std::numbers::pi / 180.0;
  double last = 0.0;
  for (double along = 1.0; along < reach; along += kCell / 2) {
    const CellIndex cell = scene.cell(-std::sin(a) * along, -std::cos(a) * along);
    const std::size_t place = by_columns(heading_of(sun)) ? std::size_t(cell.column) * 240 + cell.row
                                                          : std::size_t(cell.row) * 240 + cell.column;
    const double horizon = std::atan(double(step_tangent(steps[place]))) * 180.0 / std::numbers::pi;
    if (horizon > elevation_deg) last = along;
  }
  return last;
}

TEST(Shadow, LengthAndDirectionOfAPost) {
  const double height = 3.0;
  const double published[][2] = {{10, 17.01385}, {20, 8.24243}, {30, 5.19615}, {45, 3.0}};
  for (const auto& [elevation, length] : published) {
    EXPECT_NEAR(height / std::tan(elevation * std::numbers::pi / 180.0), length, 1e-4);
    for (const double azimuth : {0.0, 35.0, 90.0, 145.0, 180.0, 225.0, 270.0, 310.0}) {
      // The post's far side casts the end: half its depth along the ray, between 0.5 and 0.71 m,
      // less nothing, plus the width of a horizon step at that elevation and two cells.
      const double step_m = length * 0.012;
      const double found = shadow_length(azimuth, elevation, height, 24.0);
      EXPECT_GE(found, length - 0.71 - step_m - 2 * kCell) << "sun " << azimuth << " at " << elevation;
      EXPECT_LE(found, length + 0.71 + step_m + 2 * kCell) << "sun " << azimuth << " at " << elevation;
    }
  }
}

}  // namespace
}  // namespace sunfall::testing

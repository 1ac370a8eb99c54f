// Receivers in the plane of an endless slope see (1 + cos steepness) / 2 of an even sky (Liu and Jordan
// 1963), whether or not their neighbours lie on the map.

#include <gtest/gtest.h>

#include <cmath>

#include "map/scene.h"

namespace sunfall::testing {
namespace {

TEST(SlopeEdge, CellsAtTheMapsEdgeLieInTheSlope) {
  SceneOptions options;
  options.columns = options.rows = 40;
  const double steepness = std::numbers::pi / 6.0;
  for (const double azimuth : {0.3, 2.0, 3.8, 5.5}) {
    const auto plane = [&](double east, double north) {
      return std::tan(steepness) * (east * std::sin(azimuth) + north * std::cos(azimuth));
    };
    Scene scene(plane, {}, options);
    const TileSolver solver(scene.terrain(), even_sky(Dome::of(DomeQuality::standard)),
                            ReceiverPlane::ground);
    const double expected = (1.0 + std::cos(steepness)) / 2.0;
    for (const double east : {-19.5, 0.5, 19.5}) {
      for (const double north : {-19.5, 0.5, 19.5}) {
        EXPECT_NEAR(share_at(scene, solver, east, north, kSkyColumn), expected, 0.005)
            << "azimuth " << azimuth << " at " << east << ", " << north;
      }
    }
  }
}

}  // namespace
}  // namespace sunfall::testing

// Sky view of level receivers against closed forms (Howell's catalogue of configuration factors and
// textbook derivations), at the standard dome. A raster's wall stands between the last cell of the
// floor and the first of the wall; its top edge is the centre of that first cell.

#include <gtest/gtest.h>

#include <cmath>

#include "map/scene.h"

namespace sunfall::testing {
namespace {

constexpr double kHalfPercent = 0.005;

// Sky view at a place of a scene of solid surface on flat ground.
double sky_view(const Height& surface, double east, double north, Angle convergence = Angle(),
                int cells = 400) {
  SceneOptions options;
  options.columns = options.rows = cells;
  Scene scene([](double, double) { return 0.0; }, surface, options);
  const TileSolver solver(scene.terrain(), even_sky(Dome::of(DomeQuality::standard)), ReceiverPlane::level);
  return share_at(scene, solver, east, north, kSkyColumn, convergence);
}

// Distance of a place from a line through the middle with the given azimuth, positive to its right.
double beside(double east, double north, double azimuth_deg) {
  const double a = azimuth_deg * std::numbers::pi / 180.0;
  return east * std::cos(a) - north * std::sin(a);
}

TEST(SkyView, OpenFlatGroundSeesAll) {
  EXPECT_DOUBLE_EQ(sky_view([](double, double) { return 0.0; }, 0.5, 0.5), 1.0);
}

// (1 + d / sqrt(d² + H²)) / 2, less what the wall's finite length in the map leaves open at its ends
// (below 1e-4 here: the wall subtends 360 m at 20 m at most).
TEST(SkyView, InfiniteWall) {
  for (const double height : {10.0, 20.0}) {
    for (const int distance : {5, 10, 20, 40}) {
      // First wall cell's centre stands at east = 0.5 + distance from the receiver's at 0.5.
      const Height wall = [&](double east, double) { return east > distance ? height : 0.0; };
      const double expected = (1.0 + distance / std::hypot(distance, height)) / 2.0;
      EXPECT_NEAR(sky_view(wall, 0.5, 0.5), expected, kHalfPercent) << "H " << height << " d " << distance;
    }
  }
}

// Published values (reference library of configuration factors): centre of the floor 1/sqrt(1 + (2H/W)²).
TEST(SkyView, InfiniteCanyonCentre) {
  const double width = 40.0;
  for (const double height : {20.0, 40.0, 80.0}) {
    const Height canyon = [&](double east, double) {
      return std::abs(east - 0.5) > width / 2 - 0.5 ? height : 0.0;
    };
    const double expected = 1.0 / std::sqrt(1.0 + std::pow(2.0 * height / width, 2));
    EXPECT_NEAR(sky_view(canyon, 0.5, 0.5, Angle(), 600), expected, kHalfPercent) << "H " << height;
  }
}

// A canyon turned to any azimuth, and any convergence, looks the same. Its edges are those of the
// raster, so the width is that between the first wall cells' centres: within half a cell.
TEST(SkyView, CanyonAtAnyAzimuth) {
  const double width = 60.0, height = 30.0;
  const auto expected = [&](double w) { return 1.0 / std::sqrt(1.0 + std::pow(2.0 * height / w, 2)); };
  // Walls of cells whose centres lie beyond the edge: the top edge stands up to one cell farther.
  const double low = expected(width) - kHalfPercent, high = expected(width + 2.0) + kHalfPercent;
  for (const double azimuth : {0.0, 10.0, 22.5, 33.0, 45.0, 60.0, 77.0, 90.0, 120.0, 155.0}) {
    const Height canyon = [&](double east, double north) {
      return std::abs(beside(east - 0.5, north - 0.5, azimuth)) >= width / 2 ? height : 0.0;
    };
    for (const double convergence : {0.0, 3.0}) {
      const double view = sky_view(canyon, 0.5, 0.5, Angle::degrees(convergence), 500);
      EXPECT_GE(view, low) << azimuth << " convergence " << convergence;
      EXPECT_LE(view, high) << azimuth << " convergence " << convergence;
    }
  }
}

// A basin with an even horizon t sees cos² t: a flat floor of 50 m radius within a rim. The raster's
// rim stands up to a cell behind the circle, half a cell on average.
TEST(SkyView, Basin) {
  for (const double angle : {10.0, 30.0, 45.0}) {
    const double tangent = std::tan(angle * std::numbers::pi / 180.0);
    const Height cone = [&](double east, double north) {
      return std::hypot(east - 0.5, north - 0.5) < 50.0 ? 0.0 : 50.5 * tangent;
    };
    const double cosine = std::cos(angle * std::numbers::pi / 180.0);
    SceneOptions options;
    options.columns = options.rows = 300;
    Scene scene(cone, {}, options);
    const TileSolver solver(scene.terrain(), even_sky(Dome::of(DomeQuality::standard)), ReceiverPlane::level);
    EXPECT_NEAR(share_at(scene, solver, 0.5, 0.5, kSkyColumn), cosine * cosine, kHalfPercent) << angle;
  }
}

// On an endless slope a level receiver sees (1 + cos S) / 2 of an even sky: the part of the
// hemisphere above the slope's own plane, projected on the level.
TEST(SkyView, SlopeLevelAndInItsPlane) {
  for (const double angle : {10.0, 25.0, 40.0}) {
    for (const double facing : {0.0, 30.0, 135.0, 200.0}) {
      const double tangent = std::tan(angle * std::numbers::pi / 180.0),
                   a = facing * std::numbers::pi / 180.0;
      const Height slope = [&](double east, double north) {
        return -tangent * (east * std::sin(a) + north * std::cos(a));
      };
      SceneOptions options;
      options.columns = options.rows = 400;
      Scene scene(slope, {}, options);
      const double expected = (1.0 + std::cos(angle * std::numbers::pi / 180.0)) / 2.0;
      const DomeLight light = even_sky(Dome::of(DomeQuality::standard));
      const TileSolver level(scene.terrain(), light, ReceiverPlane::level);
      EXPECT_NEAR(share_at(scene, level, 0.5, 0.5, kSkyColumn), expected, kHalfPercent)
          << angle << " facing " << facing;
      // In the plane of the slope the open part is the same by symmetry of the two planes.
      const TileSolver plane(scene.terrain(), light, ReceiverPlane::ground);
      EXPECT_NEAR(share_at(scene, plane, 0.5, 0.5, kSkyColumn), expected, kHalfPercent)
          << angle << " facing " << facing;
    }
  }
}

// A wall of 10 × 2 m seen from its middle at distance d: 1 - 2 F, F the factor from a level element
// to the perpendicular rectangle whose corner stands before it, summed for both halves.
double corner_factor(double height, double half_width, double distance) {
  const double x = height / half_width, y = distance / half_width;
  const double root = std::sqrt(x * x + y * y);
  return (std::atan(1.0 / y) - y / root * std::atan(1.0 / root)) / (2.0 * std::numbers::pi);
}

TEST(SkyView, FiniteWall) {
  // Published: d = 1, 2, 3, 10 → 0.726576, 0.858800, 0.922580, 0.994700 (checks the formula).
  EXPECT_NEAR(1.0 - 2.0 * corner_factor(2.0, 5.0, 1.0), 0.726576, 1e-5);
  EXPECT_NEAR(1.0 - 2.0 * corner_factor(2.0, 5.0, 3.0), 0.922580, 1e-5);
  // On the raster ten times as large: 100 m long, 20 m high, at 10 m to 100 m.
  for (const int distance : {10, 20, 30, 100}) {
    const Height wall = [&](double east, double north) {
      return east > distance && east < distance + 2 && std::abs(north - 0.5) <= 50.0 ? 20.0 : 0.0;
    };
    EXPECT_NEAR(sky_view(wall, 0.5, 0.5), 1.0 - 2.0 * corner_factor(20.0, 50.0, distance), kHalfPercent)
        << distance;
  }
}

TEST(SkyView, MoreObstaclesNeverMoreLight) {
  const Height one = [](double east, double north) { return std::hypot(east - 20, north) < 4 ? 8.0 : 0.0; };
  const Height two = [&](double east, double north) {
    return std::max(one(east, north), std::hypot(east + 9, north - 30) < 6 ? 12.0 : 0.0);
  };
  SceneOptions options;
  options.columns = options.rows = 200;
  const DomeLight light = even_sky(Dome::of(DomeQuality::standard));
  Scene fewer([](double, double) { return 0.0; }, one, options),
      more([](double, double) { return 0.0; }, two, options);
  const TileSolver first(fewer.terrain(), light, ReceiverPlane::level),
      second(more.terrain(), light, ReceiverPlane::level);
  const CellWindow window{40, 40, 120, 120};
  const TileShares a = first.solve(fewer.terrain().tile(window), Angle()),
                   b = second.solve(more.terrain().tile(window), Angle());
  for (std::size_t cell = 0; cell < a.usable.size(); ++cell) {
    if (a.usable[cell] && b.usable[cell]) {
      ASSERT_LE(b.of(cell)[kSkyColumn], a.of(cell)[kSkyColumn]);
    }
    ASSERT_LE(a.of(cell)[kSkyColumn], 1.0F);
  }
}

}  // namespace
}  // namespace sunfall::testing

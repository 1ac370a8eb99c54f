// The solid scene: levels, gaps, receivers, far ground.

#include <gtest/gtest.h>

#include <cmath>

#include "geo/geodesy.h"
#include "map/scene.h"
#include "map/sight.h"
#include "shade/horizon_kernel.h"
#include "sunfall/error.h"

namespace sunfall::testing {
namespace {

TEST(Terrain, CoarserLevelsKeepTheHighestCell) {
  SceneOptions options;
  options.columns = 37;
  options.rows = 21;
  Scene scene([](double e, double n) { return 100.0 + e + 3.0 * n; }, {}, options);
  const LevelGrid fine = scene.terrain().level_grid(0, {0, 0, 37, 21});
  for (int level = 1; level <= 5; ++level) {
    const int size = 1 << level;
    const LevelGrid coarse = scene.terrain().level_grid(level, {0, 0, (36 >> level) + 1, (20 >> level) + 1});
    for (int row = 0; row < coarse.window.rows; ++row) {
      for (int column = 0; column < coarse.window.columns; ++column) {
        float highest = kNothing;
        for (int r = row * size; r < std::min(21, (row + 1) * size); ++r) {
          for (int c = column * size; c < std::min(37, (column + 1) * size); ++c) {
            highest = std::max(highest, fine.heights[static_cast<std::size_t>(r) * 37 + c]);
          }
        }
        EXPECT_EQ(coarse.heights[static_cast<std::size_t>(row) * coarse.window.columns + column], highest);
      }
    }
  }
}

TEST(Terrain, BeyondTheMapNothingIsKnown) {
  SceneOptions options;
  options.columns = options.rows = 10;
  Scene scene([](double, double) { return 50.0; }, {}, options);
  for (int level = 0; level < 4; ++level) {
    const LevelGrid grid = scene.terrain().level_grid(level, {-3, -3, 2, 2});
    for (const float height : grid.heights) EXPECT_EQ(height, kNothing) << level;
  }
}

TEST(Terrain, NoReceiverUnderSolidOrOnUnknownGround) {
  SceneOptions options;
  options.columns = options.rows = 20;
  options.receiver_height_m = 0.5;
  Scene scene([](double e, double) { return e > 5.0 ? std::nan("") : 2.0; },
              [](double e, double n) {
                return e > 5.0 ? std::nan("") : std::hypot(e + 4, n) < 3.0 ? 6.0 : 2.4;
              },
              options);
  const TerrainTile tile = scene.terrain().tile({0, 0, 20, 20});
  for (int row = 0; row < 20; ++row) {
    for (int column = 0; column < 20; ++column) {
      const double e = column - 9.5, n = 9.5 - row;
      const bool expected = e <= 5.0 && std::hypot(e + 4, n) >= 3.0;
      EXPECT_EQ(tile.usable[static_cast<std::size_t>(row) * 20 + column] != 0, expected) << e << " " << n;
    }
  }
  EXPECT_NEAR(scene.terrain().valid_fraction(), 15.0 / 20.0, 1e-9);
}

TEST(Terrain, AllNodataIsAnError) {
  SceneOptions options;
  options.columns = options.rows = 8;
  EXPECT_THROW(Scene([](double, double) { return std::nan(""); }, {}, options), Error);
}

// A plane of far ground three metres above the map's own: at the edge they meet, and the step has
// gone four far cells out.
TEST(Terrain, FarGroundMeetsTheMapWithoutAStep) {
  SceneOptions near_options;
  near_options.columns = near_options.rows = 100;
  Scene scene([](double, double) { return 10.0; }, {}, near_options);
  SceneOptions far_options;
  far_options.columns = far_options.rows = 80;
  far_options.cell_m = 25.0;
  far_options.west = near_options.west - 950.0;
  far_options.north = near_options.north + 950.0;
  const auto far_file = scene.folder() / "far.tif";
  write_heights(
      far_file, [](double, double) { return 13.0; }, far_options);
  SilentProgress quiet;
  Terrain terrain({RasterSource::open(scene.ground_file(), "ground"), {}, far_file, 0.5}, quiet);
  const LevelGrid row = terrain.level_grid(0, {100, 50, 150, 2});
  EXPECT_NEAR(row.heights[0], 10.0, 0.1);
  EXPECT_NEAR(row.heights[149], 13.0, 1e-4);
  for (int column = 1; column < 150; ++column)
    EXPECT_NEAR(row.heights[column], row.heights[column - 1], 0.1) << column;
  // Far ground all round: the horizon is covered.
  const TerrainTile tile = terrain.tile({0, 0, 100, 100});
  for (const float sight : tile_sight(tile, 1.0)) EXPECT_GT(sight, 0.99F);
}

// Far ground may come in degrees, as most elevation models do.
TEST(Terrain, FarGroundInDegrees) {
  SceneOptions near_options;
  near_options.columns = near_options.rows = 60;
  Scene scene([](double, double) { return 10.0; }, {}, near_options);
  SceneOptions far_options;
  far_options.columns = far_options.rows = 100;
  far_options.epsg = 4326;
  far_options.cell_m = 0.0005;  // degrees
  const GeoPlace middle = geo_place(scene.terrain().frame(), scene.terrain().frame().middle());
  far_options.west = middle.place.longitude.degrees() - 0.025;
  far_options.north = middle.place.latitude.degrees() + 0.025;
  const auto far_file = scene.folder() / "far.tif";
  write_heights(
      far_file, [](double, double) { return 12.0; }, far_options);
  SilentProgress quiet;
  Terrain terrain({RasterSource::open(scene.ground_file(), "ground"), {}, far_file, 0.5}, quiet);
  const LevelGrid away = terrain.level_grid(6, {10, 0, 1, 1});  // some 700 m east
  EXPECT_NEAR(away.heights[0], 12.0, 1e-3);
}

TEST(Sight, FallsTowardsTheEdgeAndBesideHoles) {
  SceneOptions options;
  options.columns = options.rows = 400;
  Scene scene([](double e, double n) { return std::hypot(e, n - 100) < 20 ? std::nan("") : 3.0; }, {},
              options);
  const TerrainTile tile = scene.terrain().tile({0, 0, 400, 400});
  const std::vector<float> sight = tile_sight(tile, 1.0);
  const auto at = [&](double e, double n) {
    const CellIndex cell = scene.cell(e, n);
    return sight[static_cast<std::size_t>(cell.row) * 400 + cell.column];
  };
  EXPECT_GT(at(0, -20), at(0, -180));
  EXPECT_NEAR(at(0, -199.5), 0.5, 0.06);  // half the directions leave at once
  EXPECT_LT(at(0, 76),
            at(0, -76) - 0.1);  // four metres from the hole, against the same distance from the middle
  for (const float value : sight) {
    EXPECT_GE(value, 0.0F);
    EXPECT_LE(value, 1.0F);
  }
}

}  // namespace
}  // namespace sunfall::testing

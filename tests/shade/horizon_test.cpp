// Horizons of the sweep against a plain march along each ray.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "dome/horizon_steps.h"
#include "map/scene.h"
#include "shade/horizon_sweep.h"
#include "shade/rough_ground.h"

namespace sunfall::testing {
namespace {

// The steepest sight line from a cell over the map, heights linear between cell centres on the rows
// (or columns) that the ray crosses, and halfway beside the cell: the surface that the sweep means.
double marched_tangent(const LevelGrid& map, int column, int row, double eye, double azimuth_deg) {
  const double a = azimuth_deg * std::numbers::pi / 180.0;
  const double east = std::sin(a), south = -std::cos(a);
  const double along = std::max(std::abs(east), std::abs(south));
  const bool rows = std::abs(south) >= std::abs(east);
  const auto height = [&](double x, double y) {
    const int c = static_cast<int>(std::floor(x)), r = static_cast<int>(std::floor(y));
    if (c < 0 || r < 0 || c + 1 >= map.window.columns || r + 1 >= map.window.rows) return -1e9;
    const double fx = x - c, fy = y - r;
    const float* p = map.heights.data() + static_cast<std::size_t>(r) * map.window.columns + c;
    const float* q = p + map.window.columns;
    return (p[0] * (1 - fx) + p[1] * fx) * (1 - fy) + (q[0] * (1 - fx) + q[1] * fx) * fy;
  };
  double best = 0.0;
  for (double n = 0.5; n < 400.0; n += n < 2.75 ? 0.5 : 1.0) {
    const double t = n / along;
    double x = column + east * t, y = row + south * t;
    // Rays meet whole rows exactly; rounding must not read the row beyond.
    if (n == std::floor(n)) (rows ? y : x) = std::round(rows ? y : x);
    best = std::max(best, (height(x, y) - eye) / t);
  }
  return best;
}

struct Differences {
  double mean = 0.0;
  double p99 = 0.0;
};

Differences differences(double azimuth_deg) {
  SceneOptions options;
  options.columns = options.rows = 300;
  options.receiver_height_m = 0.5;
  Scene scene([](double e, double n) { return rough_height(e, n); }, {}, options);
  const LevelGrid map = scene.terrain().level_grid(0, {0, 0, 300, 300});
  const TerrainTile tile = scene.terrain().tile({90, 80, 128, 128});
  HorizonSweep sweep(tile, {});
  std::vector<std::uint16_t> steps(tile.usable.size());
  const GridAzimuth azimuth{Angle::degrees(azimuth_deg)};
  sweep.look_near(azimuth);
  sweep.look_far(azimuth, steps.data());
  std::vector<double> found;
  double sum = 0.0;
  for (int row = 0; row < 128; row += 3) {
    for (int column = 0; column < 128; column += 3) {
      const double eye = map.heights[static_cast<std::size_t>(80 + row) * 300 + 90 + column] + 0.5;
      const double marched = std::atan(marched_tangent(map, 90 + column, 80 + row, eye, azimuth_deg));
      const std::size_t place =
          by_columns(heading_of(azimuth)) ? std::size_t(column) * 128 + row : std::size_t(row) * 128 + column;
      const double swept = std::atan(double(step_tangent(steps[place])));
      found.push_back(std::abs(swept - marched) * 180.0 / std::numbers::pi);
      sum += swept - marched;
    }
  }
  std::sort(found.begin(), found.end());
  return {sum / double(found.size()) * 180.0 / std::numbers::pi, found[found.size() * 99 / 100]};
}

// Along the axes the lines run through the cells' centres: what remains is the step's own width (at
// most 0.5 degrees, half of it either way), the choice within a group of rows, and eyes on top of a
// block while the node rows around them stand on the ground, whose points they must make do with
// (the ground here holds blocks, as a surface model taken for ground does). Across, a line lies up
// to half a cell from the centre; at an edge of a block 7 m high and 15 m away that can hide or show
// it, which is why the 99th part may be degrees.
TEST(Horizon, AgreesWithAPlainMarch) {
  for (const double azimuth : {0.0, 90.0, 180.0, 270.0}) {
    const Differences d = differences(azimuth);
    EXPECT_LT(std::abs(d.mean), 0.1) << azimuth;
    EXPECT_LT(d.p99, 2.0) << azimuth;
  }
  for (const double azimuth : {17.0, 45.0, 63.0, 118.0, 207.0, 299.0, 345.0}) {
    const Differences d = differences(azimuth);
    EXPECT_LT(std::abs(d.mean), 0.2) << azimuth;
    EXPECT_LT(d.p99, 4.0) << azimuth;
  }
}

// The Earth's curve: a far ridge of height h at distance d stands at (h - d²(1 - k) / 2R) / d.
TEST(Horizon, FarRidgeSinksBelowTheEarthsCurve) {
  SceneOptions options;
  options.columns = 700;
  options.rows = 40;
  options.cell_m = 50.0;
  const double ridge = 300.0;
  Scene scene([&](double east, double) { return east > 15'000.0 ? ridge : 0.0; }, {}, options);
  const CellIndex eye = scene.cell(-15'000.0, 0.0);
  const TerrainTile tile = scene.terrain().tile({eye.column, eye.row, 1, 1});
  HorizonSweep sweep(tile, {50.0});
  std::uint16_t step = 0;
  sweep.look_near({Angle::degrees(90.0)});
  sweep.look_far({Angle::degrees(90.0)}, &step);
  const double distance = 30'000.0, drop = distance * distance * 0.87 / (2.0 * 6'371'000.0);
  // Half a step at the horizon is 0.001; a coarse cell's place errs by half of 32 cells in 600.
  EXPECT_NEAR(step_tangent(step), (ridge - drop) / distance, 0.0015);
  EXPECT_LT(step_tangent(step), ridge / distance - 0.001);
}

// Fine cells (a drone's) with far ground: distances of half a million cells and more.
TEST(Horizon, FarHillBehindFineCells) {
  SceneOptions options;
  options.columns = options.rows = 40;
  options.cell_m = 0.05;
  Scene scene([](double, double) { return 0.0; }, {}, options);
  SceneOptions far_options;
  far_options.columns = 800;
  far_options.rows = 40;
  far_options.cell_m = 100.0;
  far_options.west = options.west - 40'000.0;
  far_options.north = options.north + 2'000.0;
  const auto far_file = scene.folder() / "far.tif";
  write_heights(
      far_file, [](double east, double) { return east > 30'000.0 ? 2'400.0 : 0.0; }, far_options);
  SilentProgress quiet;
  Terrain terrain({RasterSource::open(scene.ground_file(), "ground"), {}, far_file, 0.0}, quiet);
  const TerrainTile tile = terrain.tile({20, 20, 1, 1});
  HorizonSweep sweep(tile, {0.05});
  std::uint16_t step = 0;
  sweep.look_near({Angle::degrees(90.0)});
  sweep.look_far({Angle::degrees(90.0)}, &step);
  const double distance = 30'000.0, drop = distance * distance * 0.87 / (2.0 * 6'371'000.0);
  // A step is 0.0027 wide here; a pooled cell of half a kilometre errs by half of that in 30.
  EXPECT_NEAR(step_tangent(step), (2'400.0 - drop) / distance, 0.004);
}

TEST(Horizon, OneCellMap) {
  SceneOptions options;
  options.columns = options.rows = 1;
  Scene scene([](double, double) { return 5.0; }, {}, options);
  const TerrainTile tile = scene.terrain().tile({0, 0, 1, 1});
  HorizonSweep sweep(tile, {});
  std::uint16_t step = 7;
  sweep.look_near({Angle::degrees(30.0)});
  sweep.look_far({Angle::degrees(30.0)}, &step);
  EXPECT_EQ(step, 0);
}

}  // namespace
}  // namespace sunfall::testing

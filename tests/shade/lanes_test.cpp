// Every instruction set's kernel gives the same bits.

#include <gtest/gtest.h>

#include <cstdlib>

#include "map/scene.h"
#include "shade/horizon_sweep.h"
#include "shade/rough_ground.h"

namespace sunfall::testing {
namespace {

std::vector<std::uint16_t> steps_with(const TerrainTile& tile, const char* lanes, double azimuth_deg) {
  setenv("SUNFALL_LANES", lanes, 1);
  HorizonSweep sweep(tile, {});
  unsetenv("SUNFALL_LANES");
  std::vector<std::uint16_t> steps(tile.usable.size());
  const GridAzimuth azimuth{Angle::degrees(azimuth_deg)};
  sweep.look_near(azimuth);
  sweep.look_far(azimuth, steps.data());
  return steps;
}

TEST(Lanes, EveryInstructionSetGivesTheSameBits) {
  SceneOptions options;
  options.columns = 230;
  options.rows = 190;
  options.receiver_height_m = 0.5;
  Scene scene([](double e, double n) { return rough_height(e, n); }, {}, options);
  // A tile of odd sides, so that blocks and node rows end inside it.
  const TerrainTile tile = scene.terrain().tile({31, 27, 117, 93});
  for (const double azimuth : {3.0, 44.0, 46.0, 91.0, 137.0, 200.0, 268.0, 314.0}) {
    const auto plain = steps_with(tile, "plain", azimuth);
    EXPECT_EQ(plain, steps_with(tile, "avx2", azimuth)) << azimuth;
    EXPECT_EQ(plain, steps_with(tile, "avx512", azimuth)) << azimuth;
    EXPECT_GT(*std::max_element(plain.begin(), plain.end()), 0);
  }
}

TEST(Lanes, EveryInstructionSetGivesTheSameShares) {
  SceneOptions options;
  options.columns = options.rows = 150;
  options.receiver_height_m = 0.5;
  Scene scene([](double e, double n) { return rough_height(e, n); }, {}, options);
  const TileSolver solver(scene.terrain(), even_sky(Dome::of(DomeQuality::draft)), ReceiverPlane::level);
  const TerrainTile tile = scene.terrain().tile({20, 30, 77, 61});
  std::vector<std::vector<float>> shares;
  for (const char* lanes : {"plain", "avx2", "avx512"}) {
    setenv("SUNFALL_LANES", lanes, 1);
    shares.push_back(solver.solve(tile, Angle::degrees(2.0)).shares);
    unsetenv("SUNFALL_LANES");
  }
  EXPECT_EQ(shares[0], shares[1]);
  EXPECT_EQ(shares[0], shares[2]);
}

}  // namespace
}  // namespace sunfall::testing

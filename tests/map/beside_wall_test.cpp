// A cell beside a wall that looks away from it sees no wall.

#include <gtest/gtest.h>

#include "dome/horizon_steps.h"
#include "map/scene.h"
#include "shade/horizon_sweep.h"

namespace sunfall::testing {
namespace {

constexpr int kSide = 160;
constexpr int kMargin = 20;  // cells at the wall's ends, which the map's edge leaves out

// A wall of half the map, its face along an axis; `facing_deg` is where the open half lies.
Height wall(int facing_deg) {
  return [=](double east, double north) {
    const double out = facing_deg == 0 ? north : facing_deg == 90 ? east : facing_deg == 180 ? -north : -east;
    return out < 0.0 ? 7.0 : 0.0;
  };
}

// The cells at the wall's foot.
std::vector<CellIndex> foot(int facing_deg) {
  std::vector<CellIndex> cells;
  const int first = facing_deg == 90 || facing_deg == 180 ? kSide / 2 : kSide / 2 - 1;
  for (int i = kMargin; i < kSide - kMargin; ++i) {
    cells.push_back(facing_deg % 180 == 0 ? CellIndex{i, first} : CellIndex{first, i});
  }
  return cells;
}

// Lines of the sweep pass a cell up to one cell aside and count from nine rows on (kFarDelay): a look that
// leaves the wall by more than one cell in nine rows, 6.3 degrees, must not meet it.
TEST(BesideWall, LookingAwaySeesNoWall) {
  for (const int facing : {0, 90, 180, 270}) {
    SceneOptions options;
    options.columns = options.rows = kSide;
    options.receiver_height_m = 0.5;
    const Scene scene([](double, double) { return 0.0; }, wall(facing), options);
    const TerrainTile tile = scene.terrain().tile({0, 0, kSide, kSide});
    HorizonSweep sweep(tile, {});
    std::vector<std::uint16_t> steps(tile.usable.size());
    for (const double away : {-83.0, -80.0, -70.0, -50.0, -44.0, -10.0, 20.0, 44.0, 50.0, 70.0, 80.0, 83.0}) {
      const GridAzimuth azimuth{wrapped(Angle::degrees(facing + away))};
      sweep.look_near(azimuth);
      sweep.look_far(azimuth, steps.data());
      for (const CellIndex cell : foot(facing)) {
        const int place =
            by_columns(heading_of(azimuth)) ? cell.column * kSide + cell.row : cell.row * kSide + cell.column;
        ASSERT_TRUE(tile.usable[static_cast<std::size_t>(cell.row * kSide + cell.column)]);
        ASSERT_EQ(steps[static_cast<std::size_t>(place)], 0)
            << "facing " << facing << ", looking " << away << " from there, cell " << cell.column << ","
            << cell.row;
      }
    }
  }
}

}  // namespace
}  // namespace sunfall::testing

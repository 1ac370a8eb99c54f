#include "geo/surface_check.h"

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

namespace sunfall {
namespace {

// An 8 × 8 lattice of patches: some thousand cells tell a half from none, at the cost of a few blocks
// of even the largest raster.
constexpr int kPatches = 8;
constexpr int kPatchCells = 16;
// Surface and ground models of one survey differ by less than this where nothing stands.
constexpr float kBelow_m = 2.0F;

struct Counts {
  int known = 0;
  int below = 0;
  int covered = 0;
};

void count(const RasterSource& ground, const RasterSource& surface, const CellWindow& window,
           float receiver_height_m, Counts& counts) {
  const std::vector<float> low = ground.read(window).values();
  const std::vector<float> top = surface.read(window).values();
  for (std::size_t i = 0; i < low.size(); ++i) {
    if (std::isnan(low[i]) || std::isnan(top[i])) continue;
    ++counts.known;
    if (top[i] < low[i] - kBelow_m) ++counts.below;
    if (top[i] > low[i] + receiver_height_m) ++counts.covered;
  }
}

// The patch's first cell along a side of the map.
int first_cell(int patch, int cells, int patch_cells) {
  return static_cast<int>(static_cast<long long>(cells - patch_cells) * patch / (kPatches - 1));
}

}  // namespace

std::vector<std::string> surface_oddities(const RasterSource& ground, const RasterSource& surface,
                                          double receiver_height_m) {
  const GridFrame& frame = ground.frame();
  const int columns = std::min(kPatchCells, frame.columns), rows = std::min(kPatchCells, frame.rows);
  Counts counts;
  for (int row = 0; row < kPatches; ++row) {
    for (int column = 0; column < kPatches; ++column) {
      count(ground, surface,
            {first_cell(column, frame.columns, columns), first_cell(row, frame.rows, rows), columns, rows},
            static_cast<float>(receiver_height_m), counts);
    }
  }
  std::vector<std::string> oddities;
  if (2 * counts.below > counts.known) {
    oddities.push_back(fmt::format(
        "surface lies more than {:.0f} m below ground in {:.0f} % of the cells looked at, and casts no shade "
        "there: it must hold heights above the same zero as ground, not heights above the ground",
        kBelow_m, 100.0 * counts.below / counts.known));
  }
  if (2 * counts.covered > counts.known) {
    oddities.push_back(fmt::format(
        "surface stands above the receiver in {:.0f} % of the cells looked at, and these get no value: where "
        "that is not woods or roofs, ground and surface count heights from different zeros (geoid, "
        "ellipsoid), "
        "or receiver_height is less than the surface's roughness",
        100.0 * counts.covered / counts.known));
  }
  return oddities;
}

}  // namespace sunfall

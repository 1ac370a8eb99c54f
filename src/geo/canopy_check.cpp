#include "geo/canopy_check.h"

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

namespace sunfall {
namespace {

constexpr int kCellsAtOnce = 1 << 20;
constexpr float kWithin_m = 1.0F;
constexpr float kLowest_m = 2.0F;
constexpr double kMost = 0.5;

}  // namespace

CanopyInSurface canopy_in_surface(const CanopySource& canopy, const RasterSource& ground,
                                  const RasterSource& surface) {
  const GridFrame& frame = ground.frame();
  const int rows_at_once = std::max(1, kCellsAtOnce / frame.columns);
  CanopyInSurface found;
  for (int row = 0; row < frame.rows; row += rows_at_once) {
    const CellWindow strip{0, row, frame.columns, std::min(rows_at_once, frame.rows - row)};
    const CanopyCells leaves = canopy.read(strip);
    const auto looked_at = [&](std::size_t i) {
      return leaves.leaf_density[i] > 0.0F && leaves.top_m[i] >= kLowest_m;
    };
    bool any = false;
    for (std::size_t i = 0; i < leaves.top_m.size(); ++i) any = any || looked_at(i);
    if (!any) continue;
    const std::vector<float> low = ground.read(strip).values();
    const std::vector<float> high = surface.read(strip).values();
    for (std::size_t i = 0; i < low.size(); ++i) {
      if (!looked_at(i) || std::isnan(low[i]) || std::isnan(high[i])) continue;
      ++found.leafy;
      if (high[i] - low[i] >= leaves.top_m[i] - kWithin_m) ++found.shared;
    }
  }
  return found;
}

std::optional<std::string> canopy_in_surface_note(const CanopyInSurface& found, const std::string& name) {
  if (found.leafy == 0 || found.fraction() < kMost) return std::nullopt;
  return fmt::format(
      "{}: in {:.0f} % of its cells the surface reaches up to the top of the leaves, so the same leaves "
      "shade twice, "
      "once as "
      "a solid block. Take the trees out of surface, or leave this canopy out.",
      name, 100.0 * found.fraction());
}

}  // namespace sunfall

#include "geo/far_ground_check.h"

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

namespace sunfall {
namespace {

// Places along the map's longer side.
constexpr int kPlaces = 8;
// Coarse models smooth hills and keep woods; geoid and ellipsoid lie 40 to 50 m apart over Europe.
constexpr float kMostStep_m = 20.0F;

}  // namespace

std::vector<std::string> far_ground_oddities(const RasterSource& ground,
                                             const std::filesystem::path& far_ground) {
  GridFrame places = ground.frame();
  places.cell_m *= std::max(places.columns, places.rows) / double(kPlaces);
  places.columns = places.rows = kPlaces;
  const Grid<float> far = resample(far_ground, "far_ground", places);
  std::vector<float> steps;
  for (int row = 0; row < kPlaces; ++row) {
    for (int column = 0; column < kPlaces; ++column) {
      const MapPoint centre = places.centre({column, row});
      const GridFrame& frame = ground.frame();
      const CellWindow cell{static_cast<int>(std::floor((centre.east - frame.west) / frame.cell_m)),
                            static_cast<int>(std::floor((frame.north - centre.north) / frame.cell_m)), 1, 1};
      const float step = far.at(column, row) - ground.read(cell).at(0, 0);
      if (!std::isnan(step)) steps.push_back(step);
    }
  }
  if (steps.empty()) return {};
  std::nth_element(steps.begin(), steps.begin() + static_cast<std::ptrdiff_t>(steps.size() / 2), steps.end());
  const float step_m = steps[steps.size() / 2];
  if (std::abs(step_m) <= kMostStep_m) return {};
  return {fmt::format(
      "far_ground lies {:.0f} m {} ground where both are known: do they count heights from different zeros "
      "(geoid, ellipsoid)? The step stands around the map as hills or hollows",
      std::abs(step_m), step_m > 0.0F ? "above" : "below")};
}

}  // namespace sunfall

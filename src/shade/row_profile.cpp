#include <fmt/format.h>

#include "shade/row_sums.h"
#include "sunfall/error.h"
#include "sunfall/rows.h"

namespace sunfall {

RowProfile profile_of_rows(const DomeLight& light, const RowProfileRequest& request) {
  require_sound(request.rows, request.leafing);
  if (request.positions < 1) {
    throw Error(ErrorKind::plan, {"a profile of rows needs at least one position", "row profile",
                                  fmt::format("{}", request.positions), ""});
  }
  const auto count = static_cast<std::size_t>(request.positions);
  RowProfile profile;
  for (std::size_t i = 0; i < count; ++i) {
    const double part = (static_cast<double>(i) + 0.5) / static_cast<double>(count) - 0.5;
    profile.across_m.push_back(part * request.rows.spacing_m);
  }
  profile.share.assign(light.periods.size(), std::vector<double>(count, 0.0));
  const std::vector<double> open_mol = open_light(light);
  const std::vector<RowSky> skies{RowSky(light, request.azimuth)};
  const std::vector<LeafLight> lights = leaf_lights(skies, light.periods, request.leafing);
  const std::vector<RowSums> all = sum_over_sky(request.rows, lights, profile.across_m, request.height_m);
  for (std::size_t g = 0; g < lights.size(); ++g) {
    const std::vector<std::size_t>& periods = lights[g].group.periods;
    for (std::size_t k = 0; k < periods.size(); ++k) {
      const double open = open_mol[periods[k]];
      if (open <= 0.0) continue;
      for (std::size_t i = 0; i < count; ++i) {
        const double from_right = all[g].place[i][k];
        const double from_left = all[g].place[mirrored(i, count)][periods.size() + k];
        profile.share[periods[k]][i] = (from_right + from_left) / open;
      }
    }
  }
  return profile;
}

}  // namespace sunfall

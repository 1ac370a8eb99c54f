#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "shade/row_cycle.h"
#include "shade/row_leaves.h"
#include "shade/row_sums.h"
#include "sunfall/error.h"
#include "sunfall/rows.h"

namespace sunfall {
RowInstant rows_in_beam(const CropRows& rows, Angle from_row, Angle elevation, double leafing) {
  std::array<double, 12> leafing_all_year;
  leafing_all_year.fill(leafing);
  require_sound(rows, leafing_all_year);
  if (!(elevation.degrees() > 0.0 && elevation.degrees() <= 90.0 + 1e-9)) {
    throw Error(ErrorKind::plan, {"elevation must be above 0 and at most 90 degrees", "rows",
                                  fmt::format("{:g} degrees", elevation.degrees()), ""});
  }
  const RowRay ray = row_ray({Angle()}, {from_row}, tan(std::min(elevation, Angle::degrees(90.0))));
  const RowLeaves leaves(rows, leafing);
  RowInstant instant;
  instant.ground = cycle_passage(rows, ray, leaves.depth(ray.sine), 0.0);
  instant.reflected = leaves.reflected(ray.sine) * (1.0 - instant.ground);
  instant.taken = 1.0 - instant.ground - instant.reflected;
  // The sine of a half turn is not quite 0; a nanometre aside over a metre is straight ahead.
  const double across = sin(from_row);
  const double right = std::abs(across) < 1e-9 ? 0.5 : across > 0.0 ? 1.0 : 0.0;
  instant.taken_right = right * instant.taken;
  instant.taken_left = (1.0 - right) * instant.taken;

  // A square metre of sunlit leaf stops G of the beam's cross section on average, so what black leaves
  // stop, over G, is sunlit: (1 − e^-KL)/K in a closed canopy (Campbell and Norman 1998, ch. 15).
  const double black = cycle_passage(rows, ray, leaves.black_depth(ray.sine), 0.0);
  instant.sunlit_leaf = (1.0 - black) * ray.sine / leaves.projection(ray.sine);
  instant.shaded_leaf = std::max(0.0, leaf_area_index(rows) * leafing - instant.sunlit_leaf);
  return instant;
}

}  // namespace sunfall

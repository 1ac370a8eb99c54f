#include "shade/row_direction.h"

#include <algorithm>
#include <cmath>

namespace sunfall {

Heading heading_of(GridAzimuth azimuth) {
  const double east = sin(azimuth.from_grid_north), north = cos(azimuth.from_grid_north);
  if (std::abs(north) >= std::abs(east)) return north > 0 ? Heading::north : Heading::south;
  return east > 0 ? Heading::east : Heading::west;
}

RowDirection row_direction(GridAzimuth azimuth) {
  const double east = sin(azimuth.from_grid_north), north = cos(azimuth.from_grid_north);
  const Heading heading = heading_of(azimuth);
  const double across = by_columns(heading) ? north : -east;
  const double along = std::max(std::abs(east), std::abs(north));
  return {heading, across / along, 1.0 / along};
}

}  // namespace sunfall

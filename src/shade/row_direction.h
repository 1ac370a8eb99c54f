#pragma once
// A direction of light as rows of cells see it: u counts the rows away from the light, v the cells of a row.

#include "sunfall/angle.h"

namespace sunfall {

// The side that the light comes from, within 45 degrees.
enum class Heading { north, east, south, west };
Heading heading_of(GridAzimuth azimuth);
// Light from east or west is swept column by column; what is found is stored column by column too.
inline bool by_columns(Heading heading) { return heading == Heading::east || heading == Heading::west; }
// Light from south or east passes the map's rows or columns from the last to the first.
inline bool reversed(Heading heading) { return heading == Heading::south || heading == Heading::east; }

// v runs east for light from north and south, and south for light from east and west.
struct RowDirection {
  Heading heading = Heading::north;
  double lean = 0.0;        // cells across per row
  double row_length = 1.0;  // cells along the ray per row
};
RowDirection row_direction(GridAzimuth azimuth);

}  // namespace sunfall

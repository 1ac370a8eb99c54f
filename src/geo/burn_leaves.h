#pragma once
// Crowns and hedges laid onto cells, so that their leaf area is that of the shapes themselves, whatever the
// cell size: a cell that is covered in part gets the part.

#include <vector>

#include "geo/leaf_cells.h"
#include "sunfall/grid.h"

namespace sunfall {

// An upright ellipsoid of leaf.
struct Crown {
  MapPoint centre;
  double width_m = 0.0;
  double base_m = 0.0;
  double top_m = 0.0;
  double leaf_density = 0.0;  // m2 m-3
};

// An upright prism of leaf.
struct Hedge {
  std::vector<std::vector<MapPoint>> rings;  // outer rings counter-clockwise, holes clockwise
  double base_m = 0.0;
  double top_m = 0.0;
  double leaf_density = 0.0;
};

// The cells of the frame that the shape can touch; none where it lies off it.
CellWindow cells_around(const Crown& crown, const GridFrame& frame);
CellWindow cells_around(const Hedge& hedge, const GridFrame& frame);

// Adds what lies in the window of `cells`.
void burn(const Crown& crown, const GridFrame& frame, LeafCells& cells);
void burn(const Hedge& hedge, const GridFrame& frame, LeafCells& cells);

// Of both windows; none where they lie apart.
CellWindow common_cells(const CellWindow& one, const CellWindow& other);

}  // namespace sunfall

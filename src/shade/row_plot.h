#pragma once
// Where the rows of a plot stand: its outline, the rows' direction and their places in it. Rows are cut off
// at the outline, also lengthwise.

#include <vector>

#include "shade/row_paths.h"
#include "sunfall/grid.h"

namespace sunfall {

// A stretch of a ray within the plot, metres on the map from the receiver; zero long at least.
using RowStretches = std::vector<RowReach>;

class RowPlot {
 public:
  // Rings of one or more polygons, closed or not, holes as rings of their own; a place counts as inside
  // where an odd number of rings holds it. As many rows as fit between the outline's outermost points
  // across the rows, in the middle, so that the outer rows have the same room at either side.
  // Precondition: at least three points, spacing above 0.
  RowPlot(std::vector<std::vector<MapPoint>> rings, GridAzimuth azimuth, double spacing_m);

  GridAzimuth azimuth() const { return azimuth_; }
  int rows() const { return rows_; }
  // From the middle of the nearest row, to the right of the azimuth: within half a spacing.
  double across_m(MapPoint place) const;
  bool contains(MapPoint place) const;
  // In order, none beyond `most_m`. A ray that runs along an edge may be in or out.
  void stretches(MapPoint from, GridAzimuth towards, double most_m, RowStretches& found) const;

 private:
  struct Edge {
    MapPoint from;
    MapPoint to;
  };
  double right_of_origin(MapPoint place) const;

  std::vector<Edge> edges_;
  GridAzimuth azimuth_;
  double spacing_m_;
  int rows_ = 0;
  MapPoint origin_;           // keeps digits: map coordinates have seven before the point
  double first_row_m_ = 0.0;  // right of the origin
};

// Beyond this distance on the map the ray is above the rows; 0 where it starts there.
double farthest_leaf_m(const CropRows& rows, const RowRay& ray, double height_m);

}  // namespace sunfall

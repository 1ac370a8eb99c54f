#include "shade/row_plot.h"

#include <algorithm>
#include <cassert>
#include <cmath>

namespace sunfall {

RowPlot::RowPlot(std::vector<std::vector<MapPoint>> rings, GridAzimuth azimuth, double spacing_m)
    : azimuth_(azimuth), spacing_m_(spacing_m) {
  assert(!rings.empty() && rings.front().size() >= 3 && spacing_m > 0.0);
  origin_ = rings.front().front();
  double least = 0.0, most = 0.0;
  for (const std::vector<MapPoint>& ring : rings) {
    for (std::size_t i = 0; i < ring.size(); ++i) {
      edges_.push_back({ring[i], ring[(i + 1) % ring.size()]});  // of length 0 where the ring is closed
      const double right = right_of_origin(ring[i]);
      least = std::min(least, right);
      most = std::max(most, right);
    }
  }
  rows_ = std::max(1, static_cast<int>(std::floor((most - least) / spacing_m + 1e-9)));
  first_row_m_ = 0.5 * (least + most) - 0.5 * (rows_ - 1) * spacing_m;
}

double RowPlot::right_of_origin(MapPoint place) const {
  const Angle a = azimuth_.from_grid_north;
  return (place.east - origin_.east) * cos(a) - (place.north - origin_.north) * sin(a);
}

double RowPlot::across_m(MapPoint place) const {
  const double right = right_of_origin(place) - first_row_m_;
  return right - spacing_m_ * std::floor(right / spacing_m_ + 0.5);
}

bool RowPlot::contains(MapPoint place) const {
  RowStretches found;
  stretches(place, azimuth_, 1e9, found);
  return !found.empty() && found.front().from_m == 0.0;
}

void RowPlot::stretches(MapPoint from, GridAzimuth towards, double most_m, RowStretches& found) const {
  found.clear();
  const double east = sin(towards.from_grid_north), north = cos(towards.from_grid_north);
  std::vector<double> crossings;
  for (const Edge& edge : edges_) {
    const double e0 = edge.from.east - from.east, n0 = edge.from.north - from.north;
    const double e1 = edge.to.east - from.east, n1 = edge.to.north - from.north;
    const double aside0 = e0 * north - n0 * east, aside1 = e1 * north - n1 * east;
    // A point on the ray counts to its right, so that a corner is crossed once or twice, never half.
    if ((aside0 < 0.0) == (aside1 < 0.0)) continue;
    const double part = aside0 / (aside0 - aside1);
    const double ahead0 = e0 * east + n0 * north, ahead1 = e1 * east + n1 * north;
    crossings.push_back(ahead0 + part * (ahead1 - ahead0));
  }
  std::sort(crossings.begin(), crossings.end());
  for (std::size_t i = 0; i + 1 < crossings.size(); i += 2) {
    const double enter = std::max(0.0, crossings[i]), leave = std::min(most_m, crossings[i + 1]);
    if (leave > enter) found.push_back({enter, leave});
  }
}

double farthest_leaf_m(const CropRows& rows, const RowRay& ray, double height_m) {
  return std::max(0.0, (rows.height_m - height_m) / ray.rise);
}

}  // namespace sunfall

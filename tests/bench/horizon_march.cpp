#include "bench/horizon_march.h"

#include <algorithm>
#include <cmath>

#include "geo/geodesy.h"
#include "shade/horizon_sweep.h"

namespace sunfall::bench {

LightBelow::LightBelow(const DomeLight& light)
    : steps_(light.dome.steps()),
      columns_(2 * light.periods.size()),
      sums_(static_cast<std::size_t>(light.dome.lines()) * (steps_ + 1) * columns_, 0.0) {
  const std::size_t periods = light.periods.size();
  for (int line = 0; line < light.dome.lines(); ++line) {
    for (int step = 0; step < steps_; ++step) {
      const double* before = sums_.data() + (static_cast<std::size_t>(line) * (steps_ + 1) + step) * columns_;
      double* after = sums_.data() + (static_cast<std::size_t>(line) * (steps_ + 1) + step + 1) * columns_;
      for (std::size_t p = 0; p < periods; ++p) {
        const std::size_t at = light.index(line, step, p);
        after[p] = before[p] + light.beam.level[at] / light.beam.open[p];
        after[periods + p] = before[periods + p] + light.sky.level[at] / light.sky.open[p];
      }
    }
  }
}

// Steps of the dome are even in the sine of elevation; a horizon inside one hides a part of it.
void LightBelow::take(int line, double horizon_sine, std::vector<double>& shares) const {
  const double place = horizon_sine * steps_;
  const int step = std::min(static_cast<int>(place), steps_ - 1);
  const double* low = sums_.data() + (static_cast<std::size_t>(line) * (steps_ + 1) + step) * columns_;
  const double* high = low + columns_;
  for (std::size_t c = 0; c < columns_; ++c) shares[c] -= low[c] + (place - step) * (high[c] - low[c]);
}

HorizonMarch::HorizonMarch(const Terrain& terrain)
    : frame_(terrain.frame()),
      heights_(terrain.level_grid(0, {0, 0, frame_.columns, frame_.rows}).heights),
      highest_m_(*std::max_element(heights_.begin(), heights_.end())) {}

// Between cell centres; the place must not lie beyond the outer ones.
double HorizonMarch::height(double column, double row) const {
  const int left = std::min(static_cast<int>(column), frame_.columns - 2);
  const int top = std::min(static_cast<int>(row), frame_.rows - 2);
  const double right_part = column - left, below_part = row - top;
  const float* h = heights_.data() + static_cast<std::size_t>(top) * frame_.columns + left;
  const float* below = h + frame_.columns;
  return (h[0] * (1.0 - right_part) + h[1] * right_part) * (1.0 - below_part) +
         (below[0] * (1.0 - right_part) + below[1] * right_part) * below_part;
}

double HorizonMarch::tangent(CellIndex cell, double eye_m, GridAzimuth azimuth) const {
  const double to_east = sin(azimuth.from_grid_north), to_south = -cos(azimuth.from_grid_north);
  const SweepOptions earth;
  const double bend_per_m = (1.0 - earth.refraction) / (2.0 * earth.earth_radius_m);
  const double per_column = 1.0 / std::max(std::abs(to_east), 1e-12);  // cells from crossing to crossing
  const double per_row = 1.0 / std::max(std::abs(to_south), 1e-12);
  double next_column = per_column, next_row = per_row, here = 0.0, best = 0.0;
  for (;;) {
    const double crossing = std::min(next_column, next_row);
    for (const double distance : {0.5 * (here + crossing), crossing}) {
      const double column = cell.column + distance * to_east, row = cell.row + distance * to_south;
      if (column < 0.0 || row < 0.0 || column > frame_.columns - 1.0 || row > frame_.rows - 1.0) return best;
      const double distance_m = distance * frame_.cell_m;
      if ((highest_m_ - eye_m) < best * distance_m) return best;  // nothing is high enough from here on
      const double rise_m = height(column, row) - eye_m - bend_per_m * distance_m * distance_m;
      best = std::max(best, rise_m / distance_m);
    }
    if (next_column <= crossing) next_column += per_column;
    if (next_row <= crossing) next_row += per_row;
    here = crossing;
  }
}

std::vector<double> HorizonMarch::shares(CellIndex cell, const oracle::Ground& ground, const Dome& dome,
                                         const LightBelow& below) const {
  const double eye_m = double(ground.terrain.ground({cell.column, cell.row, 1, 1}).at(0, 0)) +
                       ground.plan.site.receiver_height_m;
  const Angle convergence = geo_place(frame_, frame_.centre(cell)).convergence;
  std::vector<double> shares(below.columns(), 1.0);
  for (int line = 0; line < dome.lines(); ++line) {
    const double t = tangent(cell, eye_m, to_grid(dome.line_azimuth(line), convergence));
    below.take(line, t / std::sqrt(1.0 + t * t), shares);
  }
  return shares;
}

}  // namespace sunfall::bench

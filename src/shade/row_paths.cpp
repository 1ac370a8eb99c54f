#include "shade/row_paths.h"

#include <algorithm>
#include <cassert>
#include <cmath>
#include <limits>

namespace sunfall {
namespace {

// Steeper light is as good as plumb, and finite.
constexpr double kSteepest = 1e9;
constexpr double kMostRows = 256.0;

// Between two heights above the ground, the ray at `across` where the lower one is.
struct Climb {
  double low = 0.0;
  double high = 0.0;
  double across = 0.0;
  double lean = 0.0;
  double rise() const { return high - low; }
};

Climb climb_through(const CropRows& rows, const RowRay& ray, double across_m, double height_m,
                    const RowReach& reach) {
  const double low = std::max(height_m + reach.from_m * ray.rise, rows.base_m);
  const double high = std::min(height_m + reach.to_m * ray.rise, rows.height_m);
  return {low, std::max(low, high), across_m + ray.lean * (low - height_m), ray.lean};
}

// Leaf met on the way from 0 to x across boxes whose middles stand at multiples of the spacing, shifted
// by half a width.
double boxes_up_to(const CropRows& rows, double x) {
  const double cycles = std::floor(x / rows.spacing_m);
  return cycles * rows.width_m + std::min(x - cycles * rows.spacing_m, rows.width_m);
}

// Metres of height within leaves; times RowRay::path the metres of ray.
double in_boxes(const CropRows& rows, const Climb& climb) {
  const double from = climb.across + 0.5 * rows.width_m;
  const double across = climb.lean * climb.rise();
  // Below 1e-7 m aside the ray is plumb, or along the rows.
  if (std::abs(across) < 1e-7) {
    const double within = from - std::floor(from / rows.spacing_m) * rows.spacing_m;
    return within < rows.width_m ? climb.rise() : 0.0;
  }
  return (boxes_up_to(rows, from + across) - boxes_up_to(rows, from)) / climb.lean;
}

struct Heights {
  double low = 0.0;
  double high = 0.0;
};

// Of the row whose middle is `middle` away at climb.low: |aside + lean z| ≤ narrowing (top − z), both
// sides straight.
Heights in_wedge(const CropRows& rows, const Climb& climb, double middle) {
  Heights in{climb.low, climb.high};
  const double narrowing = 0.5 * rows.width_m / (rows.height_m - rows.base_m);
  const double aside = climb.across - middle - climb.lean * climb.low;  // where the ray would be at 0
  const auto keep_below = [&](double slope, double limit) {             // slope · z ≤ limit
    if (slope > 0.0) {
      in.high = std::min(in.high, limit / slope);
    } else if (slope < 0.0) {
      in.low = std::max(in.low, limit / slope);
    } else if (limit < 0.0) {
      in.high = in.low;
    }
  };
  keep_below(narrowing + climb.lean, narrowing * rows.height_m - aside);
  keep_below(narrowing - climb.lean, narrowing * rows.height_m + aside);
  return in;
}

// The chord of an ellipse with half axes a across and c upright (Norman and Welles 1983, in the plane).
Heights in_ellipse(const CropRows& rows, const Climb& climb, double middle) {
  const double a = 0.5 * rows.width_m, c = 0.5 * (rows.height_m - rows.base_m);
  const double centre = 0.5 * (rows.height_m + rows.base_m);
  const double aside = climb.across - middle + climb.lean * (centre - climb.low);
  const double square = climb.lean * climb.lean / (a * a) + 1.0 / (c * c);
  const double rest = square - aside * aside / (a * a * c * c);
  if (rest <= 0.0) return {climb.low, climb.low};
  const double half = std::sqrt(rest) / square, mid = centre - aside * climb.lean / (a * a) / square;
  return {std::max(climb.low, mid - half), std::min(climb.high, mid + half)};
}

// Metres of height within leaves where rows are spread evenly over the ground: the section's area between
// two heights over the spacing.
double evenly_spread(const CropRows& rows, double low, double high) {
  const double tall = rows.height_m - rows.base_m;
  if (rows.section == RowSection::wedge) {
    const double below = rows.height_m - low, above = rows.height_m - high;
    return 0.5 * rows.width_m / tall * (below * below - above * above) / rows.spacing_m;
  }
  const auto area = [&](double z) {
    const double t = std::clamp(2.0 * (z - rows.base_m) / tall - 1.0, -1.0, 1.0);
    return 0.25 * rows.width_m * tall * (t * std::sqrt(1.0 - t * t) + std::asin(t));
  };
  return (area(high) - area(low)) / rows.spacing_m;
}

template <typename InRow>
double row_by_row(const CropRows& rows, Climb climb, const InRow& in_row) {
  double sum = 0.0;
  const double most_rise = kMostRows * rows.spacing_m / std::max(std::abs(climb.lean), 1e-30);
  if (climb.rise() > most_rise) {
    sum = evenly_spread(rows, climb.low + most_rise, climb.high);
    climb.high = climb.low + most_rise;
  }
  const double to = climb.across + climb.lean * climb.rise();
  const double half = 0.5 * rows.width_m;
  const double first = std::ceil((std::min(climb.across, to) - half) / rows.spacing_m);
  const double last = std::floor((std::max(climb.across, to) + half) / rows.spacing_m);
  for (double row = first; row <= last; row += 1.0) {
    const Heights in = in_row(rows, climb, row * rows.spacing_m);
    sum += std::max(0.0, in.high - in.low);
  }
  return sum;
}

double leaf_heights(const CropRows& rows, const Climb& climb) {
  if (!(climb.rise() > 0.0)) return 0.0;
  switch (rows.section) {
    case RowSection::box: return in_boxes(rows, climb);
    case RowSection::ellipse: return row_by_row(rows, climb, in_ellipse);
    case RowSection::wedge: return row_by_row(rows, climb, in_wedge);
  }
  return 0.0;
}

}  // namespace

RowRay row_ray(GridAzimuth rows, GridAzimuth light, double tangent, const GroundPlane& ground) {
  assert(tangent >= 0.0);
  const double steep = std::min(tangent, kSteepest);
  const double stretch = std::sqrt(1.0 + steep * steep);
  const double rise =
      steep - ground.rise_east * sin(light.from_grid_north) - ground.rise_north * cos(light.from_grid_north);
  return {sin(light.from_grid_north - rows.from_grid_north) / rise, stretch / rise, rise, steep / stretch};
}

double row_path(const CropRows& rows, const RowRay& ray, double across_m, double height_m,
                const RowReach& reach) {
  if (ray.meets_ground()) return std::numeric_limits<double>::infinity();
  return ray.path * leaf_heights(rows, climb_through(rows, ray, across_m, height_m, reach));
}

void row_paths(const CropRows& rows, const RowRay& ray, const RowReceivers& receivers,
               std::span<double> path_m) {
  assert(receivers.across_m.size() == path_m.size() && receivers.height_m.size() == path_m.size() &&
         receivers.reach.size() == path_m.size());
  for (std::size_t i = 0; i < path_m.size(); ++i) {
    path_m[i] = row_path(rows, ray, receivers.across_m[i], receivers.height_m[i], receivers.reach[i]);
  }
}

double half_width_at(const CropRows& rows, double height_m) {
  if (height_m < rows.base_m || height_m > rows.height_m) return 0.0;
  const double part = (height_m - rows.base_m) / (rows.height_m - rows.base_m);
  switch (rows.section) {
    case RowSection::box: return 0.5 * rows.width_m;
    case RowSection::ellipse: return rows.width_m * std::sqrt(part * (1.0 - part));
    case RowSection::wedge: return 0.5 * rows.width_m * (1.0 - part);
  }
  return 0.0;
}

}  // namespace sunfall

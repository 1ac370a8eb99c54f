#include "shade/row_cycle.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <numbers>
#include <utility>

namespace sunfall {
namespace {

// Places across the cycle, in [0, spacing), where the path may bend or jump.
class Breaks {
 public:
  explicit Breaks(double spacing_m) : spacing_(spacing_m) {}

  void add(double across_m) {
    const double within = across_m - std::floor(across_m / spacing_) * spacing_;
    // Rounding may leave the spacing itself.
    int place = count_++;
    at_[place] = within < spacing_ ? within : 0.0;
    for (; place > 0 && at_[place] < at_[place - 1]; --place) std::swap(at_[place], at_[place - 1]);
  }
  // In order; calls piece(from, length) for the stretches between them, the last one running over the end.
  template <typename Piece>
  void pieces(const Piece& piece) const {
    for (int i = 0; i < count_; ++i) {
      const double to = i + 1 < count_ ? at_[i + 1] : at_[0] + spacing_;
      if (to > at_[i]) piece(at_[i], to - at_[i]);
    }
  }

 private:
  double spacing_;
  int count_ = 0;
  std::array<double, 6> at_;  // the first count_ are set
};

// ∫ exp(-depth) over a stretch of length 1 where depth goes evenly from a to b.
double mean_passage(double a, double b) {
  const double change = b - a;
  if (std::abs(change) < 1e-5) return std::exp(-0.5 * (a + b));  // errs by change² / 24
  return (std::exp(-a) - std::exp(-b)) / change;
}

// The places from which the ray passes the section's corners at the heights where it is cut off, and for an
// ellipse those from which it grazes it.
Breaks breaks_of(const CropRows& rows, const RowRay& ray, double height_m, double low, double high) {
  Breaks breaks(rows.spacing_m);
  for (const double z : {low, high}) {
    const double half = half_width_at(rows, z);
    const double shift = ray.lean * (z - height_m);
    breaks.add(half - shift);
    breaks.add(-half - shift);
  }
  if (rows.section == RowSection::ellipse) {
    const double a = 0.5 * rows.width_m, c = 0.5 * (rows.height_m - rows.base_m);
    const double grazing = std::hypot(a, c * ray.lean);
    const double shift = ray.lean * (0.5 * (rows.height_m + rows.base_m) - height_m);
    breaks.add(grazing - shift);
    breaks.add(-grazing - shift);
  }
  return breaks;
}

// Gauss-Legendre on (-1, 1), eight points (Abramowitz and Stegun 1964, table 25.4).
constexpr std::array<double, 4> kPlaces = {0.183434642495650, 0.525532409916329, 0.796666477413627,
                                           0.960289856497536};
constexpr std::array<double, 4> kWeights = {0.362683783378362, 0.313706645877887, 0.222381034453374,
                                            0.101228536290376};

// Places and weights of ∫ over (0, 1) with x = (1 − cos θ)/2, so that a square root at either end does no
// harm; two panels of θ.
struct Node {
  double place;
  double weight;
};
using Nodes = std::array<Node, 4 * kPlaces.size()>;

Nodes make_nodes() {
  constexpr double half_pi = 0.5 * std::numbers::pi;
  Nodes nodes;
  std::size_t count = 0;
  for (int panel = 0; panel < 2; ++panel) {
    for (std::size_t i = 0; i < kPlaces.size(); ++i) {
      for (const double sign : {-1.0, 1.0}) {
        const double angle = half_pi * (panel + 0.5 + 0.5 * sign * kPlaces[i]);
        nodes[count++] = {0.5 * (1.0 - std::cos(angle)), 0.25 * half_pi * kWeights[i] * std::sin(angle)};
      }
    }
  }
  return nodes;
}

}  // namespace

CyclePaths::CyclePaths(const CropRows& rows, const RowRay& ray, double height_m, const RowReach& reach) {
  if (ray.meets_ground()) return;
  const double low = std::max(height_m + reach.from_m * ray.rise, rows.base_m);
  const double high = std::min(height_m + reach.to_m * ray.rise, rows.height_m);
  if (!(high > low)) {
    parts_[count_++] = {1.0, 0.0, 0.0};
    return;
  }
  const auto path = [&](double across) { return row_path(rows, ray, across, height_m, reach); };
  breaks_of(rows, ray, height_m, low, high).pieces([&](double from, double length) {
    const double weight = length / rows.spacing_m;
    if (rows.section == RowSection::ellipse) {
      static const Nodes nodes = make_nodes();
      for (const Node& node : nodes) {
        const double at = path(from + node.place * length);
        parts_[count_++] = {weight * node.weight, at, at};
      }
      return;
    }
    // Read inside the piece: at its ends the path may jump.
    const double first = path(from + 0.25 * length), second = path(from + 0.75 * length);
    parts_[count_++] = {weight, std::max(0.0, 1.5 * first - 0.5 * second),
                        std::max(0.0, 1.5 * second - 0.5 * first)};
  });
}

double CyclePaths::passage(double depth_per_m) const {
  if (depth_per_m == 0.0 && count_ > 0) return 1.0;  // to the last bit
  double sum = 0.0;
  for (int i = 0; i < count_; ++i) {
    sum += parts_[i].weight * mean_passage(depth_per_m * parts_[i].from_m, depth_per_m * parts_[i].to_m);
  }
  return std::min(sum, 1.0);
}

}  // namespace sunfall

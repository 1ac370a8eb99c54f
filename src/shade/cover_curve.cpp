#include "shade/cover_curve.h"

#include <algorithm>
#include <cmath>

namespace sunfall {
namespace {

// Zero at a turning point; else the weighted harmonic mean of the slopes on both sides.
double inner_slope(double step_before, double before, double step_after, double after) {
  if (before * after <= 0.0) return 0.0;
  const double w = 2.0 * step_after + step_before;
  const double v = step_after + 2.0 * step_before;
  return (w + v) / (w / before + v / after);
}

// At the end, of the parabola through the last three points, kept from overshooting.
double end_slope(double step, double last, double step_before, double before) {
  const double slope = ((2.0 * step + step_before) * last - step * before) / (step + step_before);
  if (slope * last <= 0.0) return 0.0;
  return std::abs(slope) > 3.0 * std::abs(last) ? 3.0 * last : slope;
}

}  // namespace

CoverCurve::CoverCurve(const CoverReadings& readings) {
  double share = 0.0;
  for (const CoverReading& reading : readings) {
    const double total = reading.regular + reading.scattered;
    if (total > 0.0) share = reading.scattered / total;  // of no light, that of the last light
    angle_deg_.push_back(reading.angle_deg);
    total_.push_back(total);
    scattered_share_.push_back(share);
  }
  if (angle_deg_.back() < 90.0) {
    angle_deg_.push_back(90.0);
    total_.push_back(0.0);
    scattered_share_.push_back(share);
  }
  const std::size_t last = angle_deg_.size() - 1;
  slope_.assign(angle_deg_.size(), 0.0);
  const auto step = [&](std::size_t i) { return angle_deg_[i + 1] - angle_deg_[i]; };
  const auto rise = [&](std::size_t i) { return (total_[i + 1] - total_[i]) / step(i); };
  for (std::size_t i = 1; i < last; ++i) {
    slope_[i] = inner_slope(step(i - 1), rise(i - 1), step(i), rise(i));
  }
  slope_[last] = end_slope(step(last - 1), rise(last - 1), step(last - 2), rise(last - 2));
}

CoverPassage CoverCurve::at(double angle_deg) const {
  if (!(angle_deg < 90.0)) return {};
  const auto above = std::upper_bound(angle_deg_.begin(), angle_deg_.end(), std::max(angle_deg, 0.0));
  const auto i = static_cast<std::size_t>(above - angle_deg_.begin()) - 1;
  const double step = angle_deg_[i + 1] - angle_deg_[i];
  const double x = (std::max(angle_deg, 0.0) - angle_deg_[i]) / step;
  const double y = 1.0 - x;
  const double cubic = total_[i] * (1.0 + 2.0 * x) * y * y + total_[i + 1] * (1.0 + 2.0 * y) * x * x +
                       step * x * y * (slope_[i] * y - slope_[i + 1] * x);
  const auto [low, high] = std::minmax(total_[i], total_[i + 1]);
  const double total = std::clamp(cubic, low, high);  // against rounding alone
  const double share = scattered_share_[i] * y + scattered_share_[i + 1] * x;
  return {total * (1.0 - share), total * share};
}

}  // namespace sunfall

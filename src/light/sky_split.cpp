#include "light/sky_split.h"

#include <algorithm>
#include <limits>

namespace sunfall {
namespace {

double sky_of(const StepShare& step, double scale) {
  return std::clamp(scale * step.shape, step.least, step.most);
}

double sum_at(std::span<const StepShare> steps, double scale) {
  double sum = 0.0;
  for (const StepShare& step : steps) sum += sky_of(step, scale);
  return sum;
}

// The scale at which every step is full.
double full_scale(std::span<const StepShare> steps) {
  double scale = 0.0;
  for (const StepShare& step : steps) {
    if (step.shape > 0.0) scale = std::max(scale, step.most / step.shape);
  }
  return scale;
}

// The sum grows with the scale: halve the interval down to the last bits.
double scale_for(std::span<const StepShare> steps, double total) {
  double low = 0.0;
  double high = full_scale(steps);
  while (high - low > 4.0 * std::numeric_limits<double>::epsilon() * high) {
    const double middle = 0.5 * (low + high);
    (sum_at(steps, middle) < total ? low : high) = middle;
  }
  return high;
}

}  // namespace

std::vector<double> spread_sky(std::span<const StepShare> steps, double total) {
  const double scale = scale_for(steps, total);
  std::vector<double> sky;
  sky.reserve(steps.size());
  for (const StepShare& step : steps) sky.push_back(sky_of(step, scale));
  return sky;
}

}  // namespace sunfall

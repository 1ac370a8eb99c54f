#include "light/radiation_limits.h"

#include <cmath>

namespace sunfall {
namespace {

constexpr double kSine15 = 0.25881904510252074;  // zenith angle 75 degrees

}  // namespace

RadiationLimits physically_possible(double sine, double normal_w_m2) {
  const double power = std::pow(sine, 1.2);
  return {1.5 * normal_w_m2 * power + 100.0, 0.95 * normal_w_m2 * power + 50.0, normal_w_m2};
}

RadiationLimits extremely_rare(double sine, double normal_w_m2) {
  const double power = std::pow(sine, 1.2);
  return {1.2 * normal_w_m2 * power + 50.0, 0.75 * normal_w_m2 * power + 30.0,
          0.95 * normal_w_m2 * std::pow(sine, 0.2) + 10.0};
}

double closure_tolerance(double sine) { return sine > kSine15 ? 0.08 : 0.15; }

double most_diffuse_over_global(double sine) { return sine > kSine15 ? 1.05 : 1.10; }

}  // namespace sunfall

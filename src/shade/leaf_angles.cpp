#include "shade/leaf_angles.h"

#include <cmath>

namespace sunfall {
namespace {

// Campbell (1986): Λ makes the distribution's integral one. Below e = 1e-4 both forms are those of
// the sphere to 1e-9, and their quotients lose digits.
double normal_of(double x) {
  if (x < 1.0) {
    const double e = std::sqrt(1.0 - x * x);
    return x + (e < 1e-4 ? 1.0 : std::asin(e) / e);
  }
  const double e = std::sqrt(1.0 - 1.0 / (x * x));
  return x + (e < 1e-4 ? 1.0 : std::atanh(e) / e) / x;
}

}  // namespace

LeafAngles::LeafAngles(double x) : x_squared_(x * x), normal_(normal_of(x)) {}

// K = sqrt(x² + tan² Z) / Λ with Z the zenith angle; G = K cos Z.
double LeafAngles::projection(double sine) const {
  return std::sqrt(x_squared_ * sine * sine + (1.0 - sine * sine)) / normal_;
}

}  // namespace sunfall

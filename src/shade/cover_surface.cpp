#include "shade/cover_surface.h"

#include <cmath>
#include <numbers>

namespace sunfall {
namespace {

// A boundary's amplitude ratio (a - b)/(a + b), and its square's complement, which keeps its digits where the
// ratio is near one.
struct Boundary {
  double ratio;
  double through;
};
Boundary boundary(double a, double b) {
  const double sum = a + b;
  return {(a - b) / sum, 4.0 * a * b / (sum * sum)};
}

SurfaceLight bare(const Boundary& b) { return {b.through, b.ratio * b.ratio}; }

// Airy's sum over the coating's inner reflections (Born and Wolf, Principles of Optics, § 1.6.4): x and y the
// amplitude ratios of its two boundaries, the phase that of once there and back.
SurfaceLight coated(const Boundary& x, const Boundary& y, double cosine_of_phase) {
  const double both = 2.0 * x.ratio * y.ratio * cosine_of_phase;
  const double xx = x.ratio * x.ratio;
  const double yy = y.ratio * y.ratio;
  const double divisor = 1.0 + xx * yy + both;
  return {x.through * y.through / divisor, (xx + yy + both) / divisor};
}

}  // namespace

// n² - sin² = n² - 1 + cos²: no digits lost near grazing.
double cosine_within(double index, double cosine_in_air) {
  return std::sqrt((index - 1.0) * (index + 1.0) + cosine_in_air * cosine_in_air) / index;
}

Surface surface_at(double index, const std::optional<CoverCoating>& coating, double cosine,
                   double wavelength_nm) {
  const double within = cosine_within(index, cosine);
  if (!coating) {
    return {bare(boundary(cosine, index * within)), bare(boundary(index * cosine, within))};
  }
  const double n = coating->index;
  const double between = cosine_within(n, cosine);
  const double phase = std::numbers::pi * (coating->quarter_wave_nm / wavelength_nm) * between;
  return {coated(boundary(cosine, n * between), boundary(n * between, index * within), std::cos(phase)),
          coated(boundary(n * cosine, between), boundary(index * between, n * within), std::cos(phase))};
}

}  // namespace sunfall

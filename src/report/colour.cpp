#include "report/colour.h"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

namespace sunfall {
namespace {

// sRGB transfer function and primaries, IEC 61966-2-1; white D65.
double to_linear(double part) {
  return part <= 0.04045 ? part / 12.92 : std::pow((part + 0.055) / 1.055, 2.4);
}
double from_linear(double part) {
  const double value = part <= 0.0031308 ? 12.92 * part : 1.055 * std::pow(part, 1.0 / 2.4) - 0.055;
  return std::clamp(value, 0.0, 1.0);
}
constexpr double kWhiteX = 0.95047;
constexpr double kWhiteZ = 1.08883;

// CIE 15:2004, the exact fractions for its two constants.
constexpr double kEpsilon = 216.0 / 24389.0;
constexpr double kKappa = 24389.0 / 27.0;
double lab_curve(double t) { return t > kEpsilon ? std::cbrt(t) : (kKappa * t + 16.0) / 116.0; }
double inverse_lab_curve(double f) {
  const double cube = f * f * f;
  return cube > kEpsilon ? cube : (116.0 * f - 16.0) / kKappa;
}

double luminance(const Colour& colour) {
  return 0.2126 * to_linear(colour.red) + 0.7152 * to_linear(colour.green) + 0.0722 * to_linear(colour.blue);
}

// The scale's path through a* and b*: a cubic Bezier curve from night blue to straw that bends
// through green, which keeps clear of grey in the middle. Chosen by eye; it stays within sRGB.
constexpr double kDarkest = 16.0;
constexpr double kBrightest = 95.0;
constexpr std::array<std::array<double, 2>, 4> kPath{{{8, -27}, {-8, -46}, {-34, 46}, {-8, 38}}};

std::array<double, 2> path_at(double t) {
  const double s = 1.0 - t;
  const std::array<double, 4> weight{s * s * s, 3 * s * s * t, 3 * s * t * t, t * t * t};
  std::array<double, 2> point{};
  for (std::size_t i = 0; i < 4; ++i) {
    point[0] += weight[i] * kPath[i][0];
    point[1] += weight[i] * kPath[i][1];
  }
  return point;
}

// The path at 257 points of equal distance, so that every step of the scale looks as large as any
// other.
constexpr int kStops = 256;
std::vector<Colour> even_stops() {
  constexpr int kFine = 8192;
  std::vector<double> length(kFine + 1, 0.0);
  for (int i = 1; i <= kFine; ++i) {
    const auto a = path_at(static_cast<double>(i - 1) / kFine);
    const auto b = path_at(static_cast<double>(i) / kFine);
    length[i] = length[i - 1] + std::hypot(b[0] - a[0], b[1] - a[1]);
  }
  std::vector<Colour> stops;
  for (int stop = 0; stop <= kStops; ++stop) {
    const double share = static_cast<double>(stop) / kStops;
    const auto at = std::lower_bound(length.begin(), length.end(), share * length.back());
    const auto point = path_at(static_cast<double>(at - length.begin()) / kFine);
    stops.push_back(from_lab({kDarkest + (kBrightest - kDarkest) * share, point[0], point[1]}));
  }
  return stops;
}

}  // namespace

Lab to_lab(const Colour& colour) {
  const double r = to_linear(colour.red);
  const double g = to_linear(colour.green);
  const double b = to_linear(colour.blue);
  const double fx = lab_curve((0.4124564 * r + 0.3575761 * g + 0.1804375 * b) / kWhiteX);
  const double fy = lab_curve(0.2126729 * r + 0.7151522 * g + 0.0721750 * b);
  const double fz = lab_curve((0.0193339 * r + 0.1191920 * g + 0.9503041 * b) / kWhiteZ);
  return {116.0 * fy - 16.0, 500.0 * (fx - fy), 200.0 * (fy - fz)};
}

Colour from_lab(const Lab& lab) {
  const double fy = (lab.lightness + 16.0) / 116.0;
  const double x = kWhiteX * inverse_lab_curve(fy + lab.a / 500.0);
  const double y = inverse_lab_curve(fy);
  const double z = kWhiteZ * inverse_lab_curve(fy - lab.b / 200.0);
  return {from_linear(3.2404542 * x - 1.5371385 * y - 0.4985314 * z),
          from_linear(-0.9692660 * x + 1.8760108 * y + 0.0415560 * z),
          from_linear(0.0556434 * x - 0.2040259 * y + 1.0572252 * z)};
}

double colour_difference(const Lab& one, const Lab& other) {
  return std::hypot(one.lightness - other.lightness, one.a - other.a, one.b - other.b);
}

double contrast(const Colour& one, const Colour& other) {
  const auto [dark, bright] = std::minmax({luminance(one), luminance(other)});
  return (bright + 0.05) / (dark + 0.05);
}

std::string hexadecimal(const Colour& colour) {
  const auto byte = [](double part) { return std::lround(std::clamp(part, 0.0, 1.0) * 255.0); };
  return fmt::format("#{:02x}{:02x}{:02x}", byte(colour.red), byte(colour.green), byte(colour.blue));
}

Colour light_colour(double share) {
  static const std::vector<Colour> stops = even_stops();
  const double place = std::clamp(share, 0.0, 1.0) * kStops;
  const int below = std::min(static_cast<int>(place), kStops - 1);
  const double rest = place - below;
  const Colour& a = stops[below];
  const Colour& b = stops[below + 1];
  return {std::lerp(a.red, b.red, rest), std::lerp(a.green, b.green, rest), std::lerp(a.blue, b.blue, rest)};
}

double round_down_125(double value) {
  const double power = std::pow(10.0, std::floor(std::log10(value)));
  // A hair of tolerance, for values such as 0.2 whose quotient falls just short.
  const double digit = value / power * (1.0 + 1e-12);
  return (digit >= 10.0 ? 10.0 : digit >= 5.0 ? 5.0 : digit >= 2.0 ? 2.0 : 1.0) * power;
}

LightScale LightScale::holding(double largest, int most_steps) {
  if (!std::isfinite(largest) || largest <= 0.0) return {1.0, 0.2};
  double step = round_down_125(largest / most_steps);
  const auto steps = [&] { return std::ceil(largest / step * (1.0 - 1e-12)); };
  while (steps() > most_steps) step = round_down_125(step * 2.6);
  return {steps() * step, step};
}

std::vector<double> LightScale::ticks() const {
  std::vector<double> ticks;
  for (long i = 0; i <= std::lround(maximum / step); ++i) ticks.push_back(static_cast<double>(i) * step);
  return ticks;
}

}  // namespace sunfall

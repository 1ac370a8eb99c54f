#pragma once
// Angles as types: a bare double never stands for an angle across a function boundary.

#include <cmath>
#include <numbers>

namespace sunfall {

class Angle {
 public:
  constexpr Angle() = default;
  static constexpr Angle radians(double value) { return Angle(value); }
  static constexpr Angle degrees(double value) { return Angle(value * (std::numbers::pi / 180.0)); }

  constexpr double radians() const { return radians_; }
  constexpr double degrees() const { return radians_ * (180.0 / std::numbers::pi); }

  constexpr Angle operator-() const { return Angle(-radians_); }
  constexpr Angle operator+(Angle other) const { return Angle(radians_ + other.radians_); }
  constexpr Angle operator-(Angle other) const { return Angle(radians_ - other.radians_); }
  constexpr Angle operator*(double factor) const { return Angle(radians_ * factor); }
  constexpr auto operator<=>(const Angle&) const = default;

 private:
  constexpr explicit Angle(double radians) : radians_(radians) {}
  double radians_ = 0.0;
};

inline double sin(Angle angle) { return std::sin(angle.radians()); }
inline double cos(Angle angle) { return std::cos(angle.radians()); }
inline double tan(Angle angle) { return std::tan(angle.radians()); }

// The same direction in [0, 360) degrees.
inline Angle wrapped(Angle angle) {
  constexpr double turn = 2.0 * std::numbers::pi;
  double value = std::fmod(angle.radians(), turn);
  if (value < 0.0) value += turn;
  return Angle::radians(value >= turn ? 0.0 : value);
}

// A compass direction, clockwise from true north.
struct Azimuth {
  Angle from_true_north;
};

// A compass direction, clockwise from grid north, the +y axis of a map.
struct GridAzimuth {
  Angle from_grid_north;
};

// Convergence is the bearing of grid north: clockwise (east) of true north is positive.
inline GridAzimuth to_grid(Azimuth azimuth, Angle convergence) {
  return {wrapped(azimuth.from_true_north - convergence)};
}
inline Azimuth to_true(GridAzimuth azimuth, Angle convergence) {
  return {wrapped(azimuth.from_grid_north + convergence)};
}

}  // namespace sunfall

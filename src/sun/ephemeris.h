#pragma once
// The sun as seen from the Earth's centre, in the frame that turns with the Earth.

#include <array>
#include <cstddef>
#include <string>
#include <vector>

#include "sunfall/time.h"

namespace sunfall {

inline constexpr double kAstronomicalUnit_m = 149597870700.0;  // IAU 2012

// Apparent place: aberration, light time, precession and nutation included.
struct SolarCoordinates {
  // Right ascension counted from the origin of the Earth's rotation angle instead of the equinox,
  // which keeps nutation out of the hour angle: hour angle = rotation + longitude - ascension.
  double ascension_rad = 0.0;
  double declination_rad = 0.0;
  double distance_au = 1.0;
};

// Seconds of UTC since 1970, leap seconds not counted; whole seconds are UtcTime's.
inline double unix_seconds(UtcTime time) { return static_cast<double>(time.time_since_epoch().count()); }

// "ERFA 2.0.0", for provenance.
std::string ephemeris_version();

// The Earth's rotation angle, radians, with UT1 taken as UTC (they differ by less than 0.9 s).
double earth_rotation_rad(double unix_s);

// The full model; costs about 40 µs.
SolarCoordinates solar_coordinates(double unix_s);

// Right ascension from the true equinox of date, radians in [0, 2π): what almanacs print.
double equinox_right_ascension_rad(double unix_s, const SolarCoordinates& sun);

// The sun's path over a stretch of time: the full model every second day, cubic interpolation
// between.
// The fastest thing in it, the Earth's swing about its common centre with the moon (6.4", 29.5 days),
// leaves 1.4e-6 degrees, the fortnightly nutation 1e-6.
class SunPath {
 public:
  SunPath(UtcTime begin, UtcTime end);
  // Within [begin, end] of the constructor. The ascension is unwrapped.
  SolarCoordinates at(double unix_s) const;
  // Its distance alone.
  double distance_au(double unix_s) const;

 private:
  // Where in `nodes_` a moment lies, and the weights of the four nodes around it.
  struct Stencil {
    std::size_t first = 0;
    std::array<double, 4> weight{};
  };
  Stencil stencil(double unix_s) const;

  double first_node_s_ = 0.0;
  std::vector<SolarCoordinates> nodes_;
};

}  // namespace sunfall

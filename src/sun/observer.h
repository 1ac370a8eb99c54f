#pragma once
// From the Earth's centre to a place on its ground.

#include "sun/ephemeris.h"
#include "sunfall/sun.h"

namespace sunfall {

class Observer {
 public:
  explicit Observer(const Place& place);

  // Where the sun stands without refraction: topocentric (parallax, and the aberration by the
  // Earth's spin), a unit vector.
  SkyDirection geometric(const SolarCoordinates& sun, double unix_s) const;
  // Where its light comes from: the same lifted by refraction.
  SkyDirection apparent(const SkyDirection& geometric) const;

  // Counted from the meridian, west positive, in (-π, π].
  double hour_angle_rad(const SolarCoordinates& sun, double unix_s) const;

 private:
  double pressure_pa_;
  double longitude_rad_;
  double sin_latitude_;
  double cos_latitude_;
  double north_of_centre_au_;  // the place from the Earth's centre, in its own east, north and up
  double above_centre_au_;
  double spin_speed_;  // of the ground to the east, parts of light's speed
};

Angle elevation(const SkyDirection& direction);
Azimuth azimuth(const SkyDirection& direction);

}  // namespace sunfall

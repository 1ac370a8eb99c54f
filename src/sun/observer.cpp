#include "sun/observer.h"

#include <cmath>
#include <numbers>

#include "sun/atmosphere.h"

namespace sunfall {
namespace {

// WGS84.
constexpr double kEquatorRadius_m = 6378137.0;
constexpr double kFlattening = 1.0 / 298.257223563;
constexpr double kEccentricitySquared = kFlattening * (2.0 - kFlattening);

constexpr double kRotation_rad_s = 7.292115e-5;
constexpr double kLightSpeed_m_s = 299792458.0;

}  // namespace

Observer::Observer(const Place& place)
    : pressure_pa_(standard_pressure_pa(place.height_m)),
      longitude_rad_(place.longitude.radians()),
      sin_latitude_(sin(place.latitude)),
      cos_latitude_(cos(place.latitude)) {
  // The radius of curvature in the prime vertical.
  const double normal_m =
      kEquatorRadius_m / std::sqrt(1.0 - kEccentricitySquared * sin_latitude_ * sin_latitude_);
  const double north_m = -normal_m * kEccentricitySquared * sin_latitude_ * cos_latitude_;
  const double up_m =
      normal_m * (1.0 - kEccentricitySquared * sin_latitude_ * sin_latitude_) + place.height_m;
  north_of_centre_au_ = north_m / kAstronomicalUnit_m;
  above_centre_au_ = up_m / kAstronomicalUnit_m;
  spin_speed_ = kRotation_rad_s * (normal_m + place.height_m) * cos_latitude_ / kLightSpeed_m_s;
}

double Observer::hour_angle_rad(const SolarCoordinates& sun, double unix_s) const {
  return std::remainder(earth_rotation_rad(unix_s) + longitude_rad_ - sun.ascension_rad,
                        2.0 * std::numbers::pi);
}

SkyDirection Observer::geometric(const SolarCoordinates& sun, double unix_s) const {
  const double hour_angle = earth_rotation_rad(unix_s) + longitude_rad_ - sun.ascension_rad;
  const double sin_declination = std::sin(sun.declination_rad);
  const double cos_declination = std::cos(sun.declination_rad);
  const double to_meridian = cos_declination * std::cos(hour_angle);
  const double d = sun.distance_au;
  SkyDirection to_sun;
  to_sun.east = d * (spin_speed_ - cos_declination * std::sin(hour_angle));
  to_sun.north = d * (sin_declination * cos_latitude_ - to_meridian * sin_latitude_) - north_of_centre_au_;
  to_sun.up = d * (sin_declination * sin_latitude_ + to_meridian * cos_latitude_) - above_centre_au_;
  const double length =
      std::sqrt(to_sun.east * to_sun.east + to_sun.north * to_sun.north + to_sun.up * to_sun.up);
  return {to_sun.east / length, to_sun.north / length, to_sun.up / length};
}

SkyDirection Observer::apparent(const SkyDirection& geometric) const {
  constexpr double sine_of_no_refraction = -0.05;  // -2.87 degrees, a little below refraction's end
  if (geometric.up < sine_of_no_refraction) return geometric;
  const double level = std::sqrt(geometric.east * geometric.east + geometric.north * geometric.north);
  const Angle lift = refraction(Angle::radians(std::atan2(geometric.up, level)), pressure_pa_);
  if (level == 0.0 || lift == Angle{}) return geometric;
  // Turn the vector up in its own vertical plane.
  const double level_lifted = level * cos(lift) - geometric.up * sin(lift);
  const double up_lifted = geometric.up * cos(lift) + level * sin(lift);
  const double scale = level_lifted / level;
  return {geometric.east * scale, geometric.north * scale, up_lifted};
}

Angle elevation(const SkyDirection& direction) {
  return Angle::radians(std::atan2(direction.up, std::hypot(direction.east, direction.north)));
}

Azimuth azimuth(const SkyDirection& direction) {
  return {wrapped(Angle::radians(std::atan2(direction.east, direction.north)))};
}

}  // namespace sunfall

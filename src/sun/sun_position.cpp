#include "sun/ephemeris.h"
#include "sun/observer.h"
#include "sunfall/sun.h"

namespace sunfall {

SkyDirection direction(Azimuth azimuth, Angle elevation) {
  const double level = cos(elevation);
  return {level * sin(azimuth.from_true_north), level * cos(azimuth.from_true_north), sin(elevation)};
}

SunPosition sun_position(UtcTime time, const Place& place) {
  const double unix_s = unix_seconds(time);
  const SolarCoordinates sun = solar_coordinates(unix_s);
  const Observer observer(place);
  const SkyDirection geometric = observer.geometric(sun, unix_s);
  SunPosition position;
  position.azimuth = azimuth(geometric);
  position.elevation = elevation(geometric);
  position.apparent_elevation = elevation(observer.apparent(geometric));
  position.distance_au = sun.distance_au;
  return position;
}

double extraterrestrial_normal_w_m2(double distance_au) {
  return kSolarConstant_w_m2 / (distance_au * distance_au);
}

}  // namespace sunfall

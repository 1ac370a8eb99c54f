#include "sun/ephemeris.h"

#include <erfa.h>
#include <erfaextra.h>
#include <erfam.h>

#include <algorithm>
#include <array>
#include <cmath>

#include "core/parallel.h"
#include "sun/delta_t.h"

namespace sunfall {
namespace {

constexpr double kSecondsPerDay = 86400.0;
constexpr double kNodeSpacing_s = 2.0 * kSecondsPerDay;
constexpr double kUnixEpoch_jd = 2440587.5;

double tt_days_since_unix_epoch(double unix_s) {
  const UtcTime whole{std::chrono::seconds{static_cast<long long>(std::floor(unix_s))}};
  return (unix_s + tt_minus_utc_s(whole)) / kSecondsPerDay;
}

// The sun's apparent direction from the Earth's centre in the celestial reference system, and its
// distance in au. The sun's light left it a light time ago; the sun's own motion in that time is
// 0.01", the Earth's is the aberration (20").
double apparent_sun(double tt_days, double direction[3]) {
  double earth_from_sun[2][3];
  double earth[2][3];
  eraEpv00(kUnixEpoch_jd, tt_days, earth_from_sun, earth);
  const double distance_au = eraPm(earth_from_sun[0]);
  const double light_time_days = distance_au * ERFA_AULT / kSecondsPerDay;
  double sun_from_earth[3];
  double earth_speed[3];
  for (int i = 0; i < 3; ++i) {
    const double sun_speed = earth[1][i] - earth_from_sun[1][i];
    sun_from_earth[i] = -earth_from_sun[0][i] - sun_speed * light_time_days;
    earth_speed[i] = earth[1][i] * ERFA_AULT / kSecondsPerDay;  // au a day to parts of light's speed
  }
  double natural[3];
  double length = 0.0;
  eraPn(sun_from_earth, &length, natural);
  const double speed = eraPm(earth_speed);
  eraAb(natural, earth_speed, distance_au, std::sqrt(1.0 - speed * speed), direction);
  return distance_au;
}

// Greenwich apparent sidereal time less the rotation angle.
double equinox_from_origin_rad(double unix_s) {
  return eraAnpm(eraGst00b(kUnixEpoch_jd, unix_s / kSecondsPerDay) - earth_rotation_rad(unix_s));
}

}  // namespace

std::string ephemeris_version() { return std::string("ERFA ") + eraVersion(); }

double earth_rotation_rad(double unix_s) { return eraEra00(kUnixEpoch_jd, unix_s / kSecondsPerDay); }

SolarCoordinates solar_coordinates(double unix_s) {
  const double tt_days = tt_days_since_unix_epoch(unix_s);
  double celestial[3];
  SolarCoordinates sun;
  sun.distance_au = apparent_sun(tt_days, celestial);
  double of_date_from_celestial[3][3];
  eraPnm00b(kUnixEpoch_jd, tt_days, of_date_from_celestial);
  double of_date[3];
  eraRxp(of_date_from_celestial, celestial, of_date);
  double right_ascension = 0.0;
  eraC2s(of_date, &right_ascension, &sun.declination_rad);
  sun.ascension_rad = eraAnp(right_ascension - equinox_from_origin_rad(unix_s));
  return sun;
}

double equinox_right_ascension_rad(double unix_s, const SolarCoordinates& sun) {
  return eraAnp(sun.ascension_rad + equinox_from_origin_rad(unix_s));
}

SunPath::SunPath(UtcTime begin, UtcTime end) : first_node_s_(unix_seconds(begin) - kNodeSpacing_s) {
  const double gaps = std::max(0.0, (unix_seconds(end) - unix_seconds(begin)) / kNodeSpacing_s);
  const auto count = static_cast<std::size_t>(gaps) + 4;  // one before, two after
  nodes_.resize(count);
  on_all_cores(0, count, [&](std::size_t i) {
    nodes_[i] = solar_coordinates(first_node_s_ + static_cast<double>(i) * kNodeSpacing_s);
  });
  for (std::size_t i = 1; i < count; ++i) {
    const double step = eraAnpm(nodes_[i].ascension_rad - nodes_[i - 1].ascension_rad);
    nodes_[i].ascension_rad = nodes_[i - 1].ascension_rad + step;
  }
}

SunPath::Stencil SunPath::stencil(double unix_s) const {
  const double position = (unix_s - first_node_s_) / kNodeSpacing_s;
  const auto last = static_cast<double>(nodes_.size() - 3);
  const double left = std::clamp(std::floor(position), 1.0, last);
  const double t = position - left;
  // Lagrange weights of the nodes at -1, 0, 1 and 2.
  return {static_cast<std::size_t>(left) - 1,
          {-t * (t - 1.0) * (t - 2.0) / 6.0, (t + 1.0) * (t - 1.0) * (t - 2.0) / 2.0,
           -(t + 1.0) * t * (t - 2.0) / 2.0, (t + 1.0) * t * (t - 1.0) / 6.0}};
}

SolarCoordinates SunPath::at(double unix_s) const {
  const Stencil stencil = this->stencil(unix_s);
  SolarCoordinates sun{0.0, 0.0, 0.0};
  for (std::size_t k = 0; k < stencil.weight.size(); ++k) {
    const SolarCoordinates& node = nodes_[stencil.first + k];
    sun.ascension_rad += stencil.weight[k] * node.ascension_rad;
    sun.declination_rad += stencil.weight[k] * node.declination_rad;
    sun.distance_au += stencil.weight[k] * node.distance_au;
  }
  return sun;
}

double SunPath::distance_au(double unix_s) const {
  const Stencil stencil = this->stencil(unix_s);
  double distance_au = 0.0;
  for (std::size_t k = 0; k < stencil.weight.size(); ++k)
    distance_au += stencil.weight[k] * nodes_[stencil.first + k].distance_au;
  return distance_au;
}

}  // namespace sunfall

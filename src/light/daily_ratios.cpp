#include "light/daily_ratios.h"

#include <algorithm>
#include <cmath>
#include <numbers>

namespace sunfall {

Angle sunset_hour_angle(Angle latitude, Angle declination) {
  const double cosine = -tan(latitude) * tan(declination);
  return Angle::radians(std::acos(std::clamp(cosine, -1.0, 1.0)));
}

double erbs_monthly_diffuse_part(double clearness, Angle sunset_hour_angle) {
  const double k = std::min(clearness, 0.8);
  const double part = sunset_hour_angle <= Angle::degrees(81.4)
                          ? 1.391 + k * (-3.560 + k * (4.189 + k * -2.137))
                          : 1.311 + k * (-3.022 + k * (3.427 + k * -1.821));
  return std::min(part, 1.0);
}

double collares_pereira_rabl(Angle hour_angle, Angle sunset_hour_angle) {
  const Angle past_60 = sunset_hour_angle - Angle::degrees(60.0);
  const double a = 0.409 + 0.5016 * sin(past_60);
  const double b = 0.6609 - 0.4767 * sin(past_60);
  return std::max(0.0, a + b * cos(hour_angle));
}

}  // namespace sunfall

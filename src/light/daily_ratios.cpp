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

double collares_pereira_monthly_diffuse_part(double clearness, Angle sunset_hour_angle) {
  const double past_90 = (sunset_hour_angle - Angle::degrees(90.0)).radians();
  const Angle turn = Angle::radians(2.0 * (clearness - 0.9));
  return std::clamp(0.775 + 0.347 * past_90 - (0.505 + 0.261 * past_90) * cos(turn), 0.0, 1.0);
}

double erbs_daily_diffuse_part(double clearness, Angle sunset_hour_angle) {
  const double k = std::max(clearness, 0.0);
  if (sunset_hour_angle <= Angle::degrees(81.4)) {
    if (k >= 0.715) return 0.143;
    return std::min(1.0, 1.0 + k * (-0.2727 + k * (2.4495 + k * (-11.9514 + k * 9.3879))));
  }
  if (k >= 0.722) return 0.175;
  return std::min(1.0, 1.0 + k * (0.2832 + k * (-2.5557 + k * 0.8448)));
}

double collares_pereira_daily_diffuse_part(double clearness) {
  const double k = clearness;
  if (k <= 0.17) return 0.99;
  if (k < 0.75) return 1.188 + k * (-2.272 + k * (9.473 + k * (-21.856 + k * 14.648)));
  return k < 0.80 ? 0.632 - 0.54 * k : 0.2;
}

double daily_diffuse_part(DaySplit split, double clearness, Angle sunset_hour_angle) {
  return split == DaySplit::erbs ? erbs_daily_diffuse_part(clearness, sunset_hour_angle)
                                 : collares_pereira_daily_diffuse_part(clearness);
}

double monthly_diffuse_part(DaySplit split, double clearness, Angle sunset_hour_angle) {
  return split == DaySplit::erbs ? erbs_monthly_diffuse_part(clearness, sunset_hour_angle)
                                 : collares_pereira_monthly_diffuse_part(clearness, sunset_hour_angle);
}

const char* name_of(DaySplit split) {
  return split == DaySplit::erbs ? "Erbs, Klein and Duffie (1982)" : "Collares-Pereira and Rabl (1979)";
}

double collares_pereira_rabl(Angle hour_angle, Angle sunset_hour_angle) {
  const Angle past_60 = sunset_hour_angle - Angle::degrees(60.0);
  const double a = 0.409 + 0.5016 * sin(past_60);
  const double b = 0.6609 - 0.4767 * sin(past_60);
  return std::max(0.0, a + b * cos(hour_angle));
}

}  // namespace sunfall

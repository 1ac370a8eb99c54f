#pragma once
// Extraterrestrial radiation as FAO Irrigation and Drainage Paper 56 (Allen and others 1998)
// computes it, for comparison; equation numbers are the paper's.

#include <algorithm>
#include <cmath>
#include <numbers>

namespace sunfall::fao56 {

inline constexpr double kSolarConstant_mj_m2_min = 0.0820;  // 1366.67 W m-2
inline constexpr double kSolarConstant_w_m2 = kSolarConstant_mj_m2_min / 60.0 * 1e6;

inline double inverse_distance_squared(int day) {  // 23
  return 1.0 + 0.033 * std::cos(2.0 * std::numbers::pi * day / 365.0);
}
inline double declination_rad(int day) {  // 24
  return 0.409 * std::sin(2.0 * std::numbers::pi * day / 365.0 - 1.39);
}
inline double sunset_rad(double latitude_rad, double declination) {  // 25
  return std::acos(std::clamp(-std::tan(latitude_rad) * std::tan(declination), -1.0, 1.0));
}
// 21, for any declination and distance, MJ m-2 d-1.
inline double daily_mj_m2(double latitude_rad, double declination, double distance_factor) {
  const double sunset = sunset_rad(latitude_rad, declination);
  return 24.0 * 60.0 / std::numbers::pi * kSolarConstant_mj_m2_min * distance_factor *
         (sunset * std::sin(latitude_rad) * std::sin(declination) +
          std::cos(latitude_rad) * std::cos(declination) * std::sin(sunset));
}
inline double daily_mj_m2(double latitude_rad, int day) {
  return daily_mj_m2(latitude_rad, declination_rad(day), inverse_distance_squared(day));
}

}  // namespace sunfall::fao56

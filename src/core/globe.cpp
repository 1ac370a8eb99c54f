#include "core/globe.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace sunfall {

std::string globe_text(LonLat point) {
  const double longitude = std::remainder(point.longitude_deg, 360.0);
  return fmt::format("{:.4g}° {}, {:.4g}° {}", std::abs(point.latitude_deg),
                     point.latitude_deg < 0 ? "S" : "N", std::abs(longitude), longitude < 0 ? "W" : "E");
}

double distance_km(LonLat a, LonLat b) {
  constexpr double kRadian = std::numbers::pi / 180.0;
  const double north = std::sin(0.5 * (b.latitude_deg - a.latitude_deg) * kRadian);
  const double east = std::sin(0.5 * (b.longitude_deg - a.longitude_deg) * kRadian);
  const double half =
      north * north + std::cos(a.latitude_deg * kRadian) * std::cos(b.latitude_deg * kRadian) * east * east;
  return 2.0 * 6371.0 * std::asin(std::sqrt(std::min(half, 1.0)));
}

}  // namespace sunfall

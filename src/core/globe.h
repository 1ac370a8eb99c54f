#pragma once
// Points on the globe, for distances and messages.

#include <string>

namespace sunfall {

struct LonLat {
  double longitude_deg = 0.0;
  double latitude_deg = 0.0;
};

// "51.75° N, 5.75° E"
std::string globe_text(LonLat point);

// Along the great circle of a sphere of 6371 km: within 0.6 % of that on the ellipsoid.
double distance_km(LonLat a, LonLat b);

}  // namespace sunfall

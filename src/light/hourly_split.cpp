#include "light/hourly_split.h"

#include <algorithm>
#include <cmath>

namespace sunfall {

double erbs_hourly_diffuse_part(double clearness) {
  const double k = std::max(clearness, 0.0);
  if (k <= 0.22) return 1.0 - 0.09 * k;
  if (k > 0.80) return 0.165;
  return 0.9511 + k * (-0.1604 + k * (4.388 + k * (-16.638 + k * 12.336)));
}

// Copies with the sign of the solar time turned round are about; in the paper it is positive.
double brl_diffuse_part(const HourOfDay& hour) {
  const double exponent = -5.38 + 6.63 * hour.clearness + 0.006 * hour.solar_time_h -
                          0.007 * hour.elevation.degrees() + 1.75 * hour.day_clearness +
                          1.31 * hour.neighbours_clearness;
  return 1.0 / (1.0 + std::exp(exponent));
}

}  // namespace sunfall

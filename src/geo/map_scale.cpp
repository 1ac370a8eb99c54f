#include "geo/map_scale.h"

#include <cmath>

#include <fmt/format.h>

#include "geo/crs.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

// National grids and UTM stay within 0.3 %; 2 % of a horizon's tangent is less than heights err by.
constexpr double kMostScaleError = 0.02;

}  // namespace

void require_true_metres(const GridFrame& frame, const GeoPlace& middle, const std::string& where) {
  if (std::abs(middle.scale - 1.0) <= kMostScaleError) return;
  const std::string code = utm_code(middle.place.longitude.degrees(), middle.place.latitude.degrees());
  throw Error(
      ErrorKind::data,
      {"the map's metres are not metres on the ground here", where,
       fmt::format("{}, in which a metre on the ground measures {:.3f} m", crs_name(frame), middle.scale),
       fmt::format("Project it to a CRS made for this region: gdalwarp -t_srs {} -tr CELL CELL -r "
                   "bilinear IN.tif OUT.tif",
                   code)});
}

}  // namespace sunfall

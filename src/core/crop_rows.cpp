#include "sunfall/crop_rows.h"

#include <fmt/format.h>

namespace sunfall {
namespace {

struct Range {
  const char* key;
  double value;
  double least;
  double most;
  const char* unit;  // with its blank
  bool least_too;    // whether the least value itself will do
};

std::optional<RowFault> outside(const Range& range) {
  const bool enough = range.least_too ? range.value >= range.least : range.value > range.least;
  if (enough && range.value <= range.most) return std::nullopt;  // NaN is neither
  return RowFault{range.key,
                  fmt::format("{} must be {} {:g} and at most {:g}{}", range.key,
                              range.least_too ? "at least" : "above", range.least, range.most, range.unit),
                  fmt::format("{:g}{}", range.value, range.unit), ""};
}

}  // namespace

std::optional<RowFault> fault_of(const CropRows& rows) {
  const Range ranges[] = {
      {"spacing", rows.spacing_m, 0.0, 100.0, " m", false},
      {"height", rows.height_m, 0.0, 50.0, " m", false},
      {"width", rows.width_m, 0.0, 100.0, " m", false},
      {"base", rows.base_m, 0.0, 50.0, " m", true},
      {"leaf_density", rows.leaf_density, 0.0, 20.0, " m2 m-3", true},
      {"leaf_angle", rows.leaf_angle, 0.1, 10.0, "", true},
      {"clumping", rows.clumping, 0.0, 1.0, "", false},
      {"absorptance", rows.absorptance, 0.0, 1.0, "", false},
  };
  for (const Range& range : ranges) {
    if (auto fault = outside(range)) return fault;
  }
  if (rows.width_m > rows.spacing_m) {
    return RowFault{
        "width", "rows are wider than their spacing, so that they would grow into each other",
        fmt::format("width {:g} m, spacing {:g} m", rows.width_m, rows.spacing_m),
        "spacing counts from the middle of a row to the middle of the next; for a closed canopy set "
        "width to the spacing"};
  }
  if (rows.base_m >= rows.height_m) {
    return RowFault{"base", "the leaves begin at or above the height where they end",
                    fmt::format("base {:g} m, height {:g} m", rows.base_m, rows.height_m),
                    "base and height both count from the ground"};
  }
  return std::nullopt;
}

double leaf_area_index(const CropRows& rows) {
  const double frame = rows.width_m * (rows.height_m - rows.base_m);
  constexpr double kQuarterPi = 0.78539816339744831;
  const double filled = rows.section == RowSection::box       ? 1.0
                        : rows.section == RowSection::ellipse ? kQuarterPi
                                                              : 0.5;
  return rows.leaf_density * frame * filled / rows.spacing_m;
}

}  // namespace sunfall

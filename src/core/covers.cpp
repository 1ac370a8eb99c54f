#include "sunfall/covers.h"

#include <fmt/format.h>

#include <cmath>

namespace sunfall {
namespace {

constexpr std::size_t kMostSheets = 8;
constexpr double kLeastLastAngle_deg = 60.0;

struct Range {
  const char* key;
  double value;
  double least;
  double most;
  bool least_too;  // whether the end itself will do
  bool most_too;
  const char* remedy;
};

std::optional<CoverFault> outside(const Range& range, std::size_t item) {
  const bool enough = range.least_too ? range.value >= range.least : range.value > range.least;
  const bool not_too_much = range.most_too ? range.value <= range.most : range.value < range.most;
  if (enough && not_too_much) return std::nullopt;  // NaN is neither
  return CoverFault{range.key,
                    fmt::format("must be {} {:g} and {} {:g}", range.least_too ? "at least" : "above",
                                range.least, range.most_too ? "at most" : "below", range.most),
                    fmt::format("{:g}", range.value), range.remedy, item};
}

std::optional<CoverFault> fault_of_coating(const std::optional<CoverCoating>& coating, std::size_t item) {
  if (!coating) return std::nullopt;
  if (auto fault = outside({"coating_index", coating->index, 1.0, 3.0, true, true, ""}, item)) return fault;
  return outside({"coating_nm", coating->quarter_wave_nm, 100.0, 2000.0, true, true, ""}, item);
}

std::optional<CoverFault> fault_of_sheet(const CoverSheet& sheet, std::size_t item) {
  const Range ranges[] = {
      {"index", sheet.index, 1.0, 3.0, true, true, "The refractive index; glass has 1.526"},
      {"thickness_mm", sheet.thickness_m * 1000.0, 0.0, 100.0, false, true, ""},
      {"absorption", sheet.absorption_per_m, 0.0, 1e6, true, true, "Per metre; glass has 4 to 32"},
      {"haze", sheet.haze, 0.0, 1.0, true, true, "A share, 0.7 and not 70"},
      {"opaque", sheet.opaque, 0.0, 1.0, true, false, "A share, 0.05 and not 5"},
  };
  for (const Range& range : ranges) {
    if (auto fault = outside(range, item)) return fault;
  }
  if (auto fault = fault_of_coating(sheet.outer_coating, item)) return fault;
  return fault_of_coating(sheet.inner_coating, item);
}

std::optional<CoverFault> fault_of_sheets(const CoverSheets& sheets) {
  if (sheets.empty() || sheets.size() > kMostSheets) {
    return CoverFault{"sheets", fmt::format("a cover has 1 to {} sheets", kMostSheets),
                      fmt::format("{}", sheets.size()), "", std::nullopt};
  }
  for (std::size_t i = 0; i < sheets.size(); ++i) {
    if (auto fault = fault_of_sheet(sheets[i], i)) return fault;
  }
  return std::nullopt;
}

std::optional<CoverFault> fault_of_reading(const CoverReading& reading, std::size_t item) {
  if (auto fault = outside(
          {"angle", reading.angle_deg, 0.0, 90.0, true, true, "Degrees from the perpendicular to the cover"},
          item)) {
    return fault;
  }
  const char* share = "Shares of the light that falls on the cover, 0.83 and not 83";
  if (auto fault = outside({"regular", reading.regular, 0.0, 1.0, true, true, share}, item)) return fault;
  if (auto fault = outside({"scattered", reading.scattered, 0.0, 1.0, true, true, share}, item)) return fault;
  const double total = reading.regular + reading.scattered;
  if (total > 1.0) {
    return CoverFault{
        "scattered", "more light passes than falls on the cover",
        fmt::format("regular {:g} + scattered {:g} = {:g}", reading.regular, reading.scattered, total),
        "Regular light is the total less the scattered", item};
  }
  if (reading.angle_deg == 90.0 && total > 0.0) {
    return CoverFault{"angle", "light passes at 90 degrees, along the cover", fmt::format("{:g}", total),
                      "Give 0 there, or end at a lower angle", item};
  }
  return std::nullopt;
}

std::optional<CoverFault> fault_of_readings(const CoverReadings& readings) {
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (auto fault = fault_of_reading(readings[i], i)) return fault;
    if (i > 0 && !(readings[i].angle_deg > readings[i - 1].angle_deg)) {
      return CoverFault{"angle", "the angles must rise",
                        fmt::format("{:g} after {:g}", readings[i].angle_deg, readings[i - 1].angle_deg),
                        "Sort the lines by angle, each angle once", i};
    }
  }
  if (readings.empty() || readings.front().angle_deg != 0.0) {
    return CoverFault{"angle", "the first angle must be 0, the perpendicular",
                      readings.empty() ? "no angles" : fmt::format("{:g}", readings.front().angle_deg),
                      "Add the value at 0 degrees", 0};
  }
  if (readings.size() < 3 || readings.back().angle_deg < kLeastLastAngle_deg) {
    return CoverFault{
        "angle", fmt::format("needs three angles or more, up to {:g} degrees at least", kLeastLastAngle_deg),
        fmt::format("{} up to {:g}", readings.size(), readings.back().angle_deg),
        "Much of a winter's light comes in at flat angles; measure there, or describe the sheets",
        readings.size() - 1};
  }
  return std::nullopt;
}

}  // namespace

std::optional<CoverFault> fault_of(const Cover& cover) {
  if (const auto* sheets = std::get_if<CoverSheets>(&cover.made_of)) return fault_of_sheets(*sheets);
  return fault_of_readings(std::get<CoverReadings>(cover.made_of));
}

}  // namespace sunfall

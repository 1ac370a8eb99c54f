#include "geo/point_series.h"

#include <fmt/format.h>

#include <array>
#include <cmath>
#include <fstream>

#include "geo/open_dataset.h"
#include "geo/point_readers.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

enum class Kind { netcdf, grib, other };

// By its first bytes. A bulletin's heading may stand before a GRIB message.
Kind kind_of(const std::string& file) {
  constexpr std::size_t kHeading = 100;
  std::array<char, kHeading + 4> bytes{};
  std::ifstream in(file, std::ios::binary);
  in.read(bytes.data(), bytes.size());
  const std::string_view start(bytes.data(), static_cast<std::size_t>(in.gcount()));
  if (start.starts_with("CDF") || start.starts_with("\x89HDF\r\n\x1a\n")) return Kind::netcdf;
  return start.find("GRIB") != std::string_view::npos ? Kind::grib : Kind::other;
}

void require_order(const PointSeries& series, const std::string& file) {
  for (std::size_t i = 1; i < series.time_s.size(); ++i) {
    if (series.time_s[i] > series.time_s[i - 1]) continue;
    const bool twice = series.time_s[i] == series.time_s[i - 1];
    throw Error(ErrorKind::data,
                {.what = twice ? "the same time comes twice" : "the times go backward",
                 .where = file,
                 .found = fmt::format("time number {}", i + 1),
                 .remedy = "Join files without overlap; of forecasts that overlap keep one"});
  }
}

void require_values(const PointSeries& series, const PointQuery& query) {
  for (std::size_t v = 0; v < series.variables.size(); ++v) {
    bool any = false;
    for (const double value : series.variables[v].value) any = any || !std::isnan(value);
    if (any) continue;
    throw Error(ErrorKind::data,
                {.what = "the variable has no value there",
                 .where = query.file.string(),
                 .found = query.variables[v] + " at " + series.points,
                 .remedy = "The point may be masked as sea; take a file that has values on this land"});
  }
}

}  // namespace

std::string names_in_line(const std::vector<std::string>& names) {
  constexpr std::size_t kMost = 20;
  std::string line;
  for (std::size_t i = 0; i < std::min(kMost, names.size()); ++i) line += (i > 0 ? ", " : "") + names[i];
  return names.size() > kMost ? line + ", …" : line;
}

PointSeries read_point_series(const PointQuery& query) {
  const std::string where = query.file.string();
  const std::string file = checked_file(query.file, where);
  const Kind kind = kind_of(file);
  if (kind == Kind::other) {
    throw Error(ErrorKind::data, {.what = "the file is neither NetCDF nor GRIB",
                                  .where = where,
                                  .found = "",
                                  .remedy = "Name a table of text under [light.series] instead"});
  }
  PointSeries series = kind == Kind::netcdf ? read_netcdf_point(query, file) : read_grib_point(query, file);
  require_order(series, where);
  require_values(series, query);
  return series;
}

}  // namespace sunfall

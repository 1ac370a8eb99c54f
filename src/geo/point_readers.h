#pragma once
// One reader per kind of gridded file. Private to geo.

#include "geo/point_series.h"

namespace sunfall {

// `file` is the query's file as checked_file() gives it.
PointSeries read_netcdf_point(const PointQuery& query, const std::string& file);
PointSeries read_grib_point(const PointQuery& query, const std::string& file);

inline constexpr std::size_t kMostTimes = 20'000'000;  // 38 years of minutes
inline constexpr std::size_t kMostAlongAxis = 1'000'000;
// GDAL and the libraries below it decode a chunk as a whole.
inline constexpr double kLargestChunk_bytes = 1024.0 * 1024.0 * 1024.0;

// "time, ssrd, fdir" for messages; cut when long.
std::string names_in_line(const std::vector<std::string>& names);

}  // namespace sunfall

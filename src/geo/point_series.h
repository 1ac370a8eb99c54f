#pragma once
// A gridded weather file (NetCDF or GRIB) at one place: plain columns over time. A file in degrees is right
// here; it is a climate, not a map.

#include <cstdint>
#include <filesystem>
#include <string>
#include <vector>

#include "sunfall/sun.h"

namespace sunfall {

struct PointQuery {
  std::filesystem::path file;
  std::vector<std::string> variables;  // by name; a GRIB's by its element, "DSWRF"
  Place place;
  bool bilinear = false;  // between the four points around instead of the nearest
};

struct PointSeries {
  struct Variable {
    std::string unit;           // as the file writes it, empty where it does not
    std::vector<double> value;  // one per time, in that unit; NaN where missing
  };
  std::vector<std::int64_t> time_s;  // the file's own time axis, seconds of UTC since 1970, increasing
  std::vector<std::int64_t>
      run_s;  // when the forecast of each value began; empty where the file does not say
  std::vector<Variable> variables;  // in the order of the query
  std::string points;               // for people: which points were taken, and how far they are
};

// Throws Error(data) for a file that is neither, is broken or of a hostile size, lacks a variable (those it
// has are named), has no grid along longitude and latitude (or, in a GRIB, along a projection that PROJ
// knows), no time, or whose grid does not reach the place: it may lie half a spacing beyond the outermost
// points.
PointSeries read_point_series(const PointQuery& query);

}  // namespace sunfall

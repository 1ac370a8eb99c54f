#pragma once
// Small gridded weather files, made where they are needed.

#include <cstdint>
#include <filesystem>
#include <functional>
#include <string>
#include <vector>

namespace sunfall::test {

struct WeatherVariable {
  std::string name;
  std::string unit;
  // By number of the time, and longitude and latitude in degrees.
  std::function<double(std::size_t time, double longitude, double latitude)> value;
  double scale = 0.0;      // packed into 16 bits as value / scale; 0: doubles
  double fill = -32767.0;  // stands for NaN
};

struct WeatherOrder {
  std::vector<double> longitudes{5.5, 5.75, 6.0};
  std::vector<double> latitudes{52.25, 52.0, 51.75};
  std::string time_unit = "hours since 1970-01-01 00:00:00";
  std::string calendar = "proleptic_gregorian";
  std::vector<double> times;
  std::vector<WeatherVariable> variables;
  std::string crs = "WGS84";  // of a GRIB; in a projection the axes are metres
  std::string levels;         // a dimension of two between time and latitude, where named
};

void write_netcdf(const std::filesystem::path& file, const WeatherOrder& order);

// Messages of down-welling short-wave flux ("DSWRF", W m-2), one per time, in the order given. `run_s` is the
// start of each one's forecast. The grid must be equally spaced
// and from north to south.
struct GribMessage {
  std::int64_t time_s = 0;
  std::int64_t run_s = 0;
};
void write_grib(const std::filesystem::path& file, const WeatherOrder& order,
                const std::vector<GribMessage>& messages);

}  // namespace sunfall::test

#include "geo/weather_file.h"

#include <gdal_priv.h>

#include <algorithm>
#include <cmath>
#include <ctime>
#include <fstream>
#include <limits>
#include <memory>
#include <stdexcept>

#include "geo/layer_writer.h"

namespace sunfall::test {
namespace {

using Group = std::shared_ptr<GDALGroup>;
using Dimension = std::shared_ptr<GDALDimension>;
using Array = std::shared_ptr<GDALMDArray>;

void require(bool done, const char* what) {
  if (!done) throw std::runtime_error(what);
}

GDALDriver& driver(const char* name) {
  start_geo();
  GDALDriver* found = GetGDALDriverManager()->GetDriverByName(name);
  require(found != nullptr, name);
  return *found;
}

void put_text(const Array& array, const char* name, const std::string& text) {
  if (!text.empty())
    array->CreateAttribute(name, {}, GDALExtendedDataType::CreateString())->Write(text.c_str());
}

Dimension put_axis(const Group& root, const std::string& name, const std::string& unit,
                   const std::vector<double>& values) {
  const Dimension dimension = root->CreateDimension(name, "", "", values.size());
  const Array array = root->CreateMDArray(name, {dimension}, GDALExtendedDataType::Create(GDT_Float64));
  require(array != nullptr, "axis");
  if (!unit.empty()) array->SetUnit(unit);
  const GUInt64 start[] = {0};
  const std::size_t count[] = {values.size()};
  require(
      array->Write(start, count, nullptr, nullptr, GDALExtendedDataType::Create(GDT_Float64), values.data()),
      "axis values");
  return dimension;
}

std::vector<double> packed(const WeatherOrder& order, const WeatherVariable& variable) {
  std::vector<double> values;
  const std::size_t levels = order.levels.empty() ? 1 : 2;
  for (std::size_t t = 0; t < order.times.size() * levels; ++t) {
    for (const double latitude : order.latitudes) {
      for (const double longitude : order.longitudes) {
        const double value = variable.value(t / levels, longitude, latitude);
        values.push_back(std::isnan(value)      ? variable.fill
                         : variable.scale > 0.0 ? std::round(value / variable.scale)
                                                : value);
      }
    }
  }
  return values;
}

}  // namespace

void write_netcdf(const std::filesystem::path& file, const WeatherOrder& order) {
  const std::unique_ptr<GDALDataset> dataset(
      driver("netCDF").CreateMultiDimensional(file.c_str(), nullptr, nullptr));
  require(dataset != nullptr, "netCDF file");
  const Group root = dataset->GetRootGroup();
  std::vector<Dimension> dimensions{put_axis(root, "time", order.time_unit, order.times)};
  put_text(root->OpenMDArray("time"), "calendar", order.calendar);
  if (!order.levels.empty()) dimensions.push_back(put_axis(root, order.levels, "", {1.0, 5.0}));
  dimensions.push_back(put_axis(root, "latitude", "degrees_north", order.latitudes));
  dimensions.push_back(put_axis(root, "longitude", "degrees_east", order.longitudes));
  for (const WeatherVariable& variable : order.variables) {
    const auto type = GDALExtendedDataType::Create(variable.scale > 0.0 ? GDT_Int16 : GDT_Float64);
    const Array array = root->CreateMDArray(variable.name, dimensions, type);
    require(array != nullptr, "variable");
    if (!variable.unit.empty()) array->SetUnit(variable.unit);
    array->SetNoDataValue(variable.fill);
    if (variable.scale > 0.0) array->SetScale(variable.scale);
    const std::vector<double> values = packed(order, variable);
    std::vector<GUInt64> start(dimensions.size(), 0);
    std::vector<std::size_t> count;
    for (const Dimension& dimension : dimensions)
      count.push_back(static_cast<std::size_t>(dimension->GetSize()));
    require(array->Write(start.data(), count.data(), nullptr, nullptr,
                         GDALExtendedDataType::Create(GDT_Float64), values.data()),
            "values");
  }
}

namespace {

void write_some_grib(const std::filesystem::path& file, const WeatherOrder& order,
                     const std::vector<GribMessage>& messages, std::size_t first, int count) {
  const int columns = static_cast<int>(order.longitudes.size());
  const int rows = static_cast<int>(order.latitudes.size());
  const std::unique_ptr<GDALDataset> memory(
      driver("MEM").Create("", columns, rows, count, GDT_Float64, nullptr));
  const double dx = order.longitudes[1] - order.longitudes[0];
  const double dy = order.latitudes[1] - order.latitudes[0];
  double to_map[6] = {order.longitudes[0] - 0.5 * dx, dx, 0.0, order.latitudes[0] - 0.5 * dy, 0.0, dy};
  memory->SetGeoTransform(to_map);
  OGRSpatialReference crs;
  crs.SetFromUserInput(order.crs.c_str());
  crs.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
  memory->SetSpatialRef(&crs);
  CPLStringList options;
  options.SetNameValue("DATA_ENCODING", "IEEE_FLOATING_POINT");
  for (int b = 1; b <= count; ++b) {
    const std::size_t number = first + static_cast<std::size_t>(b - 1);
    const GribMessage& message = messages[number];
    std::vector<double> values;
    for (const double latitude : order.latitudes) {
      for (const double longitude : order.longitudes)
        values.push_back(order.variables[0].value(number, longitude, latitude));
    }
    require(memory->GetRasterBand(b)->RasterIO(GF_Write, 0, 0, columns, rows, values.data(), columns, rows,
                                               GDT_Float64, 0, 0, nullptr) == CE_None,
            "values");
    const std::time_t run = message.run_s;
    char text[40];
    std::strftime(text, sizeof text, "%Y-%m-%dT%H:%M:%SZ", std::gmtime(&run));
    const std::string prefix = "BAND_" + std::to_string(b) + "_";
    options.SetNameValue((prefix + "IDS").c_str(),
                         ("CENTER=255 SUBCENTER=0 MASTER_TABLE=24 LOCAL_TABLE=0 SIGNF_REF_TIME=1 REF_TIME=" +
                          std::string(text) + " PROD_STATUS=0 TYPE=1")
                             .c_str());
    options.SetNameValue((prefix + "PDS_PDTN").c_str(), "0");
    // Category 4 (short-wave radiation), forecast time in minutes (unit 0).
    options.SetNameValue(
        (prefix + "PDS_TEMPLATE_ASSEMBLED_VALUES").c_str(),
        ("4 7 2 0 81 0 0 0 " + std::to_string((message.time_s - message.run_s) / 60) + " 1 0 0 255 0 0")
            .c_str());
  }
  const std::unique_ptr<GDALDataset> written(
      driver("GRIB").CreateCopy(file.c_str(), memory.get(), FALSE, options.List(), nullptr, nullptr));
  require(written != nullptr, "GRIB file");
}

}  // namespace

// A file of messages is their sum; GDAL's time for one file grows with the square of their number.
void write_grib(const std::filesystem::path& file, const WeatherOrder& order,
                const std::vector<GribMessage>& messages) {
  constexpr std::size_t kAtOnce = 250;
  const std::filesystem::path part = file.string() + ".part";
  std::ofstream whole(file, std::ios::binary);
  for (std::size_t first = 0; first < messages.size(); first += kAtOnce) {
    const std::size_t count = std::min(kAtOnce, messages.size() - first);
    write_some_grib(part, order, messages, first, static_cast<int>(count));
    whole << std::ifstream(part, std::ios::binary).rdbuf();
  }
  std::filesystem::remove(part);
}

}  // namespace sunfall::test

#include <gdal_priv.h>

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>
#include <memory>
#include <optional>

#include "geo/cf_time.h"
#include "geo/gdal_guard.h"
#include "geo/grid_points.h"
#include "geo/layer_writer.h"
#include "geo/point_readers.h"

namespace sunfall {
namespace {

using Array = std::shared_ptr<GDALMDArray>;
using Dimension = std::shared_ptr<GDALDimension>;

enum class Role { time, latitude, longitude, lone, other };

std::string text_attribute(const Array& array, const char* name) {
  const auto attribute = array->GetAttribute(name);
  const char* text = attribute ? attribute->ReadAsString() : nullptr;
  return text != nullptr ? text : "";
}

std::string unit_of(const Array& array) {
  const std::string unit = array->GetUnit();
  return unit.empty() ? text_attribute(array, "units") : unit;
}

// CF sections 4.1 and 4.2: a coordinate is known by its units.
bool starts_with_any(const std::string& text, std::initializer_list<const char*> starts) {
  return std::any_of(starts.begin(), starts.end(),
                     [&](const char* start) { return text.starts_with(start); });
}
Role role_of(const Dimension& dimension) {
  const Array values = dimension->GetIndexingVariable();
  if (values) {
    const std::string unit = unit_of(values);
    if (starts_with_any(unit,
                        {"degrees_north", "degree_north", "degrees_N", "degree_N", "degreesN", "degreeN"}))
      return Role::latitude;
    if (starts_with_any(unit,
                        {"degrees_east", "degree_east", "degrees_E", "degree_E", "degreesE", "degreeE"}))
      return Role::longitude;
    if (unit.find(" since ") != std::string::npos) return Role::time;
  }
  return dimension->GetSize() == 1 ? Role::lone : Role::other;
}

class NetcdfReader {
 public:
  NetcdfReader(const PointQuery& query, const std::string& file)
      : query_(query), where_(query.file.string()) {
    static constexpr const char* kDrivers[] = {"netCDF", nullptr};
    dataset_.reset(GDALDataset::Open(
        file.c_str(), GDAL_OF_MULTIDIM_RASTER | GDAL_OF_READONLY | GDAL_OF_VERBOSE_ERROR, kDrivers));
    root_ = dataset_ ? dataset_->GetRootGroup() : nullptr;
    if (!root_)
      guard_.fail(ErrorKind::data, "the NetCDF file cannot be read", where_, "Copy it again, whole");
  }

  PointSeries read() {
    PointSeries series;
    for (const std::string& name : query_.variables) {
      const Array array = open(name);
      check_chunk(array, name);
      const Shape shape = shape_of(array, name);
      if (series.time_s.empty()) {
        series.time_s = times(shape.dimensions[shape.at_time]);
        time_name_ = shape.dimensions[shape.at_time]->GetFullName();
      } else if (shape.dimensions[shape.at_time]->GetFullName() != time_name_) {
        refuse("the variables have different time axes", name, "Give a file whose variables share one");
      }
      const ChosenPoints chosen = points(shape);
      series.points = chosen.words;
      series.variables.push_back({unit_of(array), values(array, shape, chosen, name)});
    }
    return series;
  }

 private:
  // Which of an array's dimensions is what.
  struct Shape {
    std::vector<Dimension> dimensions;
    std::size_t at_time = 0;
    std::size_t at_latitude = 0;
    std::size_t at_longitude = 0;
  };

  [[noreturn]] void refuse(std::string what, std::string found, std::string remedy) const {
    throw Error(ErrorKind::data, {std::move(what), where_, std::move(found), std::move(remedy)});
  }

  Array open(const std::string& name) {
    const std::vector<std::string> names = root_->GetMDArrayNames();
    if (std::find(names.begin(), names.end(), name) == names.end()) {
      refuse("the file has no variable of that name", "\"" + name + "\"",
             "Its variables are " + names_in_line(names));
    }
    const Array array = root_->OpenMDArray(name);
    if (!array || array->GetDataType().GetClass() != GEDTC_NUMERIC ||
        GDALDataTypeIsComplex(array->GetDataType().GetNumericDataType())) {
      refuse("the variable is not numbers", name, "");
    }
    return array;
  }

  void check_chunk(const Array& array, const std::string& name) const {
    double bytes = static_cast<double>(array->GetDataType().GetSize());
    for (const GUInt64 size : array->GetBlockSize()) bytes *= static_cast<double>(std::max<GUInt64>(size, 1));
    if (bytes <= kLargestChunk_bytes) return;
    refuse("the variable is stored in chunks too large to read",
           fmt::format("{}, {:.3g} bytes a chunk", name, bytes), "Store it in smaller chunks");
  }

  Shape shape_of(const Array& array, const std::string& name) const {
    Shape shape;
    shape.dimensions = array->GetDimensions();
    int times = 0, latitudes = 0, longitudes = 0;
    for (std::size_t i = 0; i < shape.dimensions.size(); ++i) {
      const Dimension& dimension = shape.dimensions[i];
      const Role role = role_of(dimension);
      if (role == Role::other) {
        refuse("the variable has a dimension that is neither time, latitude nor longitude",
               fmt::format("{} over {} ({})", name, dimension->GetName(), dimension->GetSize()),
               "Take one of its levels or members out, and a grid along latitude and longitude");
      }
      const GUInt64 most = role == Role::time ? kMostTimes : kMostAlongAxis;
      if (dimension->GetSize() < 1 || dimension->GetSize() > most) {
        refuse("the variable's size is not believable",
               fmt::format("{} long in {}", dimension->GetSize(), dimension->GetName()), "Check the file");
      }
      if (role == Role::time) ++times, shape.at_time = i;
      if (role == Role::latitude) ++latitudes, shape.at_latitude = i;
      if (role == Role::longitude) ++longitudes, shape.at_longitude = i;
    }
    if (times == 1 && latitudes == 1 && longitudes == 1) return shape;
    refuse("the variable is not a series on a grid of latitude and longitude", name,
           "Each of its dimensions time, latitude and longitude needs a variable of the same name with units "
           "such as "
           "\"hours since 1970-01-01\", \"degrees_north\", \"degrees_east\"");
  }

  std::vector<double> read_all(const Dimension& dimension) {
    const Array array = dimension->GetIndexingVariable();
    const auto count = static_cast<std::size_t>(dimension->GetSize());
    if (!array || array->GetDimensionCount() != 1) {
      refuse("a coordinate is not along its own dimension", dimension->GetName(), "");
    }
    std::vector<double> values(count);
    const GUInt64 start[] = {0};
    const std::size_t counts[] = {count};
    if (!array->Read(start, counts, nullptr, nullptr, GDALExtendedDataType::Create(GDT_Float64),
                     values.data())) {
      guard_.fail(ErrorKind::data, "a coordinate cannot be read", where_, "Copy the file again, whole");
    }
    unpack(array, values);
    return values;
  }

  std::vector<std::int64_t> times(const Dimension& dimension) {
    const Array array = dimension->GetIndexingVariable();
    const std::string calendar = text_attribute(array, "calendar");
    if (!is_world_calendar(calendar)) {
      refuse("the file's calendar is not that of the world", calendar, "Take data of a real calendar");
    }
    const std::string unit = unit_of(array);
    const auto cf = parse_cf_time(unit);
    if (!cf) {
      refuse("the unit of the time cannot be read", unit,
             "CF wants seconds, minutes, hours or days since a date, \"hours since 1970-01-01 00:00\"");
    }
    std::vector<std::int64_t> all;
    for (const double value : read_all(dimension)) {
      const double seconds = value * cf->unit_s;
      if (!(std::abs(seconds) < 1e11))
        refuse("a time is missing or out of reach", fmt::format("{:g}", value), "");
      all.push_back(cf->epoch_s + std::llround(seconds));
    }
    return all;
  }

  ChosenPoints points(const Shape& shape) {
    PointGrid grid{where_, read_all(shape.dimensions[shape.at_longitude]),
                   read_all(shape.dimensions[shape.at_latitude]), 360.0, [](double x, double y) {
                     return LonLat{x, y};
                   }};
    return choose_points(grid, query_.place.longitude.degrees(), query_.place.latitude.degrees(),
                         query_.place, query_.bilinear);
  }

  // CF section 8.1: packed numbers; the fill value is compared before unpacking.
  static void unpack(const Array& array, std::vector<double>& values) {
    bool has_nodata = false, has_scale = false, has_offset = false;
    const double nodata = array->GetNoDataValueAsDouble(&has_nodata);
    const double scale = array->GetScale(&has_scale);
    const double offset = array->GetOffset(&has_offset);
    for (double& value : values) {
      if (has_nodata && value == nodata) {
        value = std::numeric_limits<double>::quiet_NaN();
        continue;
      }
      value = value * (has_scale ? scale : 1.0) + (has_offset ? offset : 0.0);
    }
  }

  std::vector<double> values(const Array& array, const Shape& shape, const ChosenPoints& chosen,
                             const std::string& name) {
    const auto count = static_cast<std::size_t>(shape.dimensions[shape.at_time]->GetSize());
    std::vector<double> sums(count, 0.0);
    for (const GridPoint& point : chosen.points) {
      std::vector<GUInt64> start(shape.dimensions.size(), 0);
      std::vector<std::size_t> counts(shape.dimensions.size(), 1);
      start[shape.at_longitude] = point.column;
      start[shape.at_latitude] = point.row;
      counts[shape.at_time] = count;
      std::vector<double> column(count);
      if (!array->Read(start.data(), counts.data(), nullptr, nullptr,
                       GDALExtendedDataType::Create(GDT_Float64), column.data()) ||
          guard_.failed()) {
        guard_.fail(ErrorKind::data, "the variable cannot be read: " + name, where_,
                    "Copy the file again, whole");
      }
      unpack(array, column);
      for (std::size_t i = 0; i < count; ++i) sums[i] += point.weight * column[i];
    }
    return sums;
  }

  const PointQuery& query_;
  std::string where_;
  GdalGuard guard_;
  std::unique_ptr<GDALDataset> dataset_;
  std::shared_ptr<GDALGroup> root_;
  std::string time_name_;
};

}  // namespace

PointSeries read_netcdf_point(const PointQuery& query, const std::string& file) {
  start_geo();
  return NetcdfReader(query, file).read();
}

}  // namespace sunfall

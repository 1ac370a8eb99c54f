#include <gdal_priv.h>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <limits>
#include <map>
#include <memory>

#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "geo/grid_points.h"
#include "geo/layer_writer.h"
#include "geo/point_readers.h"

namespace sunfall {
namespace {

std::string item(GDALRasterBand& band, const char* name) {
  const char* text = band.GetMetadataItem(name);
  return text != nullptr ? text : "";
}

// "1748757600", in older files "  1748757600 sec UTC".
std::int64_t seconds_item(GDALRasterBand& band, const char* name) {
  return std::strtoll(item(band, name).c_str(), nullptr, 10);
}

struct Message {
  int band = 0;
  std::size_t variable = 0;
  std::int64_t time_s = 0;
  std::int64_t run_s = 0;
};

class GribReader {
 public:
  GribReader(const PointQuery& query, const std::string& file) : query_(query), where_(query.file.string()) {
    static constexpr const char* kDrivers[] = {"GRIB", nullptr};
    // An index beside the file could name other messages than it holds.
    static constexpr const char* kOptions[] = {"USE_IDX=NO", nullptr};
    dataset_.reset(GDALDataset::Open(file.c_str(), GDAL_OF_RASTER | GDAL_OF_READONLY | GDAL_OF_VERBOSE_ERROR,
                                     kDrivers, kOptions));
    if (!dataset_)
      guard_.fail(ErrorKind::data, "the GRIB file cannot be read", where_, "Copy it again, whole");
    const auto columns = static_cast<std::size_t>(dataset_->GetRasterXSize());
    const auto rows = static_cast<std::size_t>(dataset_->GetRasterYSize());
    const double bytes = 8.0 * static_cast<double>(columns) * static_cast<double>(rows);
    if (columns > kMostAlongAxis || rows > kMostAlongAxis || bytes > kLargestChunk_bytes) {
      refuse("the grid's size is not believable", fmt::format("{} columns x {} rows", columns, rows),
             "Check the file");
    }
  }

  PointSeries read() {
    const ChosenPoints chosen = points();
    std::vector<Message> messages = wanted_messages();
    std::stable_sort(messages.begin(), messages.end(),
                     [](const Message& a, const Message& b) { return a.time_s < b.time_s; });
    PointSeries series;
    series.points = chosen.words;
    series.variables.resize(query_.variables.size());
    std::vector<bool> known;
    for (const Message& message : messages) {
      if (series.time_s.empty() || message.time_s != series.time_s.back()) {
        series.time_s.push_back(message.time_s);
        series.run_s.push_back(message.run_s);
        known.assign(series.variables.size(), false);
        for (auto& variable : series.variables)
          variable.value.push_back(std::numeric_limits<double>::quiet_NaN());
      }
      if (known[message.variable] || message.run_s != series.run_s.back()) refuse_twice(message);
      known[message.variable] = true;
      PointSeries::Variable& variable = series.variables[message.variable];
      variable.unit = item(*dataset_->GetRasterBand(message.band), "GRIB_UNIT");
      variable.value.back() = value(message.band, chosen);
    }
    return series;
  }

 private:
  [[noreturn]] void refuse(std::string what, std::string found, std::string remedy) const {
    throw Error(ErrorKind::data, {std::move(what), where_, std::move(found), std::move(remedy)});
  }
  [[noreturn]] void refuse_twice(const Message& message) const {
    GDALRasterBand& band = *dataset_->GetRasterBand(message.band);
    refuse("the same time comes twice",
           fmt::format("{} ({}) in message {}", query_.variables[message.variable], band.GetDescription(),
                       message.band),
           "Of levels, members and forecasts that overlap keep one");
  }

  ChosenPoints points() {
    double to_map[6];
    if (dataset_->GetGeoTransform(to_map) != CE_None || to_map[2] != 0.0 || to_map[4] != 0.0 ||
        to_map[1] == 0.0 || to_map[5] == 0.0) {
      refuse("the file has no regular grid", "", "Take a file on a regular grid");
    }
    PointGrid grid;
    grid.file = where_;
    for (int i = 0; i < dataset_->GetRasterXSize(); ++i) grid.x.push_back(to_map[0] + (i + 0.5) * to_map[1]);
    for (int i = 0; i < dataset_->GetRasterYSize(); ++i) grid.y.push_back(to_map[3] + (i + 0.5) * to_map[5]);
    double x = query_.place.longitude.degrees();
    double y = query_.place.latitude.degrees();
    const OGRSpatialReference* crs = dataset_->GetSpatialRef();
    if (crs == nullptr || (crs->IsGeographic() != 0 && crs->IsDerivedGeographic() == 0)) {
      grid.turn = 360.0;
      grid.to_globe = [](double at_x, double at_y) { return LonLat{at_x, at_y}; };
      return choose_points(grid, x, y, query_.place, query_.bilinear);
    }
    OGRSpatialReference globe;
    globe.SetWellKnownGeogCS("WGS84");
    globe.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
    OGRSpatialReference own(*crs);
    own.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
    const Transformation to_grid = transformation(globe, own, where_);
    const std::shared_ptr<OGRCoordinateTransformation> back = transformation(own, globe, where_);
    if (!to_grid->Transform(1, &x, &y)) refuse("the place has no point in the file's projection", "", "");
    grid.to_globe = [back](double at_x, double at_y) {
      return back->Transform(1, &at_x, &at_y) ? LonLat{at_x, at_y} : LonLat{};
    };
    return choose_points(grid, x, y, query_.place, query_.bilinear);
  }

  std::vector<Message> wanted_messages() const {
    std::vector<Message> messages;
    std::vector<bool> found(query_.variables.size(), false);
    std::map<std::string, bool> others;
    for (int b = 1; b <= dataset_->GetRasterCount(); ++b) {
      GDALRasterBand& band = *dataset_->GetRasterBand(b);
      const std::string name = item(band, "GRIB_ELEMENT");
      others[name] = true;
      for (std::size_t v = 0; v < query_.variables.size(); ++v) {
        if (query_.variables[v] != name) continue;
        found[v] = true;
        messages.push_back(
            {b, v, seconds_item(band, "GRIB_VALID_TIME"), seconds_item(band, "GRIB_REF_TIME")});
      }
    }
    for (std::size_t v = 0; v < found.size(); ++v) {
      if (found[v]) continue;
      std::vector<std::string> names;
      for (const auto& [name, is_there] : others) names.push_back(name);
      refuse("the file has no variable of that name", "\"" + query_.variables[v] + "\"",
             "Its elements are " + names_in_line(names));
    }
    return messages;
  }

  double value(int number, const ChosenPoints& chosen) {
    GDALRasterBand& band = *dataset_->GetRasterBand(number);
    int has_nodata = 0;
    const double nodata = band.GetNoDataValue(&has_nodata);
    double sum = 0.0;
    for (const GridPoint& point : chosen.points) {
      double at_point = 0.0;
      if (band.RasterIO(GF_Read, static_cast<int>(point.column), static_cast<int>(point.row), 1, 1, &at_point,
                        1, 1, GDT_Float64, 0, 0, nullptr) != CE_None ||
          guard_.failed()) {
        guard_.fail(ErrorKind::data, fmt::format("message {} cannot be read", number), where_,
                    "Copy the file again, whole");
      }
      sum += has_nodata != 0 && at_point == nodata ? std::numeric_limits<double>::quiet_NaN()
                                                   : point.weight * at_point;
    }
    return sum;
  }

  const PointQuery& query_;
  std::string where_;
  GdalGuard guard_;
  std::unique_ptr<GDALDataset> dataset_;
};

}  // namespace

PointSeries read_grib_point(const PointQuery& query, const std::string& file) {
  start_geo();
  return GribReader(query, file).read();
}

}  // namespace sunfall

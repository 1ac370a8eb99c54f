// Gridded weather files at a place: which point, which times, which values.

#include "geo/point_series.h"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <fstream>
#include <limits>

#include "geo/cf_time.h"
#include "geo/geo_support.h"
#include "geo/grid_points.h"
#include "geo/weather_file.h"
#include "sunfall/error.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

Place at(double longitude_deg, double latitude_deg) {
  return {Angle::degrees(latitude_deg), Angle::degrees(longitude_deg), 0.0};
}

// A field that is linear in longitude and latitude: interpolation must give it exactly.
double plane(std::size_t time, double longitude, double latitude) {
  return 100.0 * static_cast<double>(time) + 10.0 * (longitude - 5.0) + 3.0 * (latitude - 50.0);
}

WeatherOrder small_order() {
  WeatherOrder order;
  for (int hour = 0; hour < 5; ++hour) order.times.push_back(482136.0 + hour);  // 2025-01-01 00:00
  order.variables.push_back({"ssrd", "W m**-2", plane});
  return order;
}
constexpr std::int64_t kNewYear2025_s = 1735689600;

PointSeries read(const TempFolder& folder, const WeatherOrder& order, const Place& place,
                 bool bilinear = false, const std::vector<std::string>& variables = {"ssrd"}) {
  write_netcdf(folder / "w.nc", order);
  return read_point_series({folder / "w.nc", variables, place, bilinear});
}

std::string fault(const std::function<void()>& work) {
  try {
    work();
  } catch (const Error& error) {
    return error.what();
  }
  return "no fault";
}

// Epochs and offsets worked out by hand from the days between the dates.
TEST(CfTime, ReadsUnits) {
  EXPECT_EQ(parse_cf_time("seconds since 1970-01-01")->epoch_s, 0);
  EXPECT_EQ(parse_cf_time("hours since 1900-01-01 00:00:00.0")->epoch_s, -25567LL * 86400);
  EXPECT_EQ(parse_cf_time("hours since 1900-01-01 00:00:00.0")->unit_s, 3600.0);
  EXPECT_EQ(parse_cf_time("days since 2000-1-1 12:00")->epoch_s, 10957LL * 86400 + 43200);
  EXPECT_EQ(parse_cf_time("minutes since 1970-01-02T00:00:00Z")->epoch_s, 86400);
  EXPECT_EQ(parse_cf_time("h since 1970-01-01 06:00 +06:00")->epoch_s, 0);
  EXPECT_EQ(parse_cf_time("sec since 1970-01-01 00:00:00 -1:30")->epoch_s, 5400);
  EXPECT_EQ(parse_cf_time("days since 1970-01-01 00:00 UTC")->unit_s, 86400.0);
  for (const char* wrong : {"months since 1970-01-01", "hours", "hours since", "hours since 1-1-1",
                            "hours since 1970-13-01", "hours since 2025-02-29",
                            "hours since 1970-01-01 25:00", "hours since 1970-01-01 00:00 local", "", "K"}) {
    EXPECT_FALSE(parse_cf_time(wrong)) << wrong;
  }
  EXPECT_TRUE(is_world_calendar("") && is_world_calendar("Gregorian"));
  EXPECT_FALSE(is_world_calendar("noleap") || is_world_calendar("360_day"));
}

TEST(PointSeries, TakesTheNearestPoint) {
  const TempFolder folder;
  const PointSeries series = read(folder, small_order(), at(5.77, 51.93));
  ASSERT_EQ(series.time_s.size(), 5U);
  for (std::size_t t = 0; t < 5; ++t) {
    EXPECT_EQ(series.time_s[t], kNewYear2025_s + static_cast<std::int64_t>(t) * 3600);
    EXPECT_EQ(series.variables[0].value[t], plane(t, 5.75, 52.0));
  }
  EXPECT_EQ(series.variables[0].unit, "W m**-2");
  EXPECT_THAT(series.points, HasSubstr("52° N, 5.75° E"));
  EXPECT_TRUE(series.run_s.empty());
}

TEST(PointSeries, InterpolatesAPlaneExactly) {
  const TempFolder folder;
  const PointSeries series = read(folder, small_order(), at(5.83, 51.93), true);
  for (std::size_t t = 0; t < 5; ++t) EXPECT_NEAR(series.variables[0].value[t], plane(t, 5.83, 51.93), 1e-10);
}

TEST(PointSeries, LongitudesMayRunTo360) {
  const TempFolder folder;
  WeatherOrder order = small_order();
  order.longitudes = {354.0, 354.25, 354.5};
  const PointSeries series = read(folder, order, at(-5.7, 52.0));
  EXPECT_EQ(series.variables[0].value[0], plane(0, 354.25, 52.0));
  EXPECT_THAT(series.points, HasSubstr("5.75° W"));
}

// A grid all round the globe has no edge at its last column.
TEST(PointSeries, GoesRoundTheGlobe) {
  const TempFolder folder;
  WeatherOrder order = small_order();
  order.longitudes.clear();
  for (int i = 0; i < 36; ++i) order.longitudes.push_back(10.0 * i);
  order.variables[0].value = [](std::size_t, double longitude, double) {
    return longitude == 0.0 ? 10.0 : longitude;
  };
  // Between 350 and 360 = 0: a quarter of the way from 350.
  EXPECT_NEAR(read(folder, order, at(-7.5, 52.0), true).variables[0].value[0], 0.75 * 350.0 + 0.25 * 10.0,
              1e-9);
  EXPECT_EQ(read(folder, order, at(-2.5, 52.0)).variables[0].value[0], 10.0);
  EXPECT_EQ(read(folder, order, at(-7.5, 52.0)).variables[0].value[0], 350.0);
}

TEST(PointSeries, UnpacksAndKnowsTheFillValue) {
  const TempFolder folder;
  WeatherOrder order = small_order();
  order.variables[0].scale = 0.5;
  order.variables[0].value = [](std::size_t time, double, double) {
    return time == 2 ? std::numeric_limits<double>::quiet_NaN() : 100.0 + static_cast<double>(time);
  };
  const PointSeries series = read(folder, order, at(5.75, 52.0));
  EXPECT_EQ(series.variables[0].value[1], 101.0);
  EXPECT_TRUE(std::isnan(series.variables[0].value[2]));
}

TEST(PointSeries, ReachesHalfASpacingBeyondItsPointsAndNoFarther) {
  const TempFolder folder;
  for (const bool bilinear : {false, true}) {
    EXPECT_EQ(read(folder, small_order(), at(6.12, 51.64), bilinear).variables[0].value[0],
              plane(0, 6.0, 51.75));
    for (const Place& far : {at(6.13, 52.0), at(5.37, 52.0), at(5.75, 52.38), at(5.75, 51.62)}) {
      EXPECT_THAT(fault([&] { read(folder, small_order(), far, bilinear); }), HasSubstr("does not reach"));
    }
  }
  const std::string far = fault([&] { read(folder, small_order(), at(-58.4, -34.6)); });
  for (const char* part : {"34.6° S, 58.4° W", "51.75° N, 5.5° E", "0.25° apart", "km away"})
    EXPECT_THAT(far, HasSubstr(part));
}

TEST(PointSeries, FaultsNameWhatIsThere) {
  const TempFolder folder;
  const Place here = at(5.75, 52.0);
  EXPECT_THAT(fault([&] { read(folder, small_order(), here, false, {"ghi"}); }),
              AllOf(HasSubstr("no variable of that name"), HasSubstr("time, latitude, longitude, ssrd")));
  WeatherOrder order = small_order();
  order.levels = "height";
  EXPECT_THAT(fault([&] { read(folder, order, here); }), HasSubstr("ssrd over height (2)"));
  order = small_order();
  order.calendar = "noleap";
  EXPECT_THAT(fault([&] { read(folder, order, here); }), HasSubstr("calendar"));
  order = small_order();
  order.time_unit = "months since 2000-01-01";
  EXPECT_THAT(fault([&] { read(folder, order, here); }), HasSubstr("months since 2000-01-01"));
  order = small_order();
  order.times[3] = order.times[2];
  EXPECT_THAT(fault([&] { read(folder, order, here); }), HasSubstr("the same time comes twice"));
  order = small_order();
  std::swap(order.times[3], order.times[2]);
  EXPECT_THAT(fault([&] { read(folder, order, here); }), HasSubstr("go backward"));
  order = small_order();
  order.variables[0].value = [](std::size_t, double, double) {
    return std::numeric_limits<double>::quiet_NaN();
  };
  EXPECT_THAT(fault([&] { read(folder, order, here); }), HasSubstr("no value there"));
}

TEST(PointSeries, RefusesOtherAndBrokenFiles) {
  const TempFolder folder;
  const auto message = [&] {
    return fault([&] { read_point_series({folder / "w.nc", {"ssrd"}, at(5.75, 52.0), false}); });
  };
  EXPECT_THAT(message(), HasSubstr("no such file"));
  std::ofstream(folder / "w.nc") << "time,ghi\n";
  EXPECT_THAT(message(), HasSubstr("neither NetCDF nor GRIB"));
  std::ofstream(folder / "w.nc") << "GRIB and nothing more";
  EXPECT_THAT(message(), HasSubstr("GRIB file cannot be read"));
  write_netcdf(folder / "w.nc", small_order());
  const auto size = std::filesystem::file_size(folder / "w.nc");
  for (const std::uintmax_t part : {size / 8, size / 2, size - 60}) {
    write_netcdf(folder / "w.nc", small_order());
    std::filesystem::resize_file(folder / "w.nc", part);
    EXPECT_THAT(message(), HasSubstr("w.nc")) << part;
  }
}

TEST(PointSeries, ReadsGribByItsValidTimeAndRun) {
  const TempFolder folder;
  WeatherOrder order = small_order();
  order.variables[0].value = plane;
  std::vector<GribMessage> messages;
  for (const std::int64_t hour : {7, 8, 6, 9})
    messages.push_back({kNewYear2025_s + hour * 3600, kNewYear2025_s});
  messages.push_back({kNewYear2025_s + 13 * 3600, kNewYear2025_s + 12 * 3600});
  write_grib(folder / "w.grib2", order, messages);
  const PointQuery query{folder / "w.grib2", {"DSWRF"}, at(5.77, 51.93), false};
  const PointSeries series = read_point_series(query);
  ASSERT_EQ(series.time_s.size(), 5U);
  const std::size_t written[] = {2, 0, 1, 3, 4};  // in order of time
  for (std::size_t i = 0; i < 5; ++i) {
    EXPECT_EQ(series.time_s[i], messages[written[i]].time_s);
    EXPECT_EQ(series.run_s[i], messages[written[i]].run_s);
    EXPECT_NEAR(series.variables[0].value[i], plane(written[i], 5.75, 52.0), 1e-4);  // floats
  }
  EXPECT_EQ(series.variables[0].unit, "[W/(m^2)]");
  PointQuery between = query;
  between.bilinear = true;
  EXPECT_NEAR(read_point_series(between).variables[0].value[1], plane(0, 5.77, 51.93), 1e-4);
  PointQuery other = query;
  other.variables = {"TMP"};
  EXPECT_THAT(fault([&] { read_point_series(other); }), HasSubstr("Its elements are DSWRF"));
  messages.push_back({kNewYear2025_s + 13 * 3600, kNewYear2025_s});
  write_grib(folder / "w.grib2", order, messages);
  EXPECT_THAT(fault([&] { read_point_series(query); }), HasSubstr("the same time comes twice"));
  // Nothing is left beside the file.
  EXPECT_EQ(folder.names(), std::vector<std::string>{"w.grib2"});
}

// A conformal conic map touches the globe at its origin, where metres are true: a degree of a sphere of
// 6371229 m is 111198.9 m.
TEST(PointSeries, ReadsGribInAProjection) {
  const TempFolder folder;
  WeatherOrder order = small_order();
  order.crs = "+proj=lcc +lat_1=52 +lat_2=52 +lat_0=52 +lon_0=5 +R=6371229";
  order.longitudes = {-5000.0, -2500.0, 0.0, 2500.0, 5000.0};
  order.latitudes = {5000.0, 2500.0, 0.0, -2500.0, -5000.0};
  order.variables[0].value = [](std::size_t, double x, double y) { return 1000.0 + 0.01 * x + 0.001 * y; };
  write_grib(folder / "w.grib2", order, {{kNewYear2025_s + 3600, kNewYear2025_s}});
  const auto value = [&](double longitude, double latitude, bool bilinear) {
    return read_point_series({folder / "w.grib2", {"DSWRF"}, at(longitude, latitude), bilinear})
        .variables[0]
        .value[0];
  };
  EXPECT_NEAR(value(5.0, 52.0, false), 1000.0, 1e-3);
  EXPECT_NEAR(value(5.0, 52.0 + 2400.0 / 111198.9, false), 1002.5, 1e-3);
  // 1700 m east, 800 m south; the geodetic latitude of WGS84 on a sphere is taken as it is.
  const double east = 1700.0 / (111198.9 * std::cos(52.0 * M_PI / 180.0));
  EXPECT_NEAR(value(5.0 + east, 52.0 - 800.0 / 111198.9, true), 1017.0 - 0.8, 0.02);
  EXPECT_THAT(fault([&] { value(6.0, 52.0, false); }),
              AllOf(HasSubstr("does not reach"), HasSubstr("2.5 km apart")));
}

}  // namespace
}  // namespace sunfall::test

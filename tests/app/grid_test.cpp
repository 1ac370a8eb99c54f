// Gridded weather through the program: the light of a known truth comes back, and each fault has its one
// message.

#include <gmock/gmock.h>

#include <fstream>
#include <nlohmann/json.hpp>

#include "app/small_farm.h"
#include "geo/weather_file.h"
#include "light/station.h"

namespace sunfall::test {
namespace {

using testing::Contains;
using testing::HasSubstr;

// The farm's place, near enough: its DLI lies within 1e-4 of that of the map's own middle.
constexpr double kLongitude = 5.77, kLatitude = 51.95;
const LightSeries& truth() {
  static const LightSeries series = cloudy_truth(place_at(kLatitude, kLongitude, 13.0), 2025, "+01:00");
  return series;
}

struct Hours {
  std::vector<double> time_h;  // their ends, since 1970
  std::vector<double> global, beam_level;
};
const Hours& hours() {
  static const Hours hours = [] {
    Hours all;
    const std::int64_t begin_s = truth().sun.begin.time_since_epoch().count();
    for (std::size_t minute = 0; minute < truth().steps.size() * 10; minute += 60) {
      const Shown values = shown(truth(), minute, 60);
      all.time_h.push_back(static_cast<double>(begin_s) / 3600.0 + static_cast<double>(minute) / 60.0 + 1.0);
      all.global.push_back(values.global);
      all.beam_level.push_back(values.global - values.diffuse);
    }
    return all;
  }();
  return hours;
}

// The truth times a plane that is 1 at the farm: 1.6 a degree farther east, 0.6 a degree farther north.
double slant(double longitude, double latitude) {
  return 1.0 + 0.6 * (longitude - kLongitude) - 0.4 * (latitude - kLatitude);
}

WeatherOrder weather() {
  WeatherOrder order;
  order.times = hours().time_h;
  order.variables.push_back({"ssrd", "W m-2", [](std::size_t t, double longitude, double latitude) {
                               return hours().global[t] * slant(longitude, latitude);
                             }});
  order.variables.push_back({"fdir", "W m-2", [](std::size_t t, double longitude, double latitude) {
                               return hours().beam_level[t] * slant(longitude, latitude);
                             }});
  return order;
}

void write_farm(const SmallFarm& farm, const std::string& keys, const std::string& file = "weather.nc") {
  std::ofstream(farm / "farm.toml") << "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdam'\n"
                                       "[light.grid]\nfile = '"
                                    << file << "'\n"
                                    << keys;
}
const std::string kBoth = "global = 'ssrd'\nbeam = 'fdir'\nbeam_plane = 'level'\nstamp = 'end'\n";

nlohmann::json vet(const SmallFarm& farm) {
  const Outcome outcome = farm.run({"vet", "farm.toml", "--dome", "draft", "--json"});
  EXPECT_EQ(outcome.status, 0) << outcome.err;
  return outcome.status == 0 ? nlohmann::json::parse(outcome.out) : nlohmann::json{};
}

void expect_truth(const nlohmann::json& said, double times = 1.0) {
  const MonthlyLight dli = monthly_dli(truth());
  for (std::size_t month = 0; month < 12; ++month) {
    EXPECT_NEAR(said["open_field_dli_month"][month].get<double>(), times * dli.total(month),
                0.01 * dli.total(month))
        << month;
  }
}

TEST(GridProgram, BringsBackTheTruthBetweenItsPoints) {
  const SmallFarm farm;
  write_netcdf(farm / "weather.nc", weather());
  write_farm(farm, kBoth + "point = 'bilinear'\n");
  const nlohmann::json said = vet(farm);
  expect_truth(said);
  EXPECT_EQ(said["light"]["description"],
            "record weather.nc of radiation (global, diffuse) every 60 minutes, 2025");
  EXPECT_THAT(said["notes"].dump(), HasSubstr("52° N, 5.75° E"));
}

TEST(GridProgram, TakesTheNearestPoint) {
  const SmallFarm farm;
  write_netcdf(farm / "weather.nc", weather());
  write_farm(farm, kBoth);
  const nlohmann::json said = vet(farm);
  expect_truth(said, slant(5.75, 52.0));
  EXPECT_THAT(said["notes"].dump(),
              HasSubstr("The light is that of the point nearest to the map in weather.nc: 52° N"));
}

TEST(GridProgram, LongitudesTo360AndPackedSumsSinceTheStart) {
  const SmallFarm farm;
  WeatherOrder order = weather();
  order.variables.resize(1);
  order.variables[0].unit = "J m**-2";
  order.variables[0].scale = 2000.0;  // 16 bits up to 6.5e7 J, stored without sign from 0
  std::vector<double> sums;
  for (std::size_t i = 0; i < hours().global.size(); ++i) {
    const auto hour = static_cast<long>(order.times[i] - 1.0) % 24;  // UTC hour in which the step begins
    sums.push_back((hour == 0 || i == 0 ? 0.0 : sums.back()) + 3600.0 * hours().global[i]);
  }
  order.variables[0].value = [&](std::size_t t, double, double) { return sums[t]; };
  for (double& longitude : order.longitudes) longitude += 360.0;
  write_netcdf(farm / "weather.nc", order);
  write_farm(farm, "global = 'ssrd'\nstamp = 'end'\naccumulated = 'start'\n");
  const nlohmann::json said = vet(farm);
  expect_truth(said);
  EXPECT_THAT(said["notes"].dump(), HasSubstr("they began anew 365 times"));
}

TEST(GridProgram, ReadsGrib) {
  const SmallFarm farm;
  const WeatherOrder order = weather();
  std::vector<GribMessage> messages;
  for (const double time_h : order.times) {
    const auto time_s = static_cast<std::int64_t>(time_h) * 3600;
    messages.push_back({time_s, time_s - 3600});
  }
  write_grib(farm / "weather.grib2", order, messages);
  write_farm(farm, "global = 'DSWRF'\nstamp = 'end'\npoint = 'bilinear'\n", "weather.grib2");
  expect_truth(vet(farm));
}

TEST(GridProgram, FaultsHaveTheirMessages) {
  const SmallFarm farm;
  const auto refused = [&](const WeatherOrder& order, const std::string& keys, int status,
                           const std::vector<std::string>& parts) {
    SCOPED_TRACE(parts.front());
    write_netcdf(farm / "weather.nc", order);
    write_farm(farm, keys);
    expect_refused(farm.run({"vet", "farm.toml", "--dome", "draft"}), status, parts);
  };
  refused(weather(), "global = 'ghi'\nstamp = 'end'\n", 3,
          {"no variable of that name", "\"ghi\"", "time, latitude, longitude, ssrd, fdir"});
  WeatherOrder far = weather();
  far.latitudes = {-34.0, -34.25, -34.5};
  refused(far, kBoth, 3,
          {"does not reach the plan's map", "51.95° N, 5.766° E", "34° S, 5.75° E", "0.25° apart"});
  refused(weather(), kBoth + "unit = 'J m-2'\n", 3,
          {"the file's unit is not the plan's", "ssrd in W m-2, not J m-2"});
  WeatherOrder other = weather();
  other.variables[0].unit = "K";
  refused(other, kBoth, 3, {"none of light", "\"K\""});
  refused(weather(), "global = 'ssrd'\nstamp = 'begin'\n", 3,
          {"clock is wrong by about 1 hour", "stamp = \"end\""});
  WeatherOrder zone = weather();
  for (double& time_h : zone.times) time_h += 1.0;  // local time written as UTC
  refused(zone, "global = 'ssrd'\nstamp = 'end'\n", 3, {"clock is wrong by about 1 hour"});
  WeatherOrder part = weather();
  part.times.resize(5000);
  refused(part, kBoth, 3, {"more than 10 % of a month's daylight is missing", "December 100.0 %"});
  refused(weather(), "global = 'ssrd'\n", 2, {"farm.toml:4 light.grid.stamp", "missing"});
  std::ofstream(farm / "weather.nc") << "";
  expect_refused(farm.run({"vet", "farm.toml", "--dome", "draft"}), 2, {"stamp"});
  write_farm(farm, kBoth);
  expect_refused(farm.run({"vet", "farm.toml", "--dome", "draft"}), 3,
                 {"weather.nc", "neither NetCDF nor GRIB"});
}

}  // namespace
}  // namespace sunfall::test

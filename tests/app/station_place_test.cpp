// A record that tells where it was made, through the program.

#include <gmock/gmock.h>

#include "app/record_farm.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

const std::string kKeys = "global = 'ghi'\nlatitude = 'lat'\nlongitude = 'lon'\n";

// A year of hours whose every line carries the given place.
std::string hours_at(const std::string& latitude, const std::string& longitude) {
  const std::string hours = logged(farm_truth(), {.columns = "g"});
  const std::string told = changed_lines(hours, [&](const std::string&, const std::string& rest) {
    return rest + "," + latitude + "," + longitude;
  });
  return "time,ghi,lat,lon" + told.substr(told.find('\n'));
}

std::string notes_at(const std::string& latitude, const std::string& longitude) {
  const SmallFarm farm;
  write_record(farm, hours_at(latitude, longitude), kKeys);
  return vet_json(farm)["notes"].dump();
}

void expect_fault(const std::string& record, int status, const std::vector<std::string>& parts,
                  const std::string& keys = kKeys) {
  SCOPED_TRACE(parts.front());
  const SmallFarm farm;
  write_record(farm, record, keys);
  expect_refused(vet_farm(farm), status, parts);
}

// The map's middle is 51.95° N, 5.766° E. A degree of latitude is 111.2 km on a sphere of 6371 km.
TEST(StationPlace, NearAndFartherAreTold) {
  EXPECT_THAT(
      notes_at("52.1", "5.77"),
      HasSubstr("The record's station stands 17 km from the middle of the map, at 52.1° N, 5.77° E."));
  EXPECT_THAT(notes_at("52.95", "5.77"), HasSubstr("stands 111 km from the middle of the map"));
  EXPECT_THAT(notes_at("52.95", "5.77"), HasSubstr("beyond 50 km the light of a satellite or a reanalysis"));
  EXPECT_THAT(notes_at("", "NaN"), HasSubstr("columns of the station's place are empty"));
}

TEST(StationPlace, AnotherPlaceIsRefused) {
  expect_fault(hours_at("48.1", "11.6"), 3,
               {"the record is of another place than the map", "station.csv",
                "the station stands at 48.1° N, 11.6° E, the map at 51.95° N, 5.766° E, 597 km away",
                "Take a record of a station less than 200 km away"});
  expect_fault(hours_at("5.77", "51.95"), 3,
               {"another place than the map", "Exchange latitude and longitude"});
  expect_fault(hours_at("51.95", "-5.77"), 3,
               {"another place than the map", "turn the sign of the longitude"});
  expect_fault(hours_at("-51.95", "5.77"), 3,
               {"another place than the map", "turn the sign of the latitude"});
  expect_fault(hours_at("95", "5.77"), 3, {"station.csv:2", "no such place on the globe", "latitude 95"});
  expect_fault(hours_at("52N", "5.77"), 3, {"station.csv:2", "a value is not a number", "\"52N\""});
  std::string two = hours_at("52", "5.77");
  const std::size_t last = two.rfind(",52,");
  expect_fault(two.replace(last, 4, ",53,"), 3,
               {"station.csv:8761", "the record is of more than one place",
                "53° N, 5.77° E, after 52° N, 5.77° E", "Give each station a file of its own"});
}

TEST(StationPlace, KeysMustFit) {
  expect_fault(hours_at("52", "5.77"), 2,
               {"light.series.latitude", "both latitude and longitude", "no longitude"},
               "global = 'ghi'\nlatitude = 'lat'\n");
  expect_fault(hours_at("52", "5.77"), 2, {"light.series.longitude", "one column is named twice"},
               "global = 'ghi'\nlatitude = 'lat'\nlongitude = 'lat'\n");
  expect_fault(hours_at("52", "5.77"), 3, {"no column of that name", "\"north\"", "lat"},
               "global = 'ghi'\nlatitude = 'north'\nlongitude = 'lon'\n");
}

TEST(StationPlace, OfDailyRecordsToo) {
  const SmallFarm farm;
  std::string record = "date,sunshine_hours,lat,lon\n";
  const std::chrono::sys_days first{std::chrono::year{2025} / std::chrono::January / 1};
  for (int day = 0; day < 365; ++day)
    record += stamp_text(first + std::chrono::days{day}).substr(0, 10) + "," + std::to_string(day % 7) +
              ",40,5.77\n";
  write_text(farm / "days.csv", record);
  write_text(
      farm / "farm.toml",
      "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdam'\n[light.sunshine]\nfile = 'days.csv'\n"
      "latitude = 'lat'\nlongitude = 'lon'\n");
  expect_refused(vet_farm(farm), 3, {"days.csv", "another place than the map", "40° N, 5.77° E"});
}

}  // namespace
}  // namespace sunfall::test

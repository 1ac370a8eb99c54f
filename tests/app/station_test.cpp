// A station's record through the program: what it says, and the one message of each fault.

#include <gmock/gmock.h>

#include <fstream>
#include <nlohmann/json.hpp>
#include <sstream>

#include "app/record_farm.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

const LightSeries& truth() { return farm_truth(); }

const std::string kColumns = "stamp = 'end'\nglobal = 'ghi'\ndiffuse = 'dhi'\nunit = 'W m-2'\n";

void write_farm(const SmallFarm& farm, const std::string& record, const std::string& keys = kColumns) {
  std::ofstream(farm / "station.csv") << record;
  std::ofstream(farm / "farm.toml") << "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdam'\n"
                                       "[light.series]\nfile = 'station.csv'\n" +
                                           keys;
}

const std::string& hours() {
  static const std::string text = logged(truth(), {.columns = "gd"});
  return text;
}

// The demand: hours of a known truth, run back, give its light within 1 %.
TEST(Station, VetTellsTheRecordsLight) {
  const SmallFarm farm;
  write_farm(farm, hours());
  const Outcome outcome = farm.run({"vet", "farm.toml", "--dome", "draft", "--json"});
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  const auto json = nlohmann::json::parse(outcome.out);
  EXPECT_EQ(json["light"]["description"],
            "record station.csv of radiation (global, diffuse) every 60 minutes, 2025");
  const MonthlyLight dli = monthly_dli(truth());
  for (std::size_t month = 0; month < 12; ++month) {
    EXPECT_NEAR(json["open_field_dli_month"][month].get<double>(), dli.total(month), 0.01 * dli.total(month));
  }
}

TEST(Station, MapNamesTheRecordAmongItsInputs) {
  const SmallFarm farm;
  write_farm(farm, hours());
  const Outcome outcome = farm.map();
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  std::ifstream in(farm / "run" / "summary.json");
  std::ostringstream summary;
  summary << in.rdbuf();
  EXPECT_THAT(summary.str(), HasSubstr("\"station.csv\""));
}

TEST(Station, FaultsHaveTheirMessages) {
  const SmallFarm farm;
  const auto refused = [&](const std::string& record, const std::string& keys, int status,
                           const std::vector<std::string>& parts) {
    SCOPED_TRACE(parts.front());
    write_farm(farm, record, keys);
    expect_refused(farm.run({"vet", "farm.toml", "--dome", "draft"}), status, parts);
  };
  refused("", kColumns, 3, {"station.csv", "the file is empty"});
  refused(hours(), "stamp = 'end'\nglobal = 'GHI'\nunit = 'W m-2'\n", 3,
          {"no column of that name", "\"GHI\"", "\"ghi\""});
  refused(hours(), "stamp = 'end'\nglobal = 'ghi'\n", 2, {"farm.toml:4 light.series.unit", "missing"});
  refused(hours(), "stamp = 'begin'\nglobal = 'ghi'\nunit = 'W m-2'\n", 3,
          {"the record's clock is wrong by about 1 hour", "stamp = \"end\""});
  refused(logged(truth(), {.columns = "g", .scale = 110.0}),
          "stamp = 'end'\nglobal = 'ghi'\nunit = 'W m-2'\n", 3,
          {"the values do not fit the unit W m-2", "lux"});
  refused(hours(), "stamp = 'end'\nglobal = 'ghi'\nunit = 'J m-2'\n", 3,
          {"do not fit the unit J m-2", "look like W m-2"});
  refused(hours().substr(0, hours().find("2025-09-15")), kColumns, 3,
          {"more than 10 % of a month's daylight is missing", "December 100.0 %", "allow_gaps"});
  refused(hours() + "2025-06-01T12:00,5,5\n", kColumns, 3, {"station.csv:8762", "go backward"});
  const auto changed = [](const std::string& from, const std::string& to) {
    std::string record = hours();
    return record.replace(record.find(from), from.size(), to);
  };
  refused(changed("2025-02-28T12:00", "2025-02-29T12:00"), kColumns, 3,
          {"the time stamp cannot be read", "2025-02-29T12:00"});
  refused(changed("2025-06-01T13:00", "2025-06-01T12:00"), kColumns, 3,
          {"the same time comes twice with different values", "2025-06-01T12:00"});
  refused(logged(truth(), {.columns = "gd", .clock_error_min = 120}), kColumns, 3,
          {"the record's clock is wrong by about 2 hours"});
  refused("time,ghi,dhi\n2025-10-26T02:00,0,0\n2025-10-26T03:00,0,0\n2025-10-26T03:00,0,0\n", kColumns, 3,
          {"station.csv:4", "daylight saving time"});
}

}  // namespace
}  // namespace sunfall::test

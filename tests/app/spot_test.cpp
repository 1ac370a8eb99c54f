// sunfall spot: one place, in agreement with the map of the same plan.

#include <gmock/gmock.h>

#include <fstream>
#include <nlohmann/json.hpp>
#include <sstream>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

namespace fs = std::filesystem;

constexpr const char* kAt = "690059,5758901";  // 5 m west of the wall, row 49 and column 29

std::vector<std::vector<std::string>> csv_rows(const fs::path& file) {
  std::vector<std::vector<std::string>> rows;
  std::ifstream in(file);
  for (std::string line; std::getline(in, line);) {
    std::istringstream fields(line);
    rows.emplace_back();
    for (std::string field; std::getline(fields, field, ',');) rows.back().push_back(field);
  }
  return rows;
}

class SpotRun : public testing::Test {
 protected:
  SpotRun() { farm_.write_plan("surface = 'surface.tif'\n"); }
  Outcome spot(const std::vector<std::string>& more) const {
    std::vector<std::string> words{"spot", "farm.toml", "--at", kAt, "--dome", "draft", "-o", "spot"};
    words.insert(words.end(), more.begin(), more.end());
    return farm_.run(words);
  }
  SmallFarm farm_;
};

TEST_F(SpotRun, WritesItsFiles) {
  const Outcome outcome = spot({"--day", "12-21"});
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  std::vector<std::string> names;
  for (const auto& entry : fs::directory_iterator(farm_ / "spot"))
    names.push_back(entry.path().filename().string());
  EXPECT_THAT(names,
              testing::UnorderedElementsAre("sun-path.png", "sun-path.svg", "months.csv", "day-12-21.csv"));
  EXPECT_EQ(content_of(farm_ / "spot" / "sun-path.png").substr(0, 8), "\x89PNG\r\n\x1a\n");
  EXPECT_THAT(content_of(farm_ / "spot" / "sun-path.svg"), testing::HasSubstr("<svg"));
  for (const char* part :
       {"690059.0 E, 5758901.0 N", "beam", "sky", "open field", "January", "December", "Year"})
    EXPECT_THAT(outcome.out, testing::HasSubstr(part));
}

// The day's curve has a step for each ten minutes and its photons sum to about the month's mean day: the
// sun of 21 December is that of the month within a few per cent, in the open.
TEST_F(SpotRun, TheDaysCurveSumsToTheDay) {
  ASSERT_EQ(spot({"--day", "12-21", "--quiet"}).status, 0);
  const auto rows = csv_rows(farm_ / "spot" / "day-12-21.csv");
  ASSERT_EQ(rows.size(), 1U + 144U);
  EXPECT_EQ(rows[0][6], "open total (umol m-2 s-1)");
  EXPECT_EQ(rows[1][0], "2025-12-21T00:00+01:00");
  EXPECT_EQ(rows[1][1], "2025-12-20T23:00Z");
  double open_mol = 0.0;
  for (std::size_t i = 1; i < rows.size(); ++i) {
    open_mol += std::stod(rows[i][6]) * 600.0 * 1e-6;
    EXPECT_LE(std::stod(rows[i][9]), std::stod(rows[i][6]) + 0.1);
  }
  const auto months = csv_rows(farm_ / "spot" / "months.csv");
  ASSERT_EQ(months[12][0], "12");
  const double month_mol = std::stod(months[12][4]) + std::stod(months[12][5]);
  EXPECT_NEAR(open_mol, month_mol, 0.08 * month_mol);
}

// The layers are rounded to 1/128, the table to 0.001.
TEST_F(SpotRun, AgreesWithTheMap) {
  ASSERT_EQ(spot({"--quiet"}).status, 0);
  ASSERT_EQ(farm_.map({"--quiet"}).status, 0);
  const auto months = csv_rows(farm_ / "spot" / "months.csv");
  ASSERT_EQ(months.size(), 13U);
  for (int month = 1; month <= 12; ++month) {
    const std::string& name = months[month][0];
    const std::string value =
        tool_output({"gdallocationinfo", "-valonly", "-geoloc",
                     (farm_ / "run" / ("dli-" + name + ".tif")).string(), "690059", "5758901"});
    EXPECT_NEAR(std::stod(months[month][3]), std::stod(value), 0.5 / 128.0 + 0.0005 + 1e-5) << name;
    EXPECT_LT(std::stod(months[month][3]), std::stod(months[month][4]) + std::stod(months[month][5])) << name;
  }
}

// The wall's top stands 6 m above ground that falls 0.05 m a metre to the east; the eye is 0.5 m above
// ground, 6 m west of the middle of the wall's column. Between cell centres the sweep is linear.
TEST_F(SpotRun, JsonHoldsTheHorizon) {
  const Outcome outcome = spot({"--json"});
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_EQ(outcome.err, "");
  const auto json = nlohmann::json::parse(outcome.out);
  EXPECT_EQ(json["periods"].size(), 12U);
  const auto& horizon = json["horizon_deg"];
  ASSERT_FALSE(horizon.empty());
  const double east_deg = horizon[horizon.size() / 4];
  const double wall_deg = std::atan((6.0 - 0.05 * 6.0 - 0.5) / 6.0) * 180.0 / 3.14159265358979;
  EXPECT_NEAR(east_deg, wall_deg, 1.0);
  EXPECT_TRUE(fs::exists(farm_ / json["folder"].get<std::string>() / "months.csv"));
}

TEST_F(SpotRun, QuietIsSilent) {
  const Outcome outcome = spot({"--quiet"});
  EXPECT_EQ(outcome.status, 0);
  EXPECT_EQ(outcome.out + outcome.err, "");
}

}  // namespace
}  // namespace sunfall::test

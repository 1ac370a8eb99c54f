// Daily records and days that vary through the program: what it says, and the one message of each fault.

#include <gmock/gmock.h>

#include <fstream>
#include <nlohmann/json.hpp>

#include "app/small_farm.h"
#include "light/day_file.h"

namespace sunfall::test {
namespace {

using testing::Contains;
using testing::HasSubstr;

void write_farm(const SmallFarm& farm, const std::string& record, const std::string& light) {
  std::ofstream(farm / "days.csv") << record;
  std::ofstream(farm / "farm.toml") << "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdam'\n" << light;
}

const std::string kSeries =
    "[light.series]\nfile = 'days.csv'\ntime = 'date'\nstamp = 'day'\nglobal = 'g'\nunit = 'MJ m-2 d-1'\n";
const std::string kSunshine = "[light.sunshine]\nfile = 'days.csv'\n";
const std::string kTemperature = "[light.temperature]\nfile = 'days.csv'\n";

const std::vector<double>& above_air() {
  static const std::vector<double> sums =
      day_above_air_mj(light_of(ClearSource{}, place_at(51.95, 5.77, 13.0), 2025, "+01:00"));
  return sums;
}
double share(int day) { return std::fmod(0.381966 * (day + 1), 1.0); }

std::string radiation(double scale = 1.0, int days = 365) {
  return day_text("g", 2025, days, [&](int day) {
    return number_text(scale * (0.1 + 0.6 * share(day)) * above_air()[static_cast<std::size_t>(day)]);
  });
}
std::string sunshine(double scale = 1.0) {
  return day_text("sunshine_hours", 2025, 365,
                  [&](int day) { return number_text(scale * 7.0 * share(day)); });
}
std::string temperature(double scale = 1.0, double shift = 0.0) {
  return day_text("t_min,t_max", 2025, 365, [&](int day) {
    const double low = 9.0 - 9.0 * std::cos(day / 58.0);
    return number_text(scale * low + shift) + "," +
           number_text(scale * (low + 4.0 + 8.0 * share(day)) + shift);
  });
}

std::vector<std::string> texts(const nlohmann::json& list) { return list.get<std::vector<std::string>>(); }

TEST(Days, VetTellsEachSourcesLight) {
  const SmallFarm farm;
  const auto vetted = [&](const std::string& record, const std::string& light) {
    write_farm(farm, record, light);
    const Outcome outcome = farm.run({"vet", "farm.toml", "--dome", "draft", "--json"});
    EXPECT_EQ(outcome.status, 0) << outcome.err;
    return nlohmann::json::parse(outcome.out);
  };
  const nlohmann::json series = vetted(radiation(), kSeries);
  EXPECT_EQ(series["light"]["description"], "record days.csv of daily radiation (global), 2025");
  // June at 52 N has 41.5 MJ above the air (FAO-56 Table 2.6); 0.4 of it is 16.6 MJ, with 1.97 to 2.10 µmol
  // per J 32.7 to 34.9 mol; the mean of 30 shares is 0.4 within 0.02.
  EXPECT_NEAR(series["open_field_dli_month"][5].get<double>(), 33.8, 2.8);
  EXPECT_EQ(vetted(sunshine(), kSunshine)["light"]["description"],
            "record days.csv of daily sunshine hours, 2025");
  const nlohmann::json warmth = vetted(temperature(), kTemperature);
  EXPECT_EQ(warmth["light"]["description"], "record days.csv of daily lowest and highest temperature, 2025");
  EXPECT_THAT(texts(warmth["notes"]), Contains(HasSubstr("0.16 inland, 0.19 at a coast")));
  EXPECT_THAT(texts(warmth["defaults"]), Contains("light.temperature.k_rs = 0.16"));
}

TEST(Days, MapSaysThatItsDaysAreMade) {
  const SmallFarm farm;
  const std::string light = kMonthlyLight + "days = 'varied'\nyears = 2\nseed = 3\n";
  write_farm(farm, "", light);
  const Outcome outcome = farm.map();
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  std::ifstream in(farm / "run" / "summary.json");
  const nlohmann::json summary = nlohmann::json::parse(in);
  EXPECT_THAT(texts(summary["notes"]), Contains(HasSubstr("The days are made, not measured")));
  EXPECT_THAT(summary.dump(), HasSubstr("with made days that vary (seed 3, 2 years)"));
}

TEST(Days, FaultsHaveTheirMessages) {
  const SmallFarm farm;
  const auto refused = [&](const std::string& record, const std::string& light, int status,
                           const std::vector<std::string>& parts) {
    SCOPED_TRACE(parts.front());
    write_farm(farm, record, light);
    expect_refused(farm.run({"vet", "farm.toml", "--dome", "draft"}), status, parts);
  };
  refused("", kSeries, 3, {"days.csv", "the file is empty"});
  refused(radiation(), kSunshine, 3, {"no column of that name", "\"sunshine_hours\""});
  refused(radiation(1e6 / 86400.0), kSeries, 3, {"do not fit the unit MJ m-2 d-1", "look like W m-2"});
  refused(radiation(1.0, 200), kSeries, 3,
          {"more than 10 % of a month's daylight", "December 100.0 %", "allow_gaps"});
  refused(radiation() + "2025-06-01,5\n", kSeries, 3, {"days.csv:367", "the dates go backward"});
  refused(radiation() + "2025-12-31,50\n", kSeries, 3, {"days.csv:367", "the same day comes twice"});
  refused(radiation() + "2025-13-01,5\n", kSeries, 3, {"days.csv:367", "the date cannot be read"});
  refused(radiation() + "2026-01-01T01:00,5\n", kSeries, 3, {"days.csv:367", "its date alone"});
  refused(radiation(),
          "[light.series]\nfile = 'days.csv'\ntime = 'date'\nstamp = 'end'\nglobal = 'g'\nunit = 'MJ m-2'\n",
          3, {"days.csv:2", "the stamp is a date without a time", "\"2025-01-01\"", "stamp = \"day\""});
  refused(sunshine(60.0), kSunshine, 3, {"not hours of sunshine", "minutes"});
  refused("date,sunshine_hours\n2025-01-01,-1\n2025-01-02,0\n", kSunshine, 3, {"days.csv:2", "negative"});
  refused("date,sunshine_hours\n2025-01-01,1\n2025-01-02,9.5\n", kSunshine, 3,
          {"days.csv:3", "more sunshine than the day is long", "9.5 h of 7.9 h"});
  refused(temperature(1.8, 32.0), kTemperature, 3, {"not in degrees Celsius", "Fahrenheit"});
  refused("date,t_min,t_max\n2025-01-01,1,5\n2025-01-02,4,3\n2025-01-03,1,5\n", kTemperature, 3,
          {"days.csv:3", "below its lowest", "t_min 4, t_max 3"});
  refused(radiation(), kSeries + "utc = true\n", 2, {"farm.toml:10 light.series.utc", "no clock"});
  refused(sunshine(), kSunshine + "a_s = 0.5\nb_s = 0.5\n", 2, {"farm.toml:4 light.sunshine", "at most 0.9"});
  refused("", kMonthlyLight + "seed = 3\n", 2, {"light.seed", "is for days that vary only"});
  refused("", kMonthlyLight + "days = 'varied'\nyears = 90\n", 2, {"2114", "Give a year from 1950 to 2100"});
}

}  // namespace
}  // namespace sunfall::test

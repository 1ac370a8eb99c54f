// A record of several years through the program.

#include <gmock/gmock.h>

#include <fstream>
#include <nlohmann/json.hpp>
#include <sstream>

#include "app/small_farm.h"
#include "light/station.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

constexpr int kFirstYear = 2022;

const LightSeries& truth(int year) {
  static std::map<int, LightSeries> all;
  if (!all.contains(year)) {
    all.emplace(year, cloudy_truth(place_at(51.95, 5.77, 13.0), year, "+01:00", static_cast<unsigned>(year)));
  }
  return all.at(year);
}

void write_years(const SmallFarm& farm, int years, const std::string& more) {
  std::string text;
  for (int y = 0; y < years; ++y) {
    const std::string record = logged(truth(kFirstYear + y), {.columns = "gd"});
    text += y == 0 ? record : record.substr(record.find('\n') + 1);
  }
  write_text(farm / "station.csv", text);
  write_text(farm / "farm.toml",
             "[site]\nground = 'ground.tif'\nsurface = 'surface.tif'\nclock = 'Europe/Amsterdam'\n"
             "[light.series]\nfile = 'station.csv'\nstamp = 'end'\nglobal = 'ghi'\ndiffuse = 'dhi'\n"
             "unit = 'W m-2'\n" +
                 more);
}

nlohmann::json summary_of(const SmallFarm& farm, const std::string& run = "run") {
  return nlohmann::json::parse(content_of(farm / run / "summary.json"));
}

const std::string kPercentiles = "[output]\npercentiles = true\n";

TEST(YearsRun, TooFewYearsAreRefused) {
  const SmallFarm farm;
  for (const int years : {1, 2}) {
    write_years(farm, years, kPercentiles);
    expect_all_refuse(farm, 2,
                      {"too few years for percentiles", "farm.toml:12 output.percentiles",
                       "light of " + std::to_string(years) + " year", "3 years or more"});
  }
  farm.write_plan("", kPercentiles);
  expect_refused(farm.map(), 2,
                 {"too few years for percentiles", "farm.toml:7 output.percentiles", "light of 1 year"});
  write_years(farm, 3, kPercentiles + "[periods]\nleap-day = { from = '02-29', to = '02-29' }\n");
  expect_refused(farm.map(), 2, {"lies in too few of the years", "leap-day in 1 of 3 years"});
  write_years(farm, 1, "[periods]\nleap-day = { from = '02-29', to = '02-29' }\n");
  expect_refused(farm.map(), 2, {"no day of the light's years", "leap-day"});
}

// P10 by hand from the years that the summary itself tells, which are those of runs of each year alone.
TEST(YearsRun, TellsEachYearAndPercentilesOverThem) {
  const SmallFarm farm;
  farm.write_plots();
  write_years(farm, 3, kPlotsTable + kPercentiles);
  const Outcome outcome = farm.map();
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_THAT(outcome.out, HasSubstr("P10 over 3 years:"));
  EXPECT_THAT(outcome.out, HasSubstr("come from 3 years only"));
  expect_whole_run(farm / "run");
  const nlohmann::json summary = summary_of(farm);
  const auto& open = summary["open_field"];
  ASSERT_EQ(open["years"].size(), 3U);
  for (std::size_t m = 0; m < 12; ++m) {
    std::vector<double> years;
    for (int y = 0; y < 3; ++y) {
      const auto& year = open["years"][static_cast<std::size_t>(y)];
      EXPECT_EQ(year["year"], kFirstYear + y);
      years.push_back(year["beam_month"][m].get<double>() + year["sky_month"][m].get<double>());
      // The demand on records: within 1 % of the truth.
      const double truly = monthly_dli(truth(kFirstYear + y)).total(m);
      EXPECT_NEAR(years.back(), truly, 0.01 * truly);
    }
    std::sort(years.begin(), years.end());
    EXPECT_NEAR(open["over_years"]["dli_month_p10"][m].get<double>(), years[0] + 0.2 * (years[1] - years[0]),
                1e-9);
    EXPECT_NEAR(open["over_years"]["dli_month_p50"][m].get<double>(), years[1], 1e-9);
    EXPECT_NEAR(open["over_years"]["dli_month_p90"][m].get<double>(), years[1] + 0.8 * (years[2] - years[1]),
                1e-9);
  }
  // Layers, tables, plots.
  for (const char* name : {"dli-01-p10.tif", "dli-12-p90.tif", "dli-year-p50.tif", "years.csv"})
    EXPECT_TRUE(std::filesystem::exists(farm / "run" / name)) << name;
  EXPECT_THAT(content_of(farm / "run" / "plots.csv"), HasSubstr("mean DLI P10 over years (mol m-2 d-1)"));
  for (const auto& plot : summary["plots"]) {
    const auto& p10 = plot["over_years"]["dli_month_p10"];
    for (std::size_t m = 0; m < 12; ++m) {
      // A plot gets at most the open field's light, give or take a rounding, and less in the darker years.
      EXPECT_LE(p10[m].get<double>(), open["over_years"]["dli_month_p10"][m].get<double>() + 1e-9);
      EXPECT_LE(p10[m].get<double>(), plot["over_years"]["dli_month_p90"][m].get<double>());
    }
  }
  // A year alone gives the same open field, but for how hours at New Year are split: 0.1 %.
  write_text(farm / "station.csv", logged(truth(kFirstYear + 1), {.columns = "gd"}));
  std::string plan = content_of(farm / "farm.toml");
  write_text(farm / "farm.toml", plan.substr(0, plan.find(kPercentiles)));
  ASSERT_EQ(farm.run({"map", "farm.toml", "--dome", "draft", "-o", "alone", "--quiet"}).status, 0);
  const nlohmann::json alone = summary_of(farm, "alone");
  EXPECT_FALSE(alone["open_field"].contains("years"));
  EXPECT_FALSE(std::filesystem::exists(farm / "alone" / "years.csv"));
  for (std::size_t m = 0; m < 12; ++m) {
    const auto& year = open["years"][1];
    const double dli = alone["open_field"]["dli_month"][m].get<double>();
    EXPECT_NEAR(year["beam_month"][m].get<double>() + year["sky_month"][m].get<double>(), dli, 1e-3 * dli);
  }
}

// Every month of every made year has the plan's mean: percentiles over such years would say that no year is
// bad.
TEST(YearsRun, MadeYearsAreNotToldApart) {
  const SmallFarm farm;
  farm.write_plots();
  const std::string made = kMonthlyLight + "days = 'varied'\nyears = 5\n" + kPlotsTable;
  const std::string site = "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdam'\n";
  write_text(farm / "farm.toml", site + made + kPercentiles);
  expect_all_refuse(farm, 2,
                    {"made years have no percentiles", "farm.toml:11 output.percentiles", "5 made years",
                     "Leave the key out, or give [light.series] a record of 3 years or more"});
  write_text(farm / "farm.toml", site + made);
  const Outcome outcome = farm.map();
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_THAT(outcome.out, testing::Not(HasSubstr("over 5 years")));
  const nlohmann::json summary = summary_of(farm);
  EXPECT_FALSE(summary["open_field"].contains("over_years"));
  EXPECT_FALSE(summary["open_field"].contains("years"));
  EXPECT_FALSE(summary["plots"][0].contains("over_years"));
  EXPECT_THAT(summary["notes"].dump(), HasSubstr("no percentiles over them are told"));
  EXPECT_THAT(content_of(farm / "run" / "plots.csv"), testing::Not(HasSubstr("over years")));
  EXPECT_FALSE(std::filesystem::exists(farm / "run" / "years.csv"));
  const Outcome spot =
      farm.run({"spot", "farm.toml", "--dome", "draft", "--at", "690021,5758979", "-o", "spot"});
  ASSERT_EQ(spot.status, 0) << spot.err;
  EXPECT_THAT(spot.out, testing::Not(HasSubstr("Over 5 years")));
  EXPECT_FALSE(std::filesystem::exists(farm / "spot" / "years.csv"));
}

TEST(YearsRun, ASpotTellsTheSame) {
  const SmallFarm farm;
  write_years(farm, 3, "");
  const Outcome outcome = farm.run(
      {"spot", "farm.toml", "--dome", "draft", "--at", "690021,5758979", "-o", "spot", "--day", "06-21"});
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_THAT(outcome.out, HasSubstr("Over 3 years"));
  EXPECT_THAT(content_of(farm / "spot" / "months.csv"), HasSubstr("total P10 over years (mol m-2 d-1)"));
  std::istringstream lines(content_of(farm / "spot" / "years.csv"));
  int count = 0;
  for (std::string line; std::getline(lines, line);) ++count;
  EXPECT_EQ(count, 1 + 3 * 13);
  const Outcome json =
      farm.run({"spot", "farm.toml", "--dome", "draft", "--at", "690021,5758979", "-o", "spot", "--json"});
  EXPECT_EQ(nlohmann::json::parse(json.out)["over_years"].size(), 13U);
  // No year of the record has the day.
  expect_refused(farm.run({"spot", "farm.toml", "--dome", "draft", "--at", "690021,5758979", "-o", "x",
                           "--day", "02-30"}),
                 2, {"no such day"});
}

}  // namespace
}  // namespace sunfall::test

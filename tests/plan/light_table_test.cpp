// [light]: one source, twelve months, possible values.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "plan/plan_folder.h"

namespace sunfall::testing {
namespace {

using ::testing::Each;
using ::testing::ElementsAre;

const std::string kOneSource =
    "Give one of monthly_global = [twelve numbers], series = { file = … }, grid = { file = … }, sunshine = { "
    "file = … }, temperature = { file = … } and clear = true";
const std::string kUnits =
    "Write the mean day's sum on a level plane: kWh m-2 d-1 times 3.6, mean W m-2 times 0.0864";
const std::string kAt = "farm.toml:5 light.monthly_global";

// January to November, and December as told.
std::string months_to(const std::string& december) {
  return plan_with_light("monthly_global = [2, 4, 8, 13, 17, 18, 17, 15, 10, 6, 3, " + december + "]");
}

TEST(LightTable, TakesMonthsUpToTheEdgesOfTheRange) {
  const PlanFolder folder;
  EXPECT_EQ(std::get<MonthlyGlobalSource>(folder.read(months_to("0")).light).global_mj_m2_d[11], 0.0);
  EXPECT_EQ(std::get<MonthlyGlobalSource>(folder.read(months_to("50")).light).global_mj_m2_d[11], 50.0);
}

TEST(LightTable, WantsTwelveMonths) {
  const PlanFolder folder;
  const std::string what = "needs twelve numbers, January to December";
  folder.expect_fault(plan_with_light("monthly_global = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11]"), kAt, what,
                      "11 numbers", "");
  folder.expect_fault(plan_with_light("monthly_global = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13]"), kAt,
                      what, "13 numbers", "");
  folder.expect_fault(plan_with_light("monthly_global = []"), kAt, what, "0 numbers", "");
  folder.expect_fault(plan_with_light("monthly_global = 12.5"), kAt,
                      "must be a list of twelve numbers, January to December", "a number: 12.5", "");
}

TEST(LightTable, RefusesImpossibleMonths) {
  const PlanFolder folder;
  const std::string range = "the value for December must lie between 0 and 50 MJ m-2 d-1";
  const std::string finite = "the value for December must be a finite number";
  folder.expect_fault(months_to("-0.1"), kAt, range, "-0.1", kUnits);
  folder.expect_fault(months_to("50.1"), kAt, range, "50.1", kUnits);
  folder.expect_fault(months_to("inf"), kAt, finite, "inf", kUnits);
  folder.expect_fault(months_to("nan"), kAt, finite, "nan", kUnits);
  folder.expect_fault(months_to("'2.0'"), kAt, "the value for December must be a number, in MJ m-2 d-1",
                      "a string: \"2.0\"", "Write it without quotes");
  folder.expect_fault(months_to("[2]"), kAt, "the value for December must be a number, in MJ m-2 d-1",
                      "a list of 1", "");
}

TEST(LightTable, PointsAtTheLineOfTheOneNumber) {
  const PlanFolder folder;
  folder.expect_fault(
      plan_with_light("monthly_global = [\n 2, 4, 8,\n 13, 17, 18,\n 17, -15, 10,\n 6, 3, 2 ]"),
      "farm.toml:8 light.monthly_global", "the value for August must lie between 0 and 50 MJ m-2 d-1", "-15",
      kUnits);
}

TEST(LightTable, RefusesAYearWithoutLight) {
  const PlanFolder folder;
  folder.expect_fault(plan_with_light("monthly_global = [0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0.0]"), kAt,
                      "no month has any light", "twelve zeros", "");
}

TEST(LightTable, WantsExactlyOneSource) {
  const PlanFolder folder;
  folder.expect_fault(months_to("2") + "clear = true\n", "farm.toml:6 light.clear",
                      "two sources of light are given", "monthly_global and clear", kOneSource);
  folder.expect_fault(plan_with_light("year = 2024"), "farm.toml:4 light", "no source of light is given", "",
                      kOneSource);
  folder.expect_fault(plan_with_light("clear = false"), "farm.toml:4 light", "no source of light is given",
                      "clear = false", kOneSource);
  folder.expect_fault("[site]\nground = 'ground.tif'\nclock = 'UTC'\n", "farm.toml light",
                      "no source of light is given", "", kOneSource);
  EXPECT_EQ(folder.read(months_to("2") + "clear = false\n").light.index(), 1U);
}

TEST(LightTable, TakesASeriesAlone) {
  const PlanFolder folder;
  const std::string series =
      "series = { file = 'station.csv', stamp = 'end', global = 'ghi', unit = 'W m-2' }\n";
  EXPECT_EQ(std::get<SeriesSource>(folder.read(plan_with_light(series)).light).file,
            folder.path() / "station.csv");
  folder.expect_fault(plan_with_light(series + "year = 2024\n"), "farm.toml:6 light.year",
                      "a series has years of its own", "", "Remove it");
  folder.expect_fault(months_to("2") + series, "farm.toml:6 light.series", "two sources of light are given",
                      "monthly_global and series", kOneSource);
  folder.expect_fault(plan_with_light(series + "turbidity = 3\n"), "farm.toml:6 light.turbidity",
                      "turbidity is for a cloudless sky only", "", "Remove it");
  folder.expect_fault(plan_with_light("series = 'station.csv'"), "farm.toml:5 light.series",
                      "must be a table, { key = value, … }", "a string: \"station.csv\"", "");
}

TEST(LightTable, TakesDaysThatVary) {
  const PlanFolder folder;
  const auto source = [&](const std::string& keys) {
    return std::get<MonthlyGlobalSource>(folder.read(months_to("2") + keys).light);
  };
  const MonthlyGlobalSource mean = source("");
  EXPECT_EQ(mean.days, MonthlyGlobalSource::Days::mean);
  EXPECT_EQ(mean.split, DaySplit::erbs);
  EXPECT_EQ(mean.years, 1);
  const MonthlyGlobalSource varied =
      source("days = 'varied'\nyears = 12\nseed = 40\npersistence = 0\nday_split = 'collares-pereira'\n");
  EXPECT_EQ(varied.days, MonthlyGlobalSource::Days::varied);
  EXPECT_EQ(varied.years, 12);
  EXPECT_EQ(varied.seed, 40);
  EXPECT_EQ(varied.persistence, 0.0);
  EXPECT_EQ(varied.split, DaySplit::collares_pereira);

  const std::string at = "farm.toml:6 light.";
  for (const std::string key : {"years", "seed", "persistence"}) {
    const std::string value = key == "persistence" ? " = 0.1\n" : " = 3\n";
    folder.expect_fault(months_to("2") + key + value, at + key, "is for days that vary only", "",
                        "Remove it, or give days = \"varied\"");
    folder.expect_fault(plan_with(key + value), at + key, "is for monthly_global only", "", "Remove it");
  }
  folder.expect_fault(plan_with("days = 'varied'\n"), at + "days", "is for monthly_global only", "",
                      "Remove it");
  folder.expect_fault(plan_with("day_split = 'erbs'\n"), at + "day_split", "a cloudless sky is not split", "",
                      "Remove it");
  EXPECT_EQ(folder.fault(months_to("2") + "days = 'varied'\nyears = 101\n").what,
            "must lie between 1 and 100");
}

TEST(LightTable, TakesOneTurbidityOrTwelve) {
  const PlanFolder folder;
  const auto turbidity = [&](const std::string& value) {
    const Plan plan = folder.read(plan_with("turbidity = " + value + "\n"));
    EXPECT_THAT(plan.defaults, ::testing::Not(::testing::Contains("light.turbidity = 3 in every month")));
    return std::get<ClearSource>(plan.light).linke_turbidity;
  };
  EXPECT_THAT(turbidity("4.5"), Each(4.5));
  EXPECT_THAT(turbidity("1"), Each(1.0));
  EXPECT_THAT(turbidity("[2, 2.1, 2.2, 2.3, 2.4, 2.5, 2.6, 2.7, 2.8, 2.9, 3.0, 10]"),
              ElementsAre(2, 2.1, 2.2, 2.3, 2.4, 2.5, 2.6, 2.7, 2.8, 2.9, 3.0, 10));
}

TEST(LightTable, RefusesOtherTurbidities) {
  const PlanFolder folder;
  const std::string at = "farm.toml:6 light.turbidity";
  const std::string remedy = "Clean cold air has about 2, hazy city air 5 and more";
  folder.expect_fault(plan_with("turbidity = 0.9\n"), at, "must lie between 1 and 10 Linke", "0.9", remedy);
  folder.expect_fault(plan_with("turbidity = 11\n"), at, "must lie between 1 and 10 Linke", "11", remedy);
  folder.expect_fault(plan_with("turbidity = [3, 3]\n"), at, "needs twelve numbers, January to December",
                      "2 numbers", "One number alone, without [ ], stands for every month");
  folder.expect_fault(months_to("2") + "turbidity = 3\n", at, "turbidity is for a cloudless sky only", "",
                      "Remove it");
}

TEST(LightTable, FollowsTheSunOfYearsThatItKnows) {
  const PlanFolder folder;
  EXPECT_EQ(folder.read(plan_with("year = 1950\n")).light_options.year, 1950);
  EXPECT_EQ(folder.read(months_to("2") + "year = 2100\n").light_options.year, 2100);
  const std::string at = "farm.toml:6 light.year";
  const std::string what = "must lie between 1950 and 2100";
  folder.expect_fault(plan_with("year = 1949\n"), at, what, "1949", "The sun is known for these years");
  folder.expect_fault(plan_with("year = 2101\n"), at, what, "2101", "The sun is known for these years");
  folder.expect_fault(plan_with("year = 2025.5\n"), at, "must be a whole number", "a number: 2025.5", "");
  folder.expect_fault(plan_with("year = '2025'\n"), at, "must be a whole number", "a string: \"2025\"", "");
  folder.expect_fault(plan_with("year = 9223372036854775807\n"), at, what, "9.223372036854776e+18",
                      "The sun is known for these years");
}

}  // namespace
}  // namespace sunfall::testing

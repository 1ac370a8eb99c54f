// [light.sunshine] and [light.temperature]: columns and coefficients of daily records.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "plan/plan_folder.h"

namespace sunfall::testing {
namespace {

// The table in line 4, file in line 5, the given lines from line 6 on.
std::string plan_with_days(const std::string& table, const std::string& lines) {
  std::string plan = plan_with_light("");
  plan.replace(plan.find("[light]"), std::string::npos,
               "[light." + table + "]\nfile = 'station.csv'\n" + lines);
  return plan;
}

TEST(SunshineTable, HoldsWhatThePlanSays) {
  const PlanFolder folder;
  const auto source = std::get<SunshineSource>(
      folder
          .read(plan_with_days("sunshine",
                               "time = 'Day'\nhours = 'n'\na_s = 0.2\nb_s = 0.55\ndelimiter = ';'\n"
                               "decimal = ','\nallow_gaps = true\n"))
          .light);
  EXPECT_EQ(source.file, folder.path() / "station.csv");
  EXPECT_EQ(source.time + source.hours, "Dayn");
  EXPECT_EQ(source.a_s, 0.2);
  EXPECT_EQ(source.b_s, 0.55);
  EXPECT_EQ(source.delimiter, ';');
  EXPECT_EQ(source.decimal, ',');
  EXPECT_TRUE(source.allow_gaps);
}

TEST(SunshineTable, HasTheDefaultsOfFao56) {
  const PlanFolder folder;
  const Plan plan = folder.read(plan_with_days("sunshine", ""));
  const auto source = std::get<SunshineSource>(plan.light);
  EXPECT_EQ(source.time, "date");
  EXPECT_EQ(source.hours, "sunshine_hours");
  EXPECT_EQ(source.a_s, 0.25);
  EXPECT_EQ(source.b_s, 0.50);
  EXPECT_FALSE(source.allow_gaps);
  EXPECT_THAT(plan.defaults, ::testing::IsSupersetOf({"light.sunshine.a_s = 0.25", "light.sunshine.b_s = 0.5",
                                                      "light.day_split = \"erbs\""}));
}

TEST(SunshineTable, RefusesCoefficientsOfNoAir) {
  const PlanFolder folder;
  EXPECT_EQ(folder.fault(plan_with_days("sunshine", "a_s = 0.61\n")).what, "must lie between 0 and 0.6");
  EXPECT_EQ(folder.fault(plan_with_days("sunshine", "b_s = -0.5\n")).what, "must lie between 0.1 and 0.9");
  folder.expect_fault(plan_with_days("sunshine", "a_s = 0.4\nb_s = 0.6\n"), "farm.toml:4 light.sunshine",
                      "a_s and b_s sum to the clearness of a cloudless day, at most 0.9", "1",
                      "FAO-56 gives 0.25 and 0.50");
}

TEST(TemperatureTable, HoldsWhatThePlanSays) {
  const PlanFolder folder;
  const Plan plan = folder.read(plan_with_days("temperature", "t_min = 'TN'\nt_max = 'TX'\nk_rs = 0.19\n"));
  const auto source = std::get<TemperatureSource>(plan.light);
  EXPECT_EQ(source.t_min + source.t_max, "TNTX");
  EXPECT_EQ(source.k_rs, 0.19);
  const Plan usual = folder.read(plan_with_days("temperature", ""));
  EXPECT_EQ(std::get<TemperatureSource>(usual.light).k_rs, 0.16);
  EXPECT_THAT(usual.defaults, ::testing::Contains("light.temperature.k_rs = 0.16"));
}

TEST(TemperatureTable, RefusesOneColumnForBoth) {
  const PlanFolder folder;
  folder.expect_fault(plan_with_days("temperature", "t_min = 'T'\nt_max = 'T'\n"),
                      "farm.toml:7 light.temperature.t_max", "one column is named twice", "\"T\"",
                      "Name the columns of the lowest and of the highest temperature");
  EXPECT_EQ(folder.fault(plan_with_days("temperature", "k_rs = 19\n")).what, "must lie between 0.1 and 0.3");
}

TEST(DaysTables, AreASourceAlone) {
  const PlanFolder folder;
  std::string plan = plan_with_days("temperature", "");
  EXPECT_EQ(folder.fault(plan + "[light.sunshine]\nfile = 'station.csv'\n").what,
            "two sources of light are given");
  plan.insert(plan.find("[light.temperature]"), "[light]\nyear = 2024\n");
  EXPECT_EQ(folder.fault(plan).what, "a series has years of its own");
}

}  // namespace
}  // namespace sunfall::testing

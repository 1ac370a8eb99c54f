// [light.series]: the columns, unit and stamps of a record.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "plan/plan_folder.h"

namespace sunfall::testing {
namespace {

using Unit = SeriesSource::Unit;

// file in line 5, the given lines from line 6 on; what a series must have is among them or not.
std::string plan_with_series(const std::string& lines) {
  std::string plan = plan_with_light("");
  plan.replace(plan.find("[light]"), std::string::npos, "[light.series]\nfile = 'station.csv'\n" + lines);
  return plan;
}
const std::string kUsual = "stamp = 'end'\nunit = 'W m-2'\n";

SeriesSource series_of(const std::string& lines) {
  const PlanFolder folder;
  return std::get<SeriesSource>(folder.read(plan_with_series(lines)).light);
}

TEST(SeriesTable, HoldsWhatThePlanSays) {
  const SeriesSource source = series_of(
      "time = 'Date'\nstamp = 'begin'\nglobal = 'GHI'\ndiffuse = 'DHI'\nbeam = 'DNI'\nunit = 'kJ m-2'\n"
      "delimiter = ';'\ndecimal = ','\nutc = true\nsplit = 'erbs'\nallow_gaps = true\ntrust_clock = true\n");
  EXPECT_EQ(source.time, "Date");
  EXPECT_EQ(source.stamp, SeriesSource::Stamp::begin);
  EXPECT_EQ(source.global + source.diffuse + source.beam, "GHIDHIDNI");
  EXPECT_EQ(source.unit, Unit::kj_m2);
  EXPECT_EQ(source.delimiter, ';');
  EXPECT_EQ(source.decimal, ',');
  EXPECT_EQ(source.split, SeriesSource::Split::erbs);
  EXPECT_TRUE(source.utc && source.allow_gaps && source.trust_clock);
}

TEST(SeriesTable, HasDefaults) {
  const SeriesSource source = series_of(kUsual + "global = 'g'\n");
  EXPECT_EQ(source.time, "time");
  EXPECT_EQ(source.diffuse + source.beam, "");
  EXPECT_EQ(source.delimiter, '\0');
  EXPECT_EQ(source.decimal, '.');
  EXPECT_EQ(source.split, SeriesSource::Split::logistic);
  EXPECT_FALSE(source.utc || source.allow_gaps || source.trust_clock);
}

TEST(SeriesTable, KnowsEveryUnit) {
  for (const auto& [name, unit] : {std::pair{"W m-2", Unit::w_m2},
                                   {"J m-2", Unit::j_m2},
                                   {"J cm-2", Unit::j_cm2},
                                   {"kJ m-2", Unit::kj_m2},
                                   {"MJ m-2", Unit::mj_m2},
                                   {"Wh m-2", Unit::wh_m2},
                                   {"kWh m-2", Unit::kwh_m2},
                                   {"µmol m-2 s-1", Unit::umol_m2_s},
                                   {"umol m-2 s-1", Unit::umol_m2_s},
                                   {"MJ m-2", Unit::mj_m2}}) {
    EXPECT_EQ(series_of("stamp = 'end'\nglobal = 'g'\nunit = '" + std::string(name) + "'\n").unit, unit)
        << name;
  }
}

TEST(SeriesTable, TakesDays) {
  for (const auto& [name, unit] : {std::pair{"MJ m-2", Unit::mj_m2},
                                   {"W m-2", Unit::w_m2},
                                   {"J cm-2 d-1", Unit::j_cm2_d},
                                   {"MJ m-2 d-1", Unit::mj_m2_d},
                                   {"kWh m-2 d-1", Unit::kwh_m2_d},
                                   {"mol m-2 d-1", Unit::mol_m2_d}}) {
    const SeriesSource source =
        series_of("stamp = 'day'\nglobal = 'g'\nunit = '" + std::string(name) + "'\n");
    EXPECT_EQ(source.unit, unit) << name;
    EXPECT_EQ(source.stamp, SeriesSource::Stamp::day);
    EXPECT_EQ(source.day_split, DaySplit::erbs);
  }
  const PlanFolder folder;
  const std::string day = "stamp = 'day'\nglobal = 'g'\nunit = 'MJ m-2 d-1'\n";
  for (const std::string key : {"utc = true", "trust_clock = true"}) {
    EXPECT_EQ(folder.fault(plan_with_series(day + key + "\n")).what,
              "a daily record has no clock: its days are dates of the place's standard time");
  }
  folder.expect_fault(plan_with_series(day + "split = 'erbs'\n"), "farm.toml:9 light.series.split",
                      "this split is for hours", "stamp = \"day\"",
                      "Remove it; [light] day_split is for days");
  folder.expect_fault(plan_with_series("stamp = 'end'\nglobal = 'g'\nunit = 'MJ m-2 d-1'\n"),
                      "farm.toml:8 light.series.unit", "a unit per day is for a daily record",
                      "\"MJ m-2 d-1\"", "Give stamp = \"day\" if each line is a day's");
  std::string plan = plan_with_series(day);
  plan.insert(plan.find("[light.series]"), "[light]\nday_split = 'collares-pereira'\n");
  EXPECT_EQ(std::get<SeriesSource>(folder.read(plan).light).day_split, DaySplit::collares_pereira);
  plan = plan_with_series(kUsual + "global = 'g'\n");
  plan.insert(plan.find("[light.series]"), "[light]\nday_split = 'erbs'\n");
  EXPECT_EQ(folder.fault(plan).what, "is for days and months, and the series has shorter steps");
}

TEST(SeriesTable, WantsStampAndUnitToBeSaid) {
  const PlanFolder folder;
  const std::string missing = "missing; the plan must give it";
  folder.expect_fault(plan_with_series("unit = 'W m-2'\nglobal = 'g'\n"), "farm.toml:4 light.series.stamp",
                      missing, "", "Add it to [light.series] (type: text)");
  folder.expect_fault(plan_with_series("stamp = 'end'\nglobal = 'g'\n"), "farm.toml:4 light.series.unit",
                      missing, "", "Add it to [light.series] (type: text)");
  const auto fault = folder.fault(plan_with_series("stamp = 'end'\nglobal = 'g'\nunit = 'W/m2'\n"));
  EXPECT_EQ(fault.where, "farm.toml:8 light.series.unit");
  EXPECT_EQ(fault.remedy, "Perhaps \"W m-2\" is meant");
}

TEST(SeriesTable, WantsColumnsThatMakeALight) {
  const PlanFolder folder;
  const std::string at = "farm.toml:4 light.series";
  folder.expect_fault(plan_with_series(kUsual), at, "no column of global radiation is named", "",
                      "Add global = \"<the column's name>\", or both diffuse and beam");
  EXPECT_EQ(folder.fault(plan_with_series(kUsual + "diffuse = 'd'\n")).what,
            "no column of global radiation is named");
  EXPECT_EQ(folder.fault(plan_with_series(kUsual + "global = 'g'\nbeam = 'g'\n")).what,
            "one column is named twice");
  const std::string photons = "stamp = 'end'\nunit = 'µmol m-2 s-1'\n";
  EXPECT_EQ(folder.fault(plan_with_series(photons + "diffuse = 'd'\nbeam = 'b'\n")).found, "no global");
  EXPECT_EQ(folder.fault(plan_with_series(photons + "global = 'g'\nbeam = 'b'\n")).found, "beam");
}

TEST(SeriesTable, NamesUnknownKeysAndMissingFiles) {
  const PlanFolder folder;
  folder.expect_fault(plan_with_series(kUsual + "globl = 'g'\n"), "farm.toml:8 light.series.globl",
                      "unknown key", "", "Perhaps \"global\" is meant");
  folder.expect_fault(plan_with_light("utc = true"), "farm.toml:5 light.utc", "unknown key", "",
                      "It belongs in [light.series]");
  std::string plan = plan_with_series(kUsual + "global = 'g'\n");
  plan.replace(plan.find("station.csv"), 11, "statoin.csv");
  folder.expect_fault(plan, "farm.toml:5 light.series.file", "the file does not exist", "\"statoin.csv\"",
                      "Perhaps \"station.csv\" is meant", ErrorKind::data);
}

}  // namespace
}  // namespace sunfall::testing

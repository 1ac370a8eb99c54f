// [periods]: months and named ranges.

#include <gtest/gtest.h>
#include <fstream>

#include "plan/month_day.h"
#include "plan/plan_folder.h"

namespace sunfall::testing {
namespace {

using std::chrono::day;
using std::chrono::month;

std::string with_periods(const std::string& lines) { return plan_with("[periods]\n" + lines + "\n"); }

const std::string kDayRemedy = "Write month and day in quotes, such as \"04-15\"";

TEST(PeriodsTable, TakesRangesOverNewYearAndOfOneDay) {
  const PlanFolder folder;
  const std::vector<Period> periods =
      folder
          .read(with_periods("months = true\nwinter-2 = { from = '11-01', to = '02-29' }\n"
                             "solstice_day = { from = '06-21', to = '06-21' }"))
          .periods;
  ASSERT_EQ(periods.size(), 14U);
  EXPECT_EQ(periods[12].name, "winter-2");
  EXPECT_EQ(periods[12].from, month{11} / day{1});
  EXPECT_EQ(periods[12].to, month{2} / day{29});
  EXPECT_EQ(periods[13].name, "solstice_day");
  EXPECT_EQ(periods[13].from, periods[13].to);
}

TEST(PeriodsTable, TakesRangesWrittenAsTables) {
  const PlanFolder folder;
  const std::vector<Period> periods =
      folder.read(plan_with("[periods.harvest]\nfrom = '09-01'\nto = '10-15'\n")).periods;
  ASSERT_EQ(periods.size(), 13U);
  EXPECT_EQ(periods[12].to, month{10} / day{15});
}

TEST(PeriodsTable, AlwaysMakesTheMonths) {
  const PlanFolder folder;
  folder.expect_fault(with_periods("months = false"), "farm.toml:7 periods.months",
                      "the twelve months are always made", "false",
                      "Remove the key; the year and the darkest month are made from them");
}

TEST(PeriodsTable, RefusesOtherThingsThanRanges) {
  const PlanFolder folder;
  folder.expect_fault(with_periods("month = true"), "farm.toml:7 periods.month",
                      "neither a key of [periods] nor a named range { from = \"MM-DD\", to = \"MM-DD\" }",
                      "true", "Perhaps \"months\" is meant");
  folder.expect_fault(with_periods("season = ['04-15', '09-30']"), "farm.toml:7 periods.season",
                      "neither a key of [periods] nor a named range { from = \"MM-DD\", to = \"MM-DD\" }",
                      "a list of 2", "Known here: months");
}

TEST(PeriodsTable, RefusesNamesThatFilesCannotBear) {
  const PlanFolder folder;
  const std::string range = " = { from = '04-15', to = '09-30' }";
  const std::string what = "a range's name must be short, plain letters";
  const std::string remedy = "Use a to z, 0 to 9, _ and -, beginning with a letter, at most 40 in all";
  folder.expect_fault(with_periods("Season" + range), "farm.toml:7 periods.Season", what, "\"Season\"",
                      remedy);
  folder.expect_fault(with_periods("05" + range), "farm.toml:7 periods.05", what, "\"05\"", remedy);
  folder.expect_fault(with_periods("-a" + range), "farm.toml:7 periods.-a", what, "\"-a\"", remedy);
  folder.expect_fault(with_periods("'../up'" + range), "farm.toml:7 periods.\"../up\"", what, "\"../up\"",
                      remedy);
  folder.expect_fault(with_periods("'ä'" + range), "farm.toml:7 periods.\"ä\"", what, "\"ä\"", remedy);
  folder.expect_fault(with_periods("''" + range), "farm.toml:7 periods", what, "\"\"", remedy);
  const std::string forty(40, 'a');
  EXPECT_EQ(folder.read(with_periods(forty + range)).periods[12].name, forty);
  folder.expect_fault(with_periods(forty + "a" + range), "farm.toml:7 periods." + forty + "a", what,
                      "\"" + forty + "a\"", remedy);
}

TEST(PeriodsTable, RefusesNamesOfOtherLayers) {
  const PlanFolder folder;
  for (const std::string name : {"year", "lowest", "lowest-month", "year-p10", "spring-p90"}) {
    folder.expect_fault(with_periods(name + " = { from = '04-15', to = '09-30' }"),
                        "farm.toml:7 periods." + name, "the name belongs to a layer of another kind",
                        "\"" + name + "\"", "Choose another name");
  }
}

TEST(PeriodsTable, RefusesDaysThatNoYearHas) {
  const PlanFolder folder;
  const auto from = [&](const std::string& value, const std::string& what, const std::string& found) {
    folder.expect_fault(with_periods("season = { from = " + value + ", to = '09-30' }"),
                        "farm.toml:7 periods.season.from", what, found, kDayRemedy);
  };
  for (const std::string text : {"04-31", "02-30", "13-01", "00-10", "01-00", "4-15", "04-15 ", "0415",
                                 "april", "", "2025-04-15", "+4-15", "04/15", "٠٤-15"}) {
    from("'" + text + "'", "no such day", "\"" + text + "\"");
  }
  from("2025-04-15", "must be a day", "a date without quotes");
  from("415", "must be a day", "a whole number: 415");
}

TEST(PeriodsTable, WantsBothDaysAndNothingElse) {
  const PlanFolder folder;
  folder.expect_fault(with_periods("season = { from = '04-15' }"), "farm.toml:7 periods.season.to",
                      "missing; the plan must give it", "", "Add it to [periods.season] (type: day)");
  folder.expect_fault(with_periods("season = {}"), "farm.toml:7 periods.season.from",
                      "missing; the plan must give it", "", "Add it to [periods.season] (type: day)");
  folder.expect_fault(with_periods("season = { form = '04-15', to = '09-30' }"),
                      "farm.toml:7 periods.season.form", "unknown key", "", "Perhaps \"from\" is meant");
}

TEST(PeriodsTable, TakesAsManyRangesAsWeeks) {
  const PlanFolder folder;
  std::string lines;
  for (int i = 1; i <= 52; ++i)
    lines += "week-" + std::to_string(i) + " = { from = '04-15', to = '04-21' }\n";
  EXPECT_EQ(folder.read(with_periods(lines)).periods.size(), 12U + 52U);
  folder.expect_fault(with_periods(lines + "one_more = { from = '04-15', to = '04-21' }"),
                      "farm.toml:59 periods.one_more", "too many named ranges", "53", "Keep to 52 in a plan");
}

TEST(PeriodsTable, LeapDayAloneNeedsALeapYear) {
  const PlanFolder folder;
  const std::string leap = "[periods]\nleap = { from = '02-29', to = '02-29' }\n";
  folder.expect_fault(plan_with(leap), "farm.toml:7 periods.leap", "the range holds no day", "02-29 in 2025",
                      "Widen the range, or set [light] year to a leap year");
  folder.expect_fault(plan_with("year = 2100\n" + leap), "farm.toml:8 periods.leap", "the range holds no day",
                      "02-29 in 2100", "Widen the range, or set [light] year to a leap year");
  EXPECT_EQ(folder.read(plan_with("year = 2024\n" + leap)).periods.size(), 13U);
}

// A record has years of its own, known once it is read.
TEST(PeriodsTable, LeapDayAloneWaitsForTheRecord) {
  const PlanFolder folder;
  std::ofstream(folder.path() / "station.csv") << "time,ghi\n";
  const Plan plan = folder.read(
      "[site]\nground = 'ground.tif'\nclock = 'UTC'\n[light.series]\nfile = 'station.csv'\n"
      "stamp = 'end'\nglobal = 'ghi'\nunit = 'W m-2'\n"
      "[periods]\nleap = { from = '02-29', to = '02-29' }\n");
  EXPECT_EQ(plan.periods.size(), 13U);
}

TEST(MonthDay, KnowsEveryDayOfALeapYearAndNoOther) {
  int days = 0;
  for (int m = 0; m < 100; ++m) {
    for (int d = 0; d < 100; ++d) {
      const std::string text = {static_cast<char>('0' + m / 10), static_cast<char>('0' + m % 10), '-',
                                static_cast<char>('0' + d / 10), static_cast<char>('0' + d % 10)};
      if (month_day_of(text)) ++days;
    }
  }
  EXPECT_EQ(days, 366);
}

}  // namespace
}  // namespace sunfall::testing

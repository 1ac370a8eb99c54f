// [site]: heights, planes and clocks.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "plan/plan_folder.h"
#include "plan/words.h"

namespace sunfall::testing {
namespace {

using ::testing::HasSubstr;

std::string with_height(const std::string& value) {
  return plan_with_site("ground = 'ground.tif'\nclock = 'UTC'\nreceiver_height = " + value);
}
std::string with_clock(const std::string& value) {
  return plan_with_site("ground = 'ground.tif'\nclock = '" + value + "'");
}

TEST(SiteTable, TakesHeightsUpToTheEdgesOfTheRange) {
  const PlanFolder folder;
  EXPECT_EQ(folder.read(with_height("0")).site.receiver_height_m, 0.0);
  EXPECT_EQ(folder.read(with_height("50.0")).site.receiver_height_m, 50.0);
}

TEST(SiteTable, RefusesHeightsOutsideIt) {
  const PlanFolder folder;
  const std::string at = "farm.toml:4 site.receiver_height";
  const std::string what = "must lie between 0 and 50 m";
  const std::string remedy = "Heights are metres above the ground";
  folder.expect_fault(with_height("-0.001"), at, what, "-0.001", remedy);
  folder.expect_fault(with_height("50.001"), at, what, "50.001", remedy);
  folder.expect_fault(with_height("9223372036854775807"), at, what, "9.223372036854776e+18", remedy);
  folder.expect_fault(with_height("nan"), at, "must be a finite number", "nan", remedy);
  folder.expect_fault(with_height("-inf"), at, "must be a finite number", "-inf", remedy);
}

TEST(SiteTable, TakesZonesAndOffsets) {
  const PlanFolder folder;
  for (const char* clock :
       {"Europe/Amsterdam", "America/Argentina/Ushuaia", "+01:00", "-03:30", "UTC", "GMT"}) {
    EXPECT_EQ(folder.read(with_clock(clock)).site.clock.name(), clock);
  }
}

TEST(SiteTable, RefusesAbbreviatedClocks) {
  const PlanFolder folder;
  for (const char* clock :
       {"CET", "CEST", "EST", "EDT", "BST", "IST", "AEST", "ACWST", "EST5EDT", "UTC1", "CST6"}) {
    folder.expect_fault(
        with_clock(clock), "farm.toml:3 site.clock", "the clock is an abbreviation, which is ambiguous",
        in_quotes(clock),
        "Write a zone such as \"Europe/Amsterdam\", or the offset of standard time, without daylight "
        "saving, such as \"+01:00\"");
  }
}

TEST(SiteTable, AnUnknownZoneNamesTheNearest) {
  const PlanFolder folder;
  const PlanFolder::Fault fault = folder.fault(with_clock("Europe/Amsterdm"));
  EXPECT_EQ(fault.kind, ErrorKind::plan);
  EXPECT_EQ(fault.where, "farm.toml:3 site.clock");
  EXPECT_EQ(fault.found, "\"Europe/Amsterdm\"");
  EXPECT_THAT(fault.remedy, HasSubstr("\"Europe/Amsterdam\""));
}

TEST(SiteTable, MissesTheClock) {
  const PlanFolder folder;
  folder.expect_fault(plan_with_site("ground = 'ground.tif'"), "farm.toml:1 site.clock",
                      "missing; the plan must give it", "", "Add it to [site] (type: text)");
}

TEST(SiteTable, OffersThePlanes) {
  const PlanFolder folder;
  folder.expect_fault(plan_with_site("ground = 'ground.tif'\nclock = 'UTC'\nreceiver_plane = 'levl'"),
                      "farm.toml:4 site.receiver_plane", "must be \"level\" or \"ground\"", "\"levl\"",
                      "Perhaps \"level\" is meant");
}

}  // namespace
}  // namespace sunfall::testing

// Offsets are those of the IANA time zone database's own rules, stated beside each.
#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "sunfall/error.h"
#include "sunfall/time.h"

namespace sunfall {
namespace {

using std::chrono::hours;
using std::chrono::minutes;
using std::chrono::year;

std::chrono::seconds standard(const std::string& name, int in_year) {
  return Clock::parse(name, "plan").standard_offset(year{in_year});
}

UtcTime noon(int y, unsigned m, unsigned d) {
  return std::chrono::sys_days{year{y} / static_cast<int>(m) / static_cast<int>(d)} + hours{12};
}

TEST(Clock, KnowsStandardTimeInBothHemispheres) {
  EXPECT_EQ(standard("Europe/Amsterdam", 2025), hours{1});   // CET; CEST from March to October
  EXPECT_EQ(standard("Australia/Sydney", 2025), hours{10});  // AEST; AEDT on 1 January
  EXPECT_EQ(standard("America/St_Johns", 2025), -minutes{210});
  EXPECT_EQ(standard("Asia/Kathmandu", 2025), minutes{345});
  EXPECT_EQ(standard("Pacific/Auckland", 2025), hours{12});
  EXPECT_EQ(standard("UTC", 2025), hours{0});
}

// Irish law makes summer time the standard and winter the exception; growers' standard is GMT.
TEST(Clock, TakesTheWinterHourInIreland) { EXPECT_EQ(standard("Europe/Dublin", 2025), hours{0}); }

// Volgograd went from UTC+3 to UTC+4 on 28 October 2018 and back on 27 December 2020.
TEST(Clock, AnswersForFirstJanuaryWhereTheZoneChanged) {
  EXPECT_EQ(standard("Europe/Volgograd", 2018), hours{3});
  EXPECT_EQ(standard("Europe/Volgograd", 2020), hours{4});
  EXPECT_EQ(standard("Europe/Volgograd", 2021), hours{3});
}

TEST(Clock, ShowsWallTimeWithDaylightSaving) {
  const Clock clock = Clock::parse("Europe/Amsterdam", "plan");
  EXPECT_EQ(clock.wall_offset(noon(2025, 7, 1)), hours{2});
  EXPECT_EQ(clock.wall_offset(noon(2025, 12, 1)), hours{1});
}

TEST(Clock, ReadsFixedOffsets) {
  EXPECT_EQ(standard("+01:00", 2025), hours{1});
  EXPECT_EQ(standard("-03:30", 2025), -minutes{210});
  EXPECT_EQ(standard("+5", 2025), hours{5});
  EXPECT_EQ(standard("+0545", 2025), minutes{345});
  EXPECT_EQ(Clock::parse("+01:00", "plan").wall_offset(noon(2025, 7, 1)), hours{1});
  EXPECT_EQ(Clock::parse("+01:00", "plan").name(), "+01:00");
}

std::string refusal(const std::string& name) {
  try {
    Clock::parse(name, "farm.toml:3 site.clock");
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::plan);
    return error.what();
  }
  return "accepted";
}

TEST(Clock, RefusesUnknownZonesAndNamesTheNearest) {
  const std::string message = refusal("Europe/Amsterdm");
  EXPECT_THAT(message, testing::HasSubstr("farm.toml:3 site.clock"));
  EXPECT_THAT(message, testing::HasSubstr("\"Europe/Amsterdm\""));
  EXPECT_THAT(message, testing::HasSubstr("Did you mean \"Europe/Amsterdam\""));
  EXPECT_THAT(refusal("recife"), testing::HasSubstr("Did you mean \"America/Recife\""));
  EXPECT_THAT(refusal("Los Angeles"), testing::HasSubstr("Did you mean \"America/Los_Angeles\""));
}

TEST(Clock, RefusesWhatIsNoZone) {
  for (const char* name :
       {"", "+15:00", "+01:75", "01:00", "CET+1", "/etc/passwd", "../Europe/Paris", "posix/UTC", "zone.tab",
        "leapseconds", "leap-seconds.list", "tzdata.zi", "iso3166.tab", "zone1970.tab"}) {
    EXPECT_NE(refusal(name), "accepted") << name;
  }
}

}  // namespace
}  // namespace sunfall

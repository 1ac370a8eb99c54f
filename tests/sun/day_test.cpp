#include <gtest/gtest.h>

#include <optional>
#include <string>
#include <vector>

#include "sun/utc.h"
#include "sunfall/sun.h"

namespace sunfall {
namespace {

constexpr double kAlmanac_s = 2.0;

struct Site {
  std::string name;
  int offset_h;
  Place place;
};

const Site kWageningen{"Wageningen", 1, {Angle::degrees(51.9692), Angle::degrees(5.6654), 10}};
const Site kDavis{"Davis", -8, {Angle::degrees(38.5449), Angle::degrees(-121.7405), 16}};
const Site kSydney{"Sydney", 10, {Angle::degrees(-33.8688), Angle::degrees(151.2093), 20}};
const Site kQuito{"Quito", -5, {Angle::degrees(-0.1807), Angle::degrees(-78.4678), 2850}};
const Site kTromso{"Tromsø", 1, {Angle::degrees(69.6492), Angle::degrees(18.9553), 5}};
const Site kUshuaia{"Ushuaia", -3, {Angle::degrees(-54.8019), Angle::degrees(-68.3030), 10}};

int clock_s(int hour, int minute, int second) { return (hour * 60 + minute) * 60 + second; }

// Seconds after local midnight of the date.
double local_s(UtcTime time, Date date, const Site& site) {
  return static_cast<double>((time - std::chrono::sys_days{date}).count()) + site.offset_h * 3600.0;
}

SunDay day_at(const Site& site, Date date, double threshold_deg = -0.8333) {
  return sun_day(date, std::chrono::hours{site.offset_h}, site.place, Angle::degrees(threshold_deg));
}

struct Row {
  const Site& site;
  Date date;
  int rise_s, transit_s, set_s;
  double length_at_zero_h;
};

// The centre at -0.8333 degrees geometric, local standard time, computed with astropy 5.2.1; the
// last column is the length of day with the centre at 0 degrees.
const std::vector<Row> kRows{
    {kWageningen, date_of(2024, 3, 20), clock_s(6, 39, 6), clock_s(12, 44, 39), clock_s(18, 51, 12), 12.0213},
    {kWageningen, date_of(2024, 6, 20), clock_s(4, 17, 11), clock_s(12, 39, 2), clock_s(21, 0, 54), 16.4897},
    {kWageningen, date_of(2024, 9, 22), clock_s(6, 23, 57), clock_s(12, 29, 52), clock_s(18, 34, 46),
     12.0000},
    {kWageningen, date_of(2024, 12, 21), clock_s(8, 43, 11), clock_s(12, 35, 37), clock_s(16, 28, 3), 7.5137},
    {kDavis, date_of(2024, 3, 20), clock_s(6, 9, 24), clock_s(12, 14, 10), clock_s(18, 19, 33), 12.0271},
    {kDavis, date_of(2024, 6, 20), clock_s(4, 42, 53), clock_s(12, 8, 44), clock_s(19, 34, 35), 14.6959},
    {kDavis, date_of(2024, 12, 21), clock_s(7, 21, 13), clock_s(12, 5, 25), clock_s(16, 49, 36), 9.3087},
    {kSydney, date_of(2024, 6, 20), clock_s(6, 59, 50), clock_s(11, 56, 46), clock_s(16, 53, 42), 9.7457},
    {kSydney, date_of(2024, 12, 21), clock_s(4, 40, 51), clock_s(11, 53, 14), clock_s(19, 5, 38), 14.2599},
    {kQuito, date_of(2024, 3, 20), clock_s(6, 17, 52), clock_s(12, 21, 6), clock_s(18, 24, 21), 11.9971},
    {kUshuaia, date_of(2024, 6, 20), clock_s(9, 58, 45), clock_s(13, 34, 57), clock_s(17, 11, 9), 6.9438},
    {kUshuaia, date_of(2024, 12, 21), clock_s(4, 51, 38), clock_s(13, 31, 35), clock_s(22, 11, 32), 17.0614},
};

TEST(SunDay, AgreesWithTheAlmanacTable) {
  for (const Row& row : kRows) {
    const SunDay day = day_at(row.site, row.date);
    const std::string where =
        row.site.name + " month " + std::to_string(static_cast<unsigned>(row.date.month()));
    ASSERT_EQ(day.kind, SunDay::Kind::rises) << where;
    EXPECT_NEAR(local_s(day.rise, row.date, row.site), row.rise_s, kAlmanac_s) << where;
    EXPECT_NEAR(local_s(day.transit, row.date, row.site), row.transit_s, kAlmanac_s) << where;
    EXPECT_NEAR(local_s(day.set, row.date, row.site), row.set_s, kAlmanac_s) << where;
    const SunDay centre = day_at(row.site, row.date, 0.0);
    const double length_h = static_cast<double>((centre.set - centre.rise).count()) / 3600.0;
    EXPECT_NEAR(length_h, row.length_at_zero_h, 2.0 * kAlmanac_s / 3600.0) << where;
  }
}

TEST(SunDay, KnowsMidnightSunAndPolarNight) {
  const SunDay summer = day_at(kTromso, date_of(2024, 6, 20));
  EXPECT_EQ(summer.kind, SunDay::Kind::always_up);
  EXPECT_NEAR(local_s(summer.transit, date_of(2024, 6, 20), kTromso), clock_s(11, 45, 52), kAlmanac_s);
  const SunDay winter = day_at(kTromso, date_of(2024, 12, 21));
  EXPECT_EQ(winter.kind, SunDay::Kind::never_up);
  EXPECT_NEAR(local_s(winter.transit, date_of(2024, 12, 21), kTromso), clock_s(11, 42, 26), kAlmanac_s);
}

// Reda and Andreas (2004) print 17:20:19 for 17 October 2003: it is the sunset of the 16th by the
// local date, because their day is that of Greenwich. Recomputed: 17:20:18 on the 16th, 17:18:50 on
// the 17th.
TEST(SunDay, GivesTheEventsOfTheLocalDate) {
  const Site golden{"Golden", -7, {Angle::degrees(39.742476), Angle::degrees(-105.1786), 1830.14}};
  const Date sixteenth = date_of(2003, 10, 16);
  const Date seventeenth = date_of(2003, 10, 17);
  EXPECT_NEAR(local_s(day_at(golden, sixteenth).set, sixteenth, golden), clock_s(17, 20, 18), kAlmanac_s);
  EXPECT_NEAR(local_s(day_at(golden, seventeenth).set, seventeenth, golden), clock_s(17, 18, 50), kAlmanac_s);
  EXPECT_NEAR(local_s(day_at(golden, seventeenth).rise, seventeenth, golden), clock_s(6, 12, 44), kAlmanac_s);
  EXPECT_NEAR(local_s(day_at(golden, seventeenth).transit, seventeenth, golden), clock_s(11, 46, 4),
              kAlmanac_s);
}

// Through a whole year at Tromsø every date's events lie on that date, at the threshold.
TEST(SunDay, StaysOnItsDateAllYear) {
  int rising = 0;
  for (int i = 0; i < 366; ++i) {
    const Date date{std::chrono::sys_days{date_of(2024, 1, 1)} + std::chrono::days{i}};
    const SunDay day = day_at(kTromso, date);
    if (day.kind != SunDay::Kind::rises) continue;
    ++rising;
    for (const UtcTime event : {day.rise, day.set}) {
      const double s = local_s(event, date, kTromso);
      EXPECT_GE(s, 0.0);
      EXPECT_LE(s, 86400.0);
      if (s == 0.0 || s == 86400.0) continue;  // the date lacks this event
      // The sun moves by at most 0.0042 degrees a second of time; the event is rounded to one.
      EXPECT_NEAR(sun_position(event, kTromso.place).elevation.degrees(), -0.8333, 0.0042) << i;
    }
  }
  // Tromsø has about two months of each (Norwegian Meteorological Institute: midnight sun 20 May to
  // 22 July, polar night 27 November to 15 January).
  EXPECT_NEAR(rising, 366 - 64 - 50, 4);
}

// The first sun after polar night shows itself for minutes only, between two samples of any scan.
TEST(SunDay, FindsASunThatShowsForMinutes) {
  const Date date = date_of(2025, 1, 14);
  const SunDay scan = day_at(kTromso, date);
  const double noon_deg = sun_position(scan.transit, kTromso.place).elevation.degrees();
  const SunDay brief = day_at(kTromso, date, noon_deg - 0.0005);
  ASSERT_EQ(brief.kind, SunDay::Kind::rises);
  EXPECT_LT((brief.set - brief.rise).count(), 600);
  EXPECT_GT((brief.set - brief.rise).count(), 0);
  EXPECT_EQ(day_at(kTromso, date, noon_deg + 0.0005).kind, SunDay::Kind::never_up);
}

}  // namespace
}  // namespace sunfall

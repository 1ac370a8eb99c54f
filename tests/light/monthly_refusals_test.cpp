#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "light/series_checks.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using testing::Contains;
using testing::HasSubstr;
using testing::Not;

const MonthlyGlobalSource kLowland{{2.2, 4.1, 8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 1.8}};

std::string refusal(const MonthlyGlobalSource& source, double latitude_deg = 52.0) {
  try {
    light_of(source, place_at(latitude_deg));
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::plan);
    return error.what();
  }
  return "accepted";
}

std::string refusal_of(std::size_t month, double value) {
  MonthlyGlobalSource source = kLowland;
  source.global_mj_m2_d[month] = value;
  return refusal(source);
}

std::vector<std::string> notes_of(const MonthlyGlobalSource& source, double latitude_deg = 52.0) {
  return light_of(source, place_at(latitude_deg)).notes;
}

TEST(MonthlyRefusals, NameTheMonthTheValueAndThePlace) {
  const std::string message = refusal_of(2, -4.0);
  EXPECT_THAT(message, HasSubstr("March"));
  EXPECT_THAT(message, HasSubstr("negative"));
  EXPECT_THAT(message, HasSubstr("-4 MJ m-2 d-1"));
  EXPECT_THAT(message, HasSubstr("farm.toml:9 light"));
  EXPECT_THAT(refusal_of(0, std::nan("")), HasSubstr("not a number"));
  EXPECT_THAT(refusal_of(11, INFINITY), HasSubstr("not a number"));
}

// The ceiling of June at 52 N: FAO-56 Table 2.6 has 41.7 at 50 N and 41.2 at 60 N on the 15th for a solar
// constant of 1366.67; for 1361 that is 41.1 to 41.5.
TEST(MonthlyRefusals, NameTheCeilingAndTheLikelySlip) {
  const std::string message = refusal_of(5, 209.0);  // 18.1 MJ m-2 d-1 in W m-2
  EXPECT_THAT(message, HasSubstr("June"));
  EXPECT_THAT(message, testing::ContainsRegex("41\\.[1-5] MJ m-2 d-1"));
  EXPECT_THAT(message, HasSubstr("0.0864"));
  EXPECT_EQ(refusal_of(5, 41.0), "accepted");
}

TEST(MonthlyRefusals, WantNoneInPolarNight) {
  MonthlyGlobalSource arctic{{0.0, 0.5, 5.0, 11.0, 16.0, 18.0, 17.0, 11.0, 6.0, 2.0, 0.0, 0.0}};
  EXPECT_EQ(refusal(arctic, 75.0), "accepted");
  arctic.global_mj_m2_d[11] = 0.5;
  EXPECT_THAT(refusal(arctic, 75.0), HasSubstr("December"));
  arctic.global_mj_m2_d[11] = 0.02;  // twilight on an instrument
  EXPECT_THAT(notes_of(arctic, 75.0), Contains(HasSubstr("December: the sun does not rise")));
}

TEST(MonthlyNotes, AreQuietForPlausibleValues) {
  EXPECT_THAT(notes_of(kLowland), Not(Contains(HasSubstr("check the value"))));
  EXPECT_THAT(notes_of(kLowland), Not(Contains(HasSubstr("kWh"))));
  EXPECT_THAT(notes_of(kLowland), Contains(HasSubstr("µmol per J")));
}

TEST(MonthlyNotes, SpeakUpAboutOddValues) {
  MonthlyGlobalSource high = kLowland;
  high.global_mj_m2_d[6] = 38.0;
  EXPECT_THAT(notes_of(high),
              Contains(HasSubstr("July: 38.0 MJ m-2 d-1 is more than a very clean cloudless sky")));
  MonthlyGlobalSource low = kLowland;
  low.global_mj_m2_d[6] = 1.7;  // a slipped point
  EXPECT_THAT(notes_of(low), Contains(HasSubstr("July: 1.7 MJ m-2 d-1 is less than a tenth")));
  MonthlyGlobalSource kilowatt_hours = kLowland;
  for (double& value : kilowatt_hours.global_mj_m2_d) value /= 3.6;
  EXPECT_THAT(notes_of(kilowatt_hours), Contains(HasSubstr("kWh")));
}

}  // namespace
}  // namespace sunfall

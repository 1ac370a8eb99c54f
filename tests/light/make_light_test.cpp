#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "light/series_checks.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

TEST(MakeLight, CoversTheCalendarYearInLocalStandardTime) {
  const LightSeries series = light_of(ClearSource{}, place_at(-33.9, 151.2), 2024, "Australia/Sydney");
  EXPECT_EQ(series.utc_offset, std::chrono::hours{10});
  EXPECT_EQ(series.steps.size(), 366U * 144U);
  EXPECT_EQ(series.years, 1);
  EXPECT_EQ(series.sun.step, kLightStep);
  const UtcTime midnight = std::chrono::sys_days{std::chrono::year{2024} / 1 / 1} - std::chrono::hours{10};
  EXPECT_EQ(series.sun.begin, midnight);
}

TEST(MakeLight, KnowsTheMonthOfEachStep) {
  const LightSeries series = light_of(ClearSource{}, place_at(50.0), 2024, "+05:30");
  EXPECT_EQ(days_of_months(series), (std::array<int, 12>{31, 29, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31}));
  EXPECT_EQ(month_of_step(series, 0), 0);
  EXPECT_EQ(month_of_step(series, 31 * 144 - 1), 0);
  EXPECT_EQ(month_of_step(series, 31 * 144), 1);
  EXPECT_EQ(month_of_step(series, 60 * 144 - 1), 1);  // 29 February
  EXPECT_EQ(month_of_step(series, 60 * 144), 2);
  EXPECT_EQ(month_of_step(series, 366 * 144 - 1), 11);
}

TEST(MakeLight, RefusesYearsWithoutASun) {
  for (const int year : {1949, 2101, 0, -5}) {
    try {
      light_of(ClearSource{}, place_at(50.0), year);
      ADD_FAILURE() << year;
    } catch (const Error& error) {
      EXPECT_EQ(error.kind(), ErrorKind::plan);
      EXPECT_THAT(error.what(), testing::HasSubstr("1950 to 2100"));
    }
  }
}

TEST(ClearSource, IsSoundEverywhere) {
  for (const double latitude_deg : {-90.0, -69.0, -35.0, 0.0, 23.4, 52.0, 69.0, 90.0}) {
    for (const double height_m : {0.0, 3500.0}) {
      SCOPED_TRACE(latitude_deg);
      expect_sound(light_of(ClearSource{}, place_at(latitude_deg, -120.0, height_m), 2024));
    }
  }
}

TEST(ClearSource, IsLabelledAsACeiling) {
  const LightSeries series = light_of(ClearSource{}, place_at(52.0));
  EXPECT_TRUE(series.is_ceiling);
  EXPECT_THAT(series.description, testing::HasSubstr("Linke turbidity 3.0"));
  EXPECT_THAT(series.notes, testing::Contains(testing::HasSubstr("ceiling")));
  EXPECT_THAT(series.notes, testing::Contains(testing::HasSubstr("µmol per J")));
}

// FAO-56 eq. 37, clear-sky radiation (0.75 + 2e-5 z) Ra: a rule of thumb that holds to a few per cent for
// days with a high sun. Summer half, a usual turbidity of 3.
TEST(ClearSource, AgreesWithTheRuleOfFao56) {
  for (const double latitude_deg : {20.0, 40.0, 52.0}) {
    const LightSeries series = light_of(ClearSource{}, place_at(latitude_deg, 0.0, 100.0));
    const auto clear = monthly_global_mj_m2_d(series);
    const auto above = monthly_mean_mj_m2_d(
        series, [&series](std::size_t i) { return extraterrestrial_level_w_m2(series, i); });
    for (std::size_t month = 3; month < 9; ++month) {
      EXPECT_NEAR(clear[month] / above[month], 0.75 + 2e-5 * 100.0, 0.05) << latitude_deg << ' ' << month;
    }
  }
}

TEST(ClearSource, TakesEachMonthsTurbidity) {
  ClearSource hazy_july;
  hazy_july.linke_turbidity[6] = 6.0;
  const auto clear = monthly_global_mj_m2_d(light_of(ClearSource{}, place_at(45.0)));
  const auto hazy = monthly_global_mj_m2_d(light_of(hazy_july, place_at(45.0)));
  for (std::size_t month = 0; month < 12; ++month) {
    if (month == 6) {
      EXPECT_LT(hazy[month], 0.95 * clear[month]);
    } else {
      EXPECT_DOUBLE_EQ(hazy[month], clear[month]);
    }
  }
}

TEST(ClearSource, RefusesAnImpossibleTurbidity) {
  for (const double value : {0.5, -1.0, 13.0, std::nan("")}) {
    ClearSource source;
    source.linke_turbidity[1] = value;
    try {
      light_of(source, place_at(52.0));
      ADD_FAILURE() << value;
    } catch (const Error& error) {
      EXPECT_EQ(error.kind(), ErrorKind::plan);
      EXPECT_THAT(error.what(), testing::HasSubstr("February"));
      EXPECT_THAT(error.what(), testing::HasSubstr("farm.toml:9 light"));
    }
  }
}

// North and south mirror each other by half a year, but for the orbit (7 % of distance factor).
TEST(ClearSource, MirrorsTheHemispheres) {
  const auto north = monthly_global_mj_m2_d(light_of(ClearSource{}, place_at(40.0)));
  const auto south = monthly_global_mj_m2_d(light_of(ClearSource{}, place_at(-40.0)));
  for (std::size_t month = 0; month < 12; ++month) {
    EXPECT_NEAR(south[(month + 6) % 12] / north[month], 1.0, 0.09) << month;
  }
}

}  // namespace
}  // namespace sunfall

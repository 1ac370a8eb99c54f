#include <gtest/gtest.h>

#include <random>

#include "light/daily_ratios.h"
#include "light/series_checks.h"
#include "sun/ephemeris.h"

namespace sunfall {
namespace {

std::array<double, 12> above_air(const Place& place, int year) {
  const LightSeries open = light_of(ClearSource{}, place, year);
  return monthly_mean_mj_m2_d(open, [&open](std::size_t i) { return extraterrestrial_level_w_m2(open, i); });
}

MonthlyGlobalSource with_clearness(const Place& place, int year, const std::array<double, 12>& clearness) {
  MonthlyGlobalSource source{above_air(place, year)};
  for (std::size_t month = 0; month < 12; ++month) source.global_mj_m2_d[month] *= clearness[month];
  return source;
}

void expect_means(const LightSeries& series, const MonthlyGlobalSource& source) {
  const auto mean = monthly_global_mj_m2_d(series);
  for (std::size_t month = 0; month < 12; ++month) {
    EXPECT_NEAR(mean[month], source.global_mj_m2_d[month], 1e-6 * std::max(1.0, source.global_mj_m2_d[month]))
        << month_name(month);
  }
}

// Invented but plausible values for a lowland near 52 N.
const MonthlyGlobalSource kLowland{{2.2, 4.1, 8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 1.8}};

TEST(MonthlyGlobal, ReturnsTheGivenMeans) {
  for (const int year : {2024, 2025}) {
    const LightSeries series = light_of(kLowland, place_at(52.0), year, "Europe/Amsterdam");
    expect_sound(series);
    expect_means(series, kLowland);
    EXPECT_FALSE(series.is_ceiling);
  }
}

TEST(MonthlyGlobal, HoldsInTheSouthAtTheEquatorAndInPolarNight) {
  const std::array<double, 12> clearness{0.5, 0.45, 0.6, 0.7, 0.3, 0.2, 0.4, 0.55, 0.65, 0.35, 0.25, 0.5};
  for (const double latitude_deg : {-33.9, 0.0, 69.0, -78.0, 90.0}) {
    SCOPED_TRACE(latitude_deg);
    const Place place = place_at(latitude_deg);
    const MonthlyGlobalSource source = with_clearness(place, 2024, clearness);
    const LightSeries series = light_of(source, place, 2024);
    expect_sound(series);
    expect_means(series, source);
  }
}

// Every day of a month is equally clear.
TEST(MonthlyGlobal, GivesEachDayItsShareOfTheSun) {
  const LightSeries series = light_of(kLowland, place_at(52.0));
  const auto above = above_air(place_at(52.0), 2025);
  for (std::size_t day = 0; day < 365; ++day) {
    double global_sum = 0.0;
    double above_sum = 0.0;
    for (std::size_t i = day * kStepsPerDay; i < (day + 1) * kStepsPerDay; ++i) {
      global_sum += global_w(series.steps[i]);
      above_sum += extraterrestrial_level_w_m2(series, i);
    }
    const auto month = static_cast<std::size_t>(month_of_step(series, day * kStepsPerDay));
    EXPECT_NEAR(global_sum / above_sum, kLowland.global_mj_m2_d[month] / above[month], 1e-6) << day;
  }
}

// The month's sky part is Erbs's for its clearness and mean day. Klein's (1977) declinations of the mean
// days move the sunset by less than 0.5 degrees, and only which side of 81.4 it lies on matters.
TEST(MonthlyGlobal, SplitsAsErbsDoes) {
  const std::array<double, 12> klein_declination_deg{-20.9, -13.0, -2.4, 9.4,  18.8,  23.1,
                                                     21.2,  13.5,  2.2,  -9.6, -18.9, -23.0};
  const LightSeries series = light_of(kLowland, place_at(52.0));
  const auto above = above_air(place_at(52.0), 2025);
  const auto sky = monthly_mean_mj_m2_d(
      series, [&series](std::size_t i) { return static_cast<double>(series.steps[i].sky_w); });
  for (std::size_t month = 0; month < 12; ++month) {
    const double clearness = kLowland.global_mj_m2_d[month] / above[month];
    const Angle sunset =
        sunset_hour_angle(Angle::degrees(52.0), Angle::degrees(klein_declination_deg[month]));
    EXPECT_NEAR(sky[month] / kLowland.global_mj_m2_d[month], erbs_monthly_diffuse_part(clearness, sunset),
                1e-6)
        << month_name(month);
  }
}

// Morning and afternoon mirror each other about true solar noon: at longitude 0 and the day when the
// equation of time vanishes (15 April, 0.09 minutes).
TEST(MonthlyGlobal, IsSymmetricAboutNoon) {
  const LightSeries series = light_of(kLowland, place_at(52.0, 0.0), 2024);
  const std::size_t day = 105;  // 15 April of a leap year
  for (std::size_t i = 0; i < 72; ++i) {
    const LightStep& morning = series.steps[day * kStepsPerDay + 71 - i];
    const LightStep& afternoon = series.steps[day * kStepsPerDay + 72 + i];
    // 0.18 minutes of 0.2 degrees a minute, at up to 10 W m-2 a degree; the declination's drift of 0.25
    // degrees in 12 h moves the sums by up to 2 W m-2 more.
    EXPECT_NEAR(global_w(morning), global_w(afternoon), 3.0) << i;
  }
}

TEST(MonthlyGlobal, HoldsForAnyClearnessAnywhere) {
  std::mt19937_64 random(1977);
  std::uniform_real_distribution<double> unit(0.0, 1.0);
  for (int round = 0; round < 12; ++round) {
    const Place place =
        place_at(-90.0 + 180.0 * unit(random), -180.0 + 360.0 * unit(random), 3000.0 * unit(random));
    const int year = 1950 + static_cast<int>(150.0 * unit(random));
    std::array<double, 12> clearness;
    for (double& value : clearness) value = unit(random);
    SCOPED_TRACE(place.latitude.degrees());
    const MonthlyGlobalSource source = with_clearness(place, year, clearness);
    const LightSeries series = light_of(source, place, year);
    expect_sound(series);
    expect_means(series, source);
  }
}

// A clearness of 1 is the edge of what is accepted: no step may beam more than the sun.
TEST(MonthlyGlobal, HoldsAtTheCeiling) {
  const Place place = place_at(45.0);
  std::array<double, 12> all;
  all.fill(1.0);
  MonthlyGlobalSource source = with_clearness(place, 2025, all);
  for (double& value : source.global_mj_m2_d) value *= 1.0 - 1e-12;
  const LightSeries series = light_of(source, place);
  expect_sound(series);
  expect_means(series, source);
}

}  // namespace
}  // namespace sunfall

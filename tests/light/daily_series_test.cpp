// Daily sums of radiation and photons, laid over ten-minute steps.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <random>

#include "light/daily_ratios.h"
#include "light/day_course.h"
#include "light/day_file.h"

namespace sunfall {
namespace {

using testing::Contains;
using testing::HasSubstr;
using testing::Not;
using Unit = SeriesSource::Unit;

// A day's clearness from dull to clear, never twice the same.
double some_clearness(int day) { return 0.08 + 0.62 * std::fmod(0.381966 * (day + 1), 1.0); }

std::vector<double> above_air_mj(const Place& place, int year, const std::string& clock = "+00:00") {
  return day_above_air_mj(light_of(ClearSource{}, place, year, clock));
}

std::string record_of(const std::vector<double>& above, int year, double scale = 1.0) {
  return day_text("g", year, static_cast<int>(above.size()), [&](int day) {
    return number_text(scale * some_clearness(day) * above[static_cast<std::size_t>(day)]);
  });
}

// Every day comes back, in a leap year and a common one, wherever the sun rises.
TEST(DailySeries, ReturnsEachDaysSum) {
  for (const double latitude_deg : {52.0, 0.0, -33.9, 69.0, -78.0}) {
    for (const int year : {2024, 2025}) {
      SCOPED_TRACE(latitude_deg);
      const Place place = place_at(latitude_deg);
      const std::vector<double> above = above_air_mj(place, year, "+01:00");
      ASSERT_EQ(above.size(), year == 2024 ? 366U : 365U);
      const TextFile file(record_of(above, year));
      const LightSeries series = light_of(days_of(file), place, 2025, "+01:00");
      EXPECT_EQ(int{series.first_year}, year);
      expect_sound(series);
      const std::vector<double> global = day_global_mj(series);
      for (std::size_t day = 0; day < above.size(); ++day) {
        EXPECT_NEAR(global[day], some_clearness(static_cast<int>(day)) * above[day],
                    1e-6 * std::max(1.0, above[day]))
            << day;
      }
    }
  }
}

TEST(DailySeries, SplitsEachDayByItsOwnClearness) {
  const Place place = place_at(52.0);
  const std::vector<double> above = above_air_mj(place, 2025);
  const TextFile file(record_of(above, 2025));
  for (const DaySplit split : {DaySplit::erbs, DaySplit::collares_pereira}) {
    SeriesSource source = days_of(file);
    source.day_split = split;
    const LightSeries series = light_of(source, place);
    const std::vector<double> global = day_global_mj(series);
    const std::vector<double> sky = day_sky_mj(series);
    for (std::size_t day = 0; day < above.size(); ++day) {
      const double part =
          daily_diffuse_part(split, some_clearness(static_cast<int>(day)), sunset_of_day(series, day));
      EXPECT_NEAR(sky[day], part * global[day], 1e-5 * above[day]) << day;
    }
    EXPECT_THAT(series.notes,
                Contains(HasSubstr(std::string("split into beam and sky by ") + name_of(split))));
    EXPECT_EQ(series.description.substr(series.description.find(" of ")),
              " of daily radiation (global), 2025");
  }
}

// The same light in every unit; per day is what a sum over a day's step is anyway.
TEST(DailySeries, KnowsItsUnits) {
  const Place place = place_at(45.0);
  const std::vector<double> above = above_air_mj(place, 2025);
  const TextFile reference(record_of(above, 2025));
  const std::vector<double> expected = day_global_mj(light_of(days_of(reference), place));
  for (const auto& [unit, per_mj] : {std::pair{Unit::mj_m2_d, 1.0},
                                     {Unit::kj_m2, 1e3},
                                     {Unit::j_cm2, 100.0},
                                     {Unit::j_cm2_d, 100.0},
                                     {Unit::kwh_m2_d, 1.0 / 3.6},
                                     {Unit::wh_m2, 1e3 / 3.6},
                                     {Unit::w_m2, 1e6 / 86400.0}}) {
    const TextFile file(record_of(above, 2025, per_mj));
    const std::vector<double> global = day_global_mj(light_of(days_of(file, unit), place));
    for (std::size_t day = 0; day < global.size(); ++day)
      EXPECT_NEAR(global[day], expected[day], 1e-5) << day;
  }
}

// A day's photons pass unchanged, whatever the split makes of them.
TEST(DailySeries, ReturnsEachDaysPhotons) {
  const Place place = place_at(52.0);
  const std::vector<double> above = above_air_mj(place, 2025);
  const TextFile file(record_of(above, 2025, 2.0));
  const LightSeries series = light_of(days_of(file, Unit::mol_m2_d), place);
  expect_sound(series);
  const std::vector<double> dli =
      day_sums(series, 600e-6, [&](std::size_t i) { return global_umol(series.steps[i]); });
  for (std::size_t day = 0; day < above.size(); ++day) {
    const double given = 2.0 * some_clearness(static_cast<int>(day)) * above[day];
    EXPECT_NEAR(dli[day], given, 4e-6 * std::max(1.0, given)) << day;  // 3e-6 as of hours, and the sum
  }
  EXPECT_THAT(series.description, HasSubstr("daily photons"));
}

// A known sky, logged in hours and in days: how much photosynthetic light the months bring does not depend on
// which was kept.
TEST(DailySeries, AgreesWithTheHoursOfTheSameLight) {
  for (const double latitude_deg : {52.0, 36.0, -33.9, 5.0}) {
    SCOPED_TRACE(latitude_deg);
    const Place place = place_at(latitude_deg, 5.0);
    const LightSeries truth = cloudy_truth(place, 2025, "+00:00");
    const TextFile hours(logged(truth, {.columns = "g"}));
    const MonthlyLight hourly = monthly_dli(light_of(source_of(hours, {.columns = "g"}), place));
    const TextFile days(
        logged(truth, {.step_min = 1440, .stamp = SeriesSource::Stamp::begin, .columns = "g"}));
    SeriesSource source = source_of(days, {.columns = "g"});
    source.stamp = SeriesSource::Stamp::day;
    const MonthlyLight daily = monthly_dli(light_of(source, place));
    for (std::size_t month = 0; month < 12; ++month) {
      EXPECT_NEAR(daily.total(month), hourly.total(month), 0.005 * hourly.total(month)) << month_name(month);
    }
  }
}

// Diffuse, or the beam on a plane that faces the sun, tell the sky. The beam's hours are not in a daily
// record: the clear course that stands for them leaves some per cent.
TEST(DailySeries, KeepsWhatIsMeasuredOfTheSky) {
  const Place place = place_at(45.0, 5.0);
  const LightSeries truth = cloudy_truth(place, 2025, "+00:00");
  const MonthlyLight expected = monthly_dli(truth);
  for (const auto& [columns, tolerance] : {std::pair{"gd", 0.03}, {"db", 0.06}, {"gb", 0.06}}) {
    SCOPED_TRACE(columns);
    const TextFile file(
        logged(truth, {.step_min = 1440, .stamp = SeriesSource::Stamp::begin, .columns = columns}));
    SeriesSource source = source_of(file, {.columns = columns});
    source.stamp = SeriesSource::Stamp::day;
    const LightSeries series = light_of(source, place);
    expect_sound(series);
    EXPECT_THAT(series.notes, Not(Contains(HasSubstr("split into"))));
    const MonthlyLight found = monthly_dli(series);
    for (std::size_t month = 0; month < 12; ++month) {
      EXPECT_NEAR(found.sky[month], expected.sky[month], tolerance * expected.total(month))
          << month_name(month);
      EXPECT_NEAR(found.beam[month], expected.beam[month], tolerance * expected.total(month))
          << month_name(month);
    }
  }
}

TEST(DailySeries, CoversSeveralYears) {
  const Place place = place_at(52.0);
  std::string text = record_of(above_air_mj(place, 2023), 2023);
  for (const int year : {2024, 2025}) {
    const std::string more = record_of(above_air_mj(place, year), year);
    text += more.substr(more.find('\n') + 1);
  }
  const TextFile file(text);
  const LightSeries series = light_of(days_of(file), place);
  EXPECT_EQ(series.years, 3);
  EXPECT_EQ(int{series.first_year}, 2023);
  EXPECT_EQ(day_global_mj(series).size(), 365U + 366U + 365U);
}

// A month's fourth part of days may be missing where that is allowed: they get the clearness of the days
// around.
TEST(DailySeries, FillsGapsByTheRule) {
  const Place place = place_at(45.0);
  const std::vector<double> above = above_air_mj(place, 2025);
  const TextFile file(day_text("g", 2025, 365, [&](int day) {
    if (day == 100) return std::string();
    // 0.3 in the three days before, 0.5 in the three after.
    const double clearness = day >= 97 && day < 100    ? 0.3
                             : day > 100 && day <= 103 ? 0.5
                                                       : some_clearness(day);
    return number_text(clearness * above[static_cast<std::size_t>(day)]);
  }));
  const LightSeries series = light_of(days_of(file), place);
  // The sun's growth of 0.7 % a day weights the mean by at most 2 %.
  EXPECT_NEAR(day_global_mj(series)[100] / above[100], 0.4, 0.02 * 0.4);
  EXPECT_THAT(series.notes, Contains(HasSubstr("2025: April 3.")));
}

// Whatever the record, its light is sound, its days are kept, and what cannot be is filled.
TEST(DailySeries, IsSoundWhateverTheRecord) {
  std::mt19937_64 random(1979);
  const auto uniform = [&] { return static_cast<double>(random() >> 11) * 0x1p-53; };
  for (int round = 0; round < 8; ++round) {
    const Place place = place_at(-90.0 + 180.0 * uniform(), -180.0 + 360.0 * uniform(), 3000.0 * uniform());
    SCOPED_TRACE(place.latitude.degrees());
    const std::vector<double> above = above_air_mj(place, 2025);
    std::vector<double> given(365);
    const TextFile file(day_text("g,d", 2025, 365, [&](int day) {
      double& value = given[static_cast<std::size_t>(day)];
      const double clearness = uniform();
      value = clearness * above[static_cast<std::size_t>(day)];
      const double dice = uniform();
      if (dice < 0.02) value = std::nan("");          // missing
      if (dice >= 0.02 && dice < 0.03) value *= 4.0;  // a fault of the logger
      if (dice >= 0.03 && dice < 0.05) value = -7.0;  // another
      const std::string sky = uniform() < 0.5 ? "" : number_text(uniform() * value);
      return number_text(value) + "," + sky;
    }));
    SeriesSource source = days_of(file);
    source.diffuse = "d";
    source.allow_gaps = true;
    const LightSeries series = light_of(source, place);
    expect_sound(series);
    const std::vector<double> global = day_global_mj(series);
    for (std::size_t day = 0; day < 365; ++day) {
      EXPECT_LE(global[day], above[day] * (1.0 + 1e-6)) << day;
      // Under 5 MJ, or half a per cent of the light above the air, other rules hold.
      const bool taken = given[day] >= 0.0 && given[day] <= above[day] && given[day] > 0.006 * above[day];
      if (!taken) continue;
      EXPECT_NEAR(global[day], given[day], 1e-6 * std::max(1.0, above[day])) << day;
    }
  }
}

// Polar night may hold a trace of light on an instrument.
TEST(DailySeries, LeavesPolarNightDark) {
  const Place place = place_at(78.0);
  const std::vector<double> above = above_air_mj(place, 2025);
  const TextFile file(day_text("g", 2025, 365, [&](int day) {
    const double light = above[static_cast<std::size_t>(day)];
    return number_text(light > 0.0 ? some_clearness(day) * light : 0.03);
  }));
  const LightSeries series = light_of(days_of(file), place);
  expect_sound(series);
  EXPECT_THAT(series.notes, Not(Contains(HasSubstr("rejected"))));
}

}  // namespace
}  // namespace sunfall

// A record of a known truth comes back as that truth.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cstdio>

#include "light/hourly_split.h"
#include "light/station.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using Stamp = SeriesSource::Stamp;
using Unit = SeriesSource::Unit;

const std::string kClock = "+01:00";

LightSeries run_back(const LightSeries& truth, const LoggerFormat& format, Unit unit = Unit::w_m2,
                     const std::string& clock = kClock) {
  const TextFile file(logged(truth, format));
  SeriesSource source = source_of(file, format);
  if (source.unit == Unit::w_m2) source.unit = unit;
  return light_of(source, truth.place, 2025, clock);
}

void expect_near(const MonthlyLight& found, const MonthlyLight& truth, double part) {
  for (std::size_t month = 0; month < 12; ++month) {
    EXPECT_NEAR(found.beam[month], truth.beam[month], part * truth.beam[month]) << "beam " << month;
    EXPECT_NEAR(found.sky[month], truth.sky[month], part * truth.sky[month]) << "sky " << month;
  }
}

// The demand: hours of a known truth, run back, give beam and sky within 1 % in every month.
TEST(Series, HoursGiveBackTheTruth) {
  for (const double latitude_deg : {52.0, 35.0, -34.0, 5.0}) {
    SCOPED_TRACE(latitude_deg);
    const LightSeries truth = cloudy_truth(place_at(latitude_deg, 15.0), 2025, kClock);
    const MonthlyLight dli = monthly_dli(truth);
    for (const char* columns : {"gd", "gdb", "db", "gb"}) {
      SCOPED_TRACE(columns);
      const LightSeries back = run_back(truth, {.columns = columns});
      expect_sound(back);
      expect_near(monthly_dli(back), dli, 0.01);
    }
  }
}

double year_dli(const LightSeries& series) {
  const MonthlyLight dli = monthly_dli(series);
  const std::array<int, 12> days = days_of_months(series);
  double sum = 0.0;
  for (std::size_t month = 0; month < 12; ++month) sum += dli.total(month) * days[month];
  return sum / (365.0 * series.years);
}

const LightSeries& lowland_truth() {
  static const LightSeries truth = cloudy_truth(place_at(52.0, 15.0), 2025, kClock);
  return truth;
}

// The sum is kept exactly: only the light while the sun's centre is below the horizon is lost, of which the
// truth has none. Photons per joule hardly depend on how an hour is cut (0.02 %).
TEST(Series, AnyStepKeepsTheSum) {
  for (const int step_min : {1, 5, 10, 12, 15, 20, 30, 45, 60}) {
    SCOPED_TRACE(step_min);
    const LightSeries back = run_back(lowland_truth(), {.step_min = step_min, .columns = "gd"});
    expect_sound(back);
    const auto found = monthly_global_mj_m2_d(back);
    const auto truth = monthly_global_mj_m2_d(lowland_truth());
    for (std::size_t month = 0; month < 12; ++month)
      EXPECT_NEAR(found[month], truth[month], 1e-4 * truth[month]);
    expect_near(monthly_dli(back), monthly_dli(lowland_truth()), 0.01);
  }
}

// Hours in a row that a file sums up keep their sum too; when within them the sun shone is lost. Photons per
// joule lie between 1.971 and 2.099: what moves from clear to dull hours changes them by 3.2 % at the most.
TEST(Series, StepsOfHoursKeepTheSum) {
  for (const int hours : {2, 3, 4, 6, 8, 12}) {
    SCOPED_TRACE(hours);
    const LightSeries back = run_back(lowland_truth(), {.step_min = 60 * hours, .columns = "gd"});
    expect_sound(back);
    const auto found = monthly_global_mj_m2_d(back);
    const auto truth = monthly_global_mj_m2_d(lowland_truth());
    const MonthlyLight found_dli = monthly_dli(back);
    const MonthlyLight truth_dli = monthly_dli(lowland_truth());
    for (std::size_t month = 0; month < 12; ++month) {
      EXPECT_NEAR(found[month], truth[month], 1e-4 * truth[month]);
      EXPECT_NEAR(found_dli.total(month), truth_dli.total(month), 0.032 * truth_dli.total(month));
    }
    EXPECT_THAT(back.description, testing::HasSubstr("every " + std::to_string(hours) + " hours"));
    EXPECT_THAT(back.notes, testing::Contains(testing::HasSubstr("hide when within them the sun shone")));
  }
}

// Ten-minute records come back step by step, to the seven digits that were written.
TEST(Series, TenMinutesPassUnchanged) {
  const LightSeries back = run_back(lowland_truth(), {.step_min = 10, .columns = "gd"});
  for (std::size_t i = 0; i < back.steps.size(); ++i) {
    const LightStep& truth = lowland_truth().steps[i];
    ASSERT_NEAR(back.steps[i].sky_w, truth.sky_w, 2e-6 * global_w(truth) + 1e-6) << i;
    ASSERT_NEAR(back.steps[i].beam_w, truth.beam_w, 2e-6 * global_w(truth) + 1e-6) << i;
  }
}

TEST(Series, UnitsAreTheSameLight) {
  for (const int step_min : {10, 60}) {
    const double expected = year_dli(run_back(lowland_truth(), {.step_min = step_min, .columns = "gd"}));
    const double step_s = step_min * 60.0;
    for (const auto& [unit, scale] : {std::pair{Unit::j_m2, step_s},
                                      {Unit::kj_m2, step_s * 1e-3},
                                      {Unit::mj_m2, step_s * 1e-6},
                                      {Unit::j_cm2, step_s * 1e-4},
                                      {Unit::wh_m2, step_s / 3600.0},
                                      {Unit::kwh_m2, step_s / 3.6e6}}) {
      const LightSeries back =
          run_back(lowland_truth(), {.step_min = step_min, .columns = "gd", .scale = scale}, unit);
      EXPECT_NEAR(year_dli(back), expected, 1e-3 * expected) << static_cast<int>(unit);
    }
  }
}

TEST(Series, StampsAreTheSameLight) {
  const MonthlyLight expected = monthly_dli(run_back(lowland_truth(), {.columns = "gd"}));
  for (const Stamp stamp : {Stamp::begin, Stamp::middle, Stamp::end}) {
    for (const char* offset : {"", "+01:00", "+0100"}) {
      const LightSeries back = run_back(lowland_truth(), {.stamp = stamp, .columns = "gd", .offset = offset});
      expect_near(monthly_dli(back), expected, 1e-3);
    }
  }
  const LightSeries zoned =
      run_back(lowland_truth(), {.columns = "gd", .offset = "+01:00"}, Unit::w_m2, "Europe/Berlin");
  expect_near(monthly_dli(zoned), expected, 1e-3);
  EXPECT_EQ(zoned.utc_offset, std::chrono::hours{1});
}

TEST(Series, UniversalTimeIsTheSameLight) {
  const LoggerFormat format{.columns = "gd", .clock_error_min = -60};
  const TextFile file(logged(lowland_truth(), format));
  SeriesSource source = source_of(file, format);
  source.utc = true;
  expect_near(monthly_dli(light_of(source, place_at(52.0, 15.0), 2025, kClock)), monthly_dli(lowland_truth()),
              0.01);
}

// A quantum sensor's photons are the light: nothing is added to them or taken away, whatever is assumed about
// the radiation that they came with.
TEST(Series, QuantumSensorPassesUnchanged) {
  for (const int step_min : {10, 60}) {
    const LightSeries back = run_back(lowland_truth(), {.step_min = step_min, .columns = "p"});
    expect_sound(back);
    for (std::size_t begin = 0; begin < back.steps.size(); begin += std::size_t(step_min / 10)) {
      double found = 0.0, truth = 0.0;
      for (std::size_t i = begin; i < begin + std::size_t(step_min / 10); ++i) {
        found += global_umol(back.steps[i]);
        truth += global_umol(lowland_truth().steps[i]);
      }
      ASSERT_NEAR(found, truth, 3e-6 * truth + 1e-4) << begin;
    }
  }
}

// With a shaded second sensor the sky's photons are measured too, and are as little touched.
TEST(Series, ShadedQuantumSensorPassesUnchanged) {
  const LightSeries back = run_back(lowland_truth(), {.step_min = 10, .columns = "pq"});
  expect_sound(back);
  for (std::size_t i = 0; i < back.steps.size(); ++i) {
    const LightStep& truth = lowland_truth().steps[i];
    ASSERT_NEAR(back.steps[i].sky_umol, truth.sky_umol, 1e-5 * global_umol(truth) + 1e-4) << i;
    ASSERT_NEAR(back.steps[i].beam_umol, truth.beam_umol, 1e-5 * global_umol(truth) + 1e-4) << i;
  }
}

// Closure to the rounding of a float, on every step, and a sky that is a part of it.
TEST(Series, SplitHoursAreClosed) {
  for (const auto split : {SeriesSource::Split::logistic, SeriesSource::Split::erbs}) {
    for (const int step_min : {10, 60}) {
      const LoggerFormat format{.step_min = step_min, .columns = "g"};
      const TextFile file(logged(lowland_truth(), format));
      SeriesSource source = source_of(file, format);
      source.split = split;
      const LightSeries back = light_of(source, place_at(52.0, 15.0), 2025, kClock);
      expect_sound(back);
      const auto found = monthly_global_mj_m2_d(back);
      const auto truth = monthly_global_mj_m2_d(lowland_truth());
      for (std::size_t month = 0; month < 12; ++month)
        EXPECT_NEAR(found[month], truth[month], 1e-4 * truth[month]);
      EXPECT_THAT(back.notes, testing::Contains(testing::HasSubstr("split into beam and sky by")));
    }
  }
}

// An hour of Erbs's split has Erbs's part of sky, whether the record has hours or ten minutes.
TEST(Series, ErbsIsAppliedToWholeHours) {
  for (const int step_min : {10, 60}) {
    const LoggerFormat format{.step_min = step_min, .columns = "g"};
    const TextFile file(logged(lowland_truth(), format));
    SeriesSource source = source_of(file, format);
    source.split = SeriesSource::Split::erbs;
    const LightSeries back = light_of(source, place_at(52.0, 15.0), 2025, kClock);
    int hours = 0;
    for (std::size_t begin = 0; begin < back.steps.size(); begin += 6) {
      double sky = 0.0, global = 0.0, above_air = 0.0;
      for (std::size_t i = begin; i < begin + 6; ++i) {
        sky += back.steps[i].sky_w;
        global += global_w(back.steps[i]);
        above_air += extraterrestrial_level_w_m2(back, i);
      }
      if (above_air < 6.0 * 50.0) continue;
      ASSERT_NEAR(sky / global, erbs_hourly_diffuse_part(global / above_air), 1e-5) << begin;
      ++hours;
    }
    EXPECT_GT(hours, 3000);
  }
}

TEST(Series, CoversSeveralYears) {
  const Place place = place_at(48.0, 9.0);
  std::string text;
  std::array<LightSeries, 3> truths;
  for (int k = 0; k < 3; ++k) {
    truths[std::size_t(k)] = cloudy_truth(place, 2023 + k, kClock, unsigned(k));
    std::string year = logged(truths[std::size_t(k)], {.columns = "gd"});
    text += k == 0 ? year : year.substr(year.find('\n') + 1);
  }
  const TextFile file(text);
  const LightSeries back = light_of(source_of(file, {.columns = "gd"}), place, 2025, kClock);
  EXPECT_EQ(back.first_year, std::chrono::year{2023});
  EXPECT_EQ(back.years, 3);
  EXPECT_EQ(back.steps.size(), (365U + 366U + 365U) * 144U);
  EXPECT_EQ(days_of_months(back)[1], 28 + 29 + 28);
  EXPECT_THAT(back.description, testing::HasSubstr("2023 to 2025"));
  expect_sound(back);
  const MonthlyLight found = monthly_dli(back);
  for (std::size_t month = 0; month < 12; ++month) {
    double truth = 0.0, days = 0.0;
    for (const LightSeries& year : truths) {
      truth += monthly_dli(year).total(month) * days_of_months(year)[month];
      days += days_of_months(year)[month];
    }
    EXPECT_NEAR(found.total(month), truth / days, 2e-3 * truth / days) << month;
  }
}

// Random places, steps and columns: always finite, closed, non-negative and no beam above the sun's.
TEST(Series, IsSoundWhateverTheRecord) {
  std::mt19937 random(11);  // NOLINT: the same records in every run
  const std::vector<std::string> columns{"g", "gd", "gb", "db", "gdb", "p"};
  for (int k = 0; k < 24; ++k) {
    const double latitude_deg = -65.0 + 130.0 * static_cast<double>(random() % 1000) / 1000.0;
    const int hour = static_cast<int>(random() % 23) - 11;
    char clock[8];
    std::snprintf(clock, sizeof clock, "%+03d:00", hour);
    const LoggerFormat format{.step_min = std::array{5, 10, 30, 60}[random() % 4],
                              .stamp = std::array{Stamp::begin, Stamp::middle, Stamp::end}[random() % 3],
                              .columns = columns[random() % columns.size()]};
    SCOPED_TRACE(std::to_string(latitude_deg) + clock + " " + format.columns +
                 std::to_string(format.step_min));
    const Place place = place_at(latitude_deg, 15.0 * hour, 100.0 * static_cast<double>(random() % 30));
    const LightSeries truth = cloudy_truth(place, 2025, clock, static_cast<unsigned>(k));
    const LightSeries back = run_back(truth, format, Unit::w_m2, clock);
    expect_sound(back);
    EXPECT_NEAR(year_dli(back), year_dli(truth), 0.01 * year_dli(truth));
  }
}

}  // namespace
}  // namespace sunfall

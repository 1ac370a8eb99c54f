// Gaps: counted by month, filled by the stated rule.

#include "light/gaps.h"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <limits>

#include "light/station.h"

namespace sunfall {
namespace {

constexpr float kUnknown = std::numeric_limits<float>::quiet_NaN();
const std::string kClock = "+01:00";

LightSeries open_years(std::chrono::year first, int years) {
  return open_series({place_at(45.0, 15.0), Clock::parse(kClock, "test"), {}, "test"}, first, years);
}

// Light of a given clearness for each day, half of it sky.
template <typename ClearnessOfDay>
StepLight steps_with(const LightSeries& series, const ClearnessOfDay& clearness) {
  StepLight steps;
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const bool lit = series.sun.mean_sine[i] > 0.0F;
    const double global = clearness(i / kStepsPerDay) * extraterrestrial_level_w_m2(series, i);
    steps.global.push_back(lit ? static_cast<float>(global) : kUnknown);
    steps.sky.push_back(lit ? static_cast<float>(0.5 * global) : kUnknown);
  }
  return steps;
}

void lose_days(StepLight& steps, std::size_t from, std::size_t to) {
  for (std::size_t i = from * kStepsPerDay; i < to * kStepsPerDay; ++i)
    steps.global[i] = steps.sky[i] = kUnknown;
}

double clearness_of_day(const StepLight& steps, const LightSeries& series, std::size_t day) {
  double global = 0.0, above_air = 0.0;
  for (std::size_t i = day * kStepsPerDay; i < (day + 1) * kStepsPerDay; ++i) {
    if (series.sun.mean_sine[i] <= 0.0F) continue;
    global += steps.global[i];
    above_air += extraterrestrial_level_w_m2(series, i);
  }
  return global / above_air;
}

TEST(Gaps, AreFilledWithTheMeanOfThreeDaysOnEachSide) {
  const LightSeries series = open_years(std::chrono::year{2025}, 1);
  // Days 97 to 99 have 0.2, 0.3, 0.4 and days 102 to 104 have 0.5, 0.6, 0.7: 0.45 in the mean of equal suns.
  const auto clearness = [](std::size_t day) {
    if (day >= 97 && day <= 99) return 0.1 * static_cast<double>(day - 95);
    return day >= 102 && day <= 104 ? 0.1 * static_cast<double>(day - 97) : 0.9;
  };
  StepLight steps = steps_with(series, clearness);
  lose_days(steps, 100, 102);
  ASSERT_TRUE(fill_gaps(steps, series));
  // The sun above the air grows by 0.7 % a day here, which shifts the weights of the mean by up to 2 %.
  EXPECT_NEAR(clearness_of_day(steps, series, 100), 0.45, 0.02 * 0.45);
  EXPECT_NEAR(clearness_of_day(steps, series, 101), 0.45, 0.02 * 0.45);
  EXPECT_NEAR(clearness_of_day(steps, series, 96), 0.9, 1e-6);
  for (std::size_t i = 100 * kStepsPerDay; i < 102 * kStepsPerDay; ++i) {
    if (series.sun.mean_sine[i] > 0.0F) {
      ASSERT_NEAR(steps.sky[i], 0.5 * steps.global[i], 1e-4);
    }
  }
}

TEST(Gaps, OfAMonthAreFilledFromOtherYears) {
  const LightSeries series = open_years(std::chrono::year{2023}, 3);
  StepLight steps = steps_with(series, [](std::size_t day) {
    return day < 365 ? 0.3 : day < 365 + 366 ? 0.5 : 0.7;
  });
  lose_days(steps, 365 + 100, 365 + 180);
  ASSERT_TRUE(fill_gaps(steps, series));
  EXPECT_NEAR(clearness_of_day(steps, series, 365 + 140), 0.7, 1e-6);  // the year after is looked at first
  // Days around come before years; a dawn that they lack is of another year, and hardly counts.
  EXPECT_NEAR(clearness_of_day(steps, series, 365 + 100), 0.5, 1e-4);
  lose_days(steps, 0, 3 * 365 + 1);
  EXPECT_FALSE(fill_gaps(steps, series));
}

// At 69 degrees north in February a day is 9 minutes longer than the one before: the first steps after a gap
// of a month at its end have never been lit before.
TEST(Gaps, OfADawnThatNoDayKnowsAreFilledFromTheDay) {
  const LightSeries series = open_series({place_at(69.0, 15.0), Clock::parse(kClock, "test"), {}, "test"},
                                         std::chrono::year{2025}, 1);
  StepLight steps = steps_with(series, [](std::size_t) { return 0.4; });
  lose_days(steps, 40, 57);
  ASSERT_TRUE(fill_gaps(steps, series));
  for (std::size_t i = 0; i < steps.global.size(); ++i) {
    if (series.sun.mean_sine[i] > 0.0F) {
      ASSERT_NEAR(steps.global[i], 0.4 * extraterrestrial_level_w_m2(series, i), 1e-3);
    }
  }
}

TEST(Gaps, AreCountedByMonthAndYear) {
  const LightSeries series = open_years(std::chrono::year{2023}, 2);
  StepLight steps = steps_with(series, [](std::size_t) { return 0.5; });
  EXPECT_EQ(gaps_text(count_gaps(steps, series)), "");
  lose_days(steps, 0, 31);
  lose_days(steps, 365 + 366 - 31, 365 + 366);
  const std::vector<MonthGaps> months = count_gaps(steps, series);
  ASSERT_EQ(months.size(), 24U);
  EXPECT_EQ(gaps_text(months), "2023: January 100.0 %; 2024: December 100.0 %");
  EXPECT_EQ(months[13].lit > months[1].lit, true);  // 29 February
}

// A whole record whose sensor was away for two days each month comes back within what days differ.
TEST(Gaps, LeaveTheMonthsMeanUnbiased) {
  const Place place = place_at(45.0, 15.0);
  double found = 0.0, expected = 0.0;
  for (unsigned seed = 0; seed < 4; ++seed) {
    const LightSeries truth = cloudy_truth(place, 2025, kClock, seed);
    const std::string text = logged(truth, {.columns = "gd"});
    std::string kept;
    for (std::size_t begin = 0; begin < text.size();) {
      const std::size_t end = text.find('\n', begin) + 1;
      const std::string day = text.substr(begin + 8, 2);
      if (!(day == "10" || day == "11")) kept += text.substr(begin, end - begin);
      begin = end;
    }
    const TextFile file(kept);
    const LightSeries back = light_of(source_of(file, {.columns = "gd"}), place, 2025, kClock);
    expect_sound(back);
    EXPECT_THAT(back.notes, testing::Contains(testing::HasSubstr("2025: January 6.")));
    for (std::size_t month = 0; month < 12; ++month) {
      found += monthly_dli(back).total(month);
      expected += monthly_dli(truth).total(month);
    }
  }
  // 96 filled days of 1461, whose light differs from their neighbours' by a third or so, at random:
  // 0.33 √96 / 1461 = 0.2 %; three times that.
  EXPECT_NEAR(found, expected, 0.006 * expected);
}

}  // namespace
}  // namespace sunfall

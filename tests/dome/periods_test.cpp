// Periods of the year: months, and seasons over New Year.

#include <gtest/gtest.h>

#include <cmath>

#include "light/series_checks.h"
#include "sunfall/dome.h"

namespace sunfall {
namespace {

using std::chrono::day, std::chrono::month, std::chrono::month_day;

month_day on(unsigned month_number, unsigned day_number) { return month{month_number} / day{day_number}; }

const MonthlyGlobalSource kLowland{{2.2, 4.1, 8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 1.8}};
const Dome kDome = Dome::of(DomeQuality::draft);

DomeLight light_in(int year, const std::vector<Period>& periods) {
  return make_dome_light(light_of(kLowland, place_at(52.0), year), kDome, SkyModel::isotropic, periods);
}

TEST(Periods, MonthsCoverEveryDayOnce) {
  const std::vector<Period> months = month_periods();
  ASSERT_EQ(months.size(), 12U);
  EXPECT_EQ(months.front().name, "01");
  EXPECT_EQ(months.back().name, "12");
  for (unsigned m = 1; m <= 12; ++m) {
    EXPECT_EQ(months[m - 1].from, on(m, 1));
    EXPECT_EQ(months[m - 1].to.month(), month{m});
  }
  EXPECT_EQ(months[1].to, on(2, 29));  // the leap day is February's
}

// A season's mean day is the mean of its months' days, each month counted by its days.
void expect_mean_of_months(int year, const Period& season, const std::vector<int>& months) {
  std::vector<Period> periods = month_periods();
  periods.push_back(season);
  const DomeLight light = light_in(year, periods);
  const auto days = days_of_months(light_of(kLowland, place_at(52.0), year));
  double beam = 0.0, sky = 0.0, all = 0.0;
  for (const int m : months) {
    beam += light.beam.open[m - 1] * days[m - 1];
    sky += light.sky.open[m - 1] * days[m - 1];
    all += days[m - 1];
  }
  EXPECT_NEAR(light.beam.open[12], beam / all, 1e-9 * beam);
  EXPECT_NEAR(light.sky.open[12], sky / all, 1e-7 * sky);
}

TEST(Periods, SeasonsAreTheirMonths) {
  expect_mean_of_months(2025, {"growing", on(4, 1), on(9, 30)}, {4, 5, 6, 7, 8, 9});
  expect_mean_of_months(2025, {"year", on(1, 1), on(12, 31)}, {1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12});
}

TEST(Periods, SeasonsRunOverNewYear) {
  expect_mean_of_months(2025, {"winter", on(11, 1), on(2, 29)}, {11, 12, 1, 2});
  expect_mean_of_months(2024, {"winter", on(11, 1), on(2, 29)}, {11, 12, 1, 2});
}

TEST(Periods, OneDayIsAPeriod) {
  const LightSeries series = light_of(kLowland, place_at(52.0), 2025);
  const DomeLight light = light_in(2025, {{"midsummer", on(6, 21), on(6, 21)}});
  const std::size_t first = (31 + 28 + 31 + 30 + 31 + 20) * 144;
  double umol = 0.0;
  for (std::size_t i = first; i < first + 144; ++i) umol += global_umol(series.steps[i]);
  EXPECT_NEAR(light.beam.open[0] + light.sky.open[0], umol * 600e-6, 1e-6 * umol * 600e-6);
}

// A period without days in this series (the leap day of a common year) is dark and finite.
TEST(Periods, AbsentDayIsDark) {
  const DomeLight light = light_in(2025, {{"leap day", on(2, 29), on(2, 29)}});
  EXPECT_EQ(light.beam.open[0] + light.sky.open[0], 0.0);
  for (const double value : light.sky.level) ASSERT_EQ(value, 0.0);
  EXPECT_GT(light_in(2024, {{"leap day", on(2, 29), on(2, 29)}}).sky.open[0], 0.0);
}

}  // namespace
}  // namespace sunfall

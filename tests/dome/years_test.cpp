// A series of several years: its periods are means over all days of all years.

#include <gtest/gtest.h>

#include "light/station.h"
#include "sunfall/dome.h"

namespace sunfall {
namespace {

TEST(DomeYears, AreMeansOverAllDays) {
  const Place place = place_at(47.0, 8.0);
  std::string text = logged(cloudy_truth(place, 2023, "+01:00", 1), {.columns = "gd"});
  const std::string second = logged(cloudy_truth(place, 2024, "+01:00", 2), {.columns = "gd"});
  text += second.substr(second.find('\n') + 1);
  const TextFile file(text);
  const LightSeries series = light_of(source_of(file, {.columns = "gd"}), place, 2025, "+01:00");
  ASSERT_EQ(series.years, 2);

  std::vector<Period> periods = month_periods();
  periods.push_back({"leap-day", std::chrono::February / 29, std::chrono::February / 29});
  const DomeLight light = make_dome_light(series, Dome::of(DomeQuality::draft), SkyModel::clearness, periods);
  const MonthlyLight expected = monthly_dli(series);
  for (std::size_t month = 0; month < 12; ++month) {
    EXPECT_NEAR(light.beam.open[month], expected.beam[month], 1e-6 * expected.beam[month]);
    EXPECT_NEAR(light.sky.open[month], expected.sky[month], 1e-6 * expected.sky[month]);
  }
  double leap_day = 0.0;  // the only 29 February, day 60 of the second year
  for (std::size_t i = (365 + 59) * 144; i < (365 + 60) * 144; ++i)
    leap_day += 6e-4 * series.steps[i].beam_umol;
  EXPECT_NEAR(light.beam.open[12], leap_day, 1e-6 * leap_day);
}

}  // namespace
}  // namespace sunfall

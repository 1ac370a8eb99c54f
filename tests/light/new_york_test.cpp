// A real record under the clear sky: New York, May to September 1973 (tests/data/new-york-1973/README.md says
// whose it is and how it is read).

#include <gtest/gtest.h>

#include <fstream>
#include <sstream>

#include "light/series_checks.h"

namespace sunfall {
namespace {

constexpr double kJoulesPerLangley = 41840.0;  // m-2; one thermochemical calorie per cm2
// What of the record's band, 400 to 770 nm, is 400 to 700: 530.0 and 621.6 W m-2 above the air, by the
// ASTM E490 spectrum (integrals computed elsewhere, not in this test).
constexpr double kPartBelow700 = 530.0 / 621.6;
constexpr double kPhotonsPerJoule_umol = 4.57;  // daylight of 400 to 700 nm; McCree 1972, from memory

struct MeasuredDay {
  std::chrono::year_month_day date;
  double dli = 0.0;
};

std::vector<MeasuredDay> measured() {
  std::ifstream in(SUNFALL_TEST_DATA "/new-york-1973/solar.csv");
  std::vector<MeasuredDay> days;
  std::string line;
  std::getline(in, line);
  while (std::getline(in, line)) {
    int year = 0, month = 0, day = 0;
    double langleys = 0.0;
    if (std::sscanf(line.c_str(), "%d-%d-%d,%lf", &year, &month, &day, &langleys) < 4) continue;
    days.push_back({std::chrono::year{year} / month / day,
                    langleys * kJoulesPerLangley * kPartBelow700 * kPhotonsPerJoule_umol * 1e-6});
  }
  return days;
}

// A real day may not lie above the cloudless sky by more than a good pyranometer of that time could err
// (10 %), and the brightest day of each month must come near it: a ceiling far too high would be none.
TEST(NewYork1973, LiesUnderTheClearSky) {
  const std::vector<MeasuredDay> days = measured();
  ASSERT_EQ(days.size(), 146U);
  const LightSeries clear = light_of(ClearSource{}, place_at(40.78, -73.97, 40.0), 1973, "-05:00");
  std::array<double, 12> brightest{};
  for (const MeasuredDay& day : days) {
    const auto number =
        (std::chrono::sys_days{day.date} - std::chrono::sys_days{std::chrono::year{1973} / 1 / 1}).count();
    double ceiling = 0.0;
    for (std::size_t i = 0; i < kStepsPerDay; ++i)
      ceiling += 6e-4 * global_umol(clear.steps[static_cast<std::size_t>(number) * kStepsPerDay + i]);
    EXPECT_LE(day.dli, 1.10 * ceiling) << unsigned(day.date.month()) << "-" << unsigned(day.date.day());
    double& most = brightest[unsigned(day.date.month()) - 1];
    most = std::max(most, day.dli / ceiling);
  }
  for (std::size_t month = 4; month < 9; ++month) EXPECT_GE(brightest[month], 0.80) << month + 1;
}

}  // namespace
}  // namespace sunfall

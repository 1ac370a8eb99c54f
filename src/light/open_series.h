#pragma once
// What every light source shares: an empty series on the sun's track, and the photons at its end.

#include <array>
#include <string>
#include <vector>

#include "core/month_names.h"
#include "sunfall/light.h"

namespace sunfall {

struct LightRequest {
  Place place;
  Clock clock;
  LightOptions options;
  std::string where;  // the source's place in the plan, for errors
};

inline constexpr std::size_t kStepsPerDay = 144;
inline constexpr double kMegajoulePerWattStep = 600.0 * 1e-6;  // MJ m-2 of 1 W m-2 over one step

// A series of one calendar year with the sun's track and dark steps. Throws Error(plan) for a year
// outside 1950 to 2100, where the sun's position is good.
LightSeries open_series(const LightRequest& request);
// The same over several calendar years.
LightSeries open_series(const LightRequest& request, std::chrono::year first_year, int years);

// "2025" or "2019 to 2024".
std::string years_text(const LightSeries& series);

// Months (0-11) of the series' days.
std::vector<int> months_of_days(const LightSeries& series);

// Extraterrestrial radiation on a level plane over the step, W m-2.
inline double extraterrestrial_level_w_m2(const LightSeries& series, std::size_t step) {
  return static_cast<double>(series.sun.mean_sine[step]) * series.sun.normal_w_m2[step];
}

// Mean of the given power (W m-2, one value a step) per day, by month, MJ m-2 d-1.
template <typename PowerOfStep>
std::array<double, 12> monthly_mean_mj_m2_d(const LightSeries& series, const PowerOfStep& power_w_m2) {
  std::array<double, 12> sum_mj_m2{};
  const std::vector<int> months = months_of_days(series);
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    sum_mj_m2[static_cast<std::size_t>(months[i / kStepsPerDay])] += power_w_m2(i) * kMegajoulePerWattStep;
  }
  const std::array<int, 12> days = days_of_months(series);
  for (std::size_t month = 0; month < 12; ++month) sum_mj_m2[month] /= days[month];
  return sum_mj_m2;
}

// Fills the photons of every step from its watts, and notes the year's factor.
void add_photons(LightSeries& series);

}  // namespace sunfall

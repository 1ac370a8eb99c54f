// What falls on the open field in each year of a series, by period.

#include <limits>

#include "sunfall/dome.h"

namespace sunfall {
namespace {

struct DaySum {
  double beam_mol = 0.0;
  double sky_mol = 0.0;
};

DaySum sum_of_day(const LightSeries& series, std::size_t first_step, std::size_t steps) {
  const double mol_per_umol_s = 1e-6 * static_cast<double>(series.sun.step.count());
  DaySum sum;
  for (std::size_t i = first_step; i < first_step + steps; ++i) {
    sum.beam_mol += series.steps[i].beam_umol * mol_per_umol_s;
    sum.sky_mol += series.steps[i].sky_umol * mol_per_umol_s;
  }
  return sum;
}

void add_day(OpenYear& year, const std::vector<Period>& periods, std::chrono::month_day day,
             const DaySum& sum) {
  for (std::size_t p = 0; p < periods.size(); ++p) {
    if (!holds(periods[p], day)) continue;
    year.beam[p] += sum.beam_mol;
    year.sky[p] += sum.sky_mol;
    ++year.days[p];
  }
}

void take_means(OpenYear& year) {
  constexpr double kNoDay = std::numeric_limits<double>::quiet_NaN();
  for (std::size_t p = 0; p < year.days.size(); ++p) {
    year.beam[p] = year.days[p] > 0 ? year.beam[p] / year.days[p] : kNoDay;
    year.sky[p] = year.days[p] > 0 ? year.sky[p] / year.days[p] : kNoDay;
  }
}

}  // namespace

std::vector<OpenYear> open_years(const LightSeries& series, const std::vector<Period>& periods) {
  const auto steps_per_day = static_cast<std::size_t>(std::chrono::days{1} / series.sun.step);
  std::chrono::sys_days day{series.first_year / std::chrono::January / 1};
  std::vector<OpenYear> years;
  for (std::size_t step = 0; step + steps_per_day <= series.steps.size(); step += steps_per_day) {
    const std::chrono::year_month_day date{day};
    if (years.empty() || years.back().year != int{date.year()}) {
      years.push_back({int{date.year()}, std::vector<double>(periods.size(), 0.0),
                       std::vector<double>(periods.size(), 0.0), std::vector<int>(periods.size(), 0)});
    }
    add_day(years.back(), periods, date.month() / date.day(), sum_of_day(series, step, steps_per_day));
    day += std::chrono::days{1};
  }
  for (OpenYear& year : years) {
    take_means(year);
    year.made = series.made_years;
  }
  return years;
}

}  // namespace sunfall

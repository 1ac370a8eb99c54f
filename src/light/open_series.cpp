#include "light/open_series.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "core/parallel.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr std::chrono::year kFirstYear{1950};
constexpr std::chrono::year kLastYear{2100};

std::chrono::sys_days first_day(const LightSeries& series) {
  return std::chrono::sys_days{series.first_year / std::chrono::January / 1};
}

}  // namespace

LightSeries open_series(const LightRequest& request) {
  return open_series(request, std::chrono::year{request.options.year}, 1);
}

LightSeries open_series(const LightRequest& request, std::chrono::year first_year, int years) {
  LightSeries series;
  series.place = request.place;
  series.first_year = first_year;
  series.years = years;
  const std::chrono::year end = first_year + std::chrono::years{years};
  if (first_year < kFirstYear || end > kLastYear + std::chrono::years{1}) {
    const int wrong = first_year < kFirstYear ? int{first_year} : int{end} - 1;
    throw Error(ErrorKind::plan, {.what = "the sun is not known well enough in that year",
                                  .where = request.where,
                                  .found = fmt::format("{}", wrong),
                                  .remedy = "give a year from 1950 to 2100"});
  }
  series.utc_offset = request.clock.standard_offset(first_year);
  const auto days = static_cast<std::size_t>(
      (std::chrono::sys_days{end / std::chrono::January / 1} - first_day(series)).count());
  const UtcTime begin = first_day(series) - series.utc_offset;
  series.sun = sun_track(begin, kLightStep, days * kStepsPerDay, request.place);
  series.steps.resize(series.sun.size());
  return series;
}

std::string years_text(const LightSeries& series) {
  const int last = int{series.first_year} + series.years - 1;
  return series.years == 1 ? fmt::format("{}", last) : fmt::format("{} to {}", int{series.first_year}, last);
}

std::vector<int> months_of_days(const LightSeries& series) {
  std::vector<int> months(series.steps.size() / kStepsPerDay);
  for (std::size_t day = 0; day < months.size(); ++day) {
    const Date date{first_day(series) + std::chrono::days{day}};
    months[day] = static_cast<int>(static_cast<unsigned>(date.month())) - 1;
  }
  return months;
}

int month_of_step(const LightSeries& series, std::size_t step) {
  const Date date{first_day(series) + std::chrono::days{step / kStepsPerDay}};
  return static_cast<int>(static_cast<unsigned>(date.month())) - 1;
}

std::array<int, 12> days_of_months(const LightSeries& series) {
  std::array<int, 12> days{};
  for (const int month : months_of_days(series)) ++days[static_cast<std::size_t>(month)];
  return days;
}

namespace {

void fill_photons(LightSeries& series, std::size_t i) {
  LightStep& step = series.steps[i];
  if (step.beam_w + step.sky_w <= 0.0F) {
    step.beam_umol = step.sky_umol = 0.0F;
    return;
  }
  const Angle elevation = Angle::radians(std::asin(std::clamp<double>(series.sun.mean_sine[i], 0.0, 1.0)));
  const PhotonSplit split =
      photons(step.beam_w, step.sky_w, extraterrestrial_level_w_m2(series, i), elevation);
  step.beam_umol = static_cast<float>(split.beam_umol);
  step.sky_umol = static_cast<float>(split.sky_umol);
}

}  // namespace

void add_photons(LightSeries& series) {
  on_all_cores(0, series.steps.size() / kStepsPerDay, [&](std::size_t day) {
    for (std::size_t i = day * kStepsPerDay; i < (day + 1) * kStepsPerDay; ++i) fill_photons(series, i);
  });
  // In the order of the steps, whatever the number of cores.
  double sum_umol = 0.0;
  double sum_w = 0.0;
  for (const LightStep& step : series.steps) {
    sum_umol += static_cast<double>(step.beam_umol) + step.sky_umol;
    sum_w += static_cast<double>(step.beam_w) + step.sky_w;
  }
  if (sum_w > 0.0) {
    series.notes.push_back(
        fmt::format("photons 400-700 nm: {:.3f} µmol per J of global radiation over the year, from 1.971 "
                    "(clear) to 2.099 (overcast) after Jacovides and others (2007)",
                    sum_umol / sum_w));
  }
}

}  // namespace sunfall

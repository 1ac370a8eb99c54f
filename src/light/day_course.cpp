#include "light/day_course.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>
#include <numeric>

#include "light/daily_ratios.h"
#include "light/open_series.h"
#include "light/sky_split.h"

namespace sunfall {
namespace {

// The sun of one step in the frame of the equator: hour angle and declination.
struct StepSun {
  Angle hour_angle;
  Angle declination;
};

StepSun sun_of_step(const LightSeries& series, std::size_t step) {
  const SkyDirection& left = series.sun.edges[step];
  const SkyDirection& right = series.sun.edges[step + 1];
  const double east = 0.5 * (left.east + right.east);
  const double north = 0.5 * (left.north + right.north);
  const double up = 0.5 * (left.up + right.up);
  const Angle latitude = series.place.latitude;
  return {Angle::radians(std::atan2(-east, up * cos(latitude) - north * sin(latitude))),
          Angle::radians(std::asin(std::clamp(up * sin(latitude) + north * cos(latitude), -1.0, 1.0)))};
}

using DayWeights = std::array<double, kStepsPerDay>;

DayWeights global_weights(const LightSeries& series, std::size_t day) {
  const Angle sunset = sunset_of_day(series, day);
  DayWeights weights{};
  for (std::size_t k = 0; k < kStepsPerDay; ++k) {
    const std::size_t i = day * kStepsPerDay + k;
    const double mean_sine = series.sun.mean_sine[i];
    if (mean_sine <= 0.0) continue;
    weights[k] = mean_sine * collares_pereira_rabl(sun_of_step(series, i).hour_angle, sunset);
  }
  return weights;
}

}  // namespace

StepLight unknown_steps(const LightSeries& series) {
  const std::vector<float> unknown(series.steps.size(), std::numeric_limits<float>::quiet_NaN());
  return {unknown, unknown};
}

Angle declination_of_day(const LightSeries& series, std::size_t day) {
  const auto first = series.sun.mean_sine.begin() + static_cast<std::ptrdiff_t>(day * kStepsPerDay);
  const auto highest = std::max_element(first, first + kStepsPerDay);
  const auto step = static_cast<std::size_t>(highest - series.sun.mean_sine.begin());
  return sun_of_step(series, step).declination;
}

Angle sunset_of_day(const LightSeries& series, std::size_t day) {
  return sunset_hour_angle(series.place.latitude, declination_of_day(series, day));
}

double above_air_of_day(const LightSeries& series, std::size_t day) {
  double sum = 0.0;
  for (std::size_t i = day * kStepsPerDay; i < (day + 1) * kStepsPerDay; ++i) {
    sum += extraterrestrial_level_w_m2(series, i);
  }
  return sum;
}

double global_of_day(const StepLight& steps, std::size_t day) {
  double sum = 0.0;
  for (std::size_t i = day * kStepsPerDay; i < (day + 1) * kStepsPerDay; ++i) {
    if (!std::isnan(steps.global[i])) sum += steps.global[i];
  }
  return sum;
}

void lay_global(StepLight& steps, const LightSeries& series, std::size_t day, double global) {
  const DayWeights weights = global_weights(series, day);
  const double weight_sum = std::accumulate(weights.begin(), weights.end(), 0.0);
  if (weight_sum <= 0.0) return;
  for (std::size_t k = 0; k < kStepsPerDay; ++k) {
    const std::size_t i = day * kStepsPerDay + k;
    if (series.sun.mean_sine[i] <= 0.0F) continue;
    steps.global[i] = static_cast<float>(global * weights[k] / weight_sum);
  }
}

void lay_sky(StepLight& steps, const LightSeries& series, std::size_t day, double sky) {
  std::array<StepShare, kStepsPerDay> shares;
  for (std::size_t k = 0; k < kStepsPerDay; ++k) {
    const std::size_t i = day * kStepsPerDay + k;
    const double global = std::isnan(steps.global[i]) ? 0.0 : steps.global[i];
    const double least = std::max(0.0, global - extraterrestrial_level_w_m2(series, i));
    shares[k] = {series.sun.mean_sine[i], least, global};
  }
  const std::vector<double> parts = spread_sky(shares, sky);
  for (std::size_t k = 0; k < kStepsPerDay; ++k) {
    const std::size_t i = day * kStepsPerDay + k;
    if (!std::isnan(steps.global[i])) steps.sky[i] = static_cast<float>(parts[k]);
  }
}

}  // namespace sunfall

#include "light/series_steps.h"

#include <algorithm>
#include <cmath>
#include <limits>

#include "light/open_series.h"

namespace sunfall {
namespace {

constexpr float kUnknown = std::numeric_limits<float>::quiet_NaN();

}  // namespace

std::optional<IntervalLight> light_of_interval(const Readings& readings, std::size_t i,
                                               const IntervalSun& sun, double flux) {
  const auto value = [&](std::size_t quantity) -> std::optional<double> {
    if (!readings.has(quantity) || std::isnan(readings.value[quantity][i])) return std::nullopt;
    return std::max(0.0, readings.value[quantity][i] * flux);
  };
  const auto global = value(kGlobal);
  const auto diffuse = value(kDiffuse);
  const auto beam = value(kBeam);
  IntervalLight light;
  if (diffuse && beam) {
    light = {*diffuse + *beam * sun.beam_sine, *diffuse};
  } else if (global && diffuse) {
    light = {*global, std::min(*diffuse, *global)};
  } else if (global && beam) {
    light = {*global, std::max(0.0, *global - *beam * sun.beam_sine)};
  } else if (global) {
    light.global = *global;
  } else {
    return std::nullopt;
  }
  return light;
}

namespace {

// Sums over a step while intervals come in.
struct StepSums {
  float seconds = 0.0F;
  float global = 0.0F;  // times seconds
  float sky_seconds = 0.0F;
  float sky = 0.0F;
};

}  // namespace

StepLight steps_of(const Readings& readings, const std::vector<IntervalSun>& suns, const LightSeries& series,
                   double flux) {
  std::vector<StepSums> sums(series.steps.size());
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (!(suns[i].level_w > 0.0F)) continue;
    const auto light = light_of_interval(readings, i, suns[i], flux);
    if (!light) continue;
    const auto add = [&](std::size_t step, double seconds) {
      const double part = seconds * extraterrestrial_level_w_m2(series, step) / suns[i].level_w;
      sums[step].seconds += static_cast<float>(seconds);
      sums[step].global += static_cast<float>(part * light->global);
      if (!light->sky) return;
      sums[step].sky_seconds += static_cast<float>(seconds);
      sums[step].sky += static_cast<float>(part * *light->sky);
    };
    for_each_overlap(series, readings.begin_s[i], readings.step.count(), add);
  }
  const auto half_s = static_cast<float>(kLightStep.count()) / 2.0F;
  StepLight steps{std::vector<float>(sums.size(), kUnknown), std::vector<float>(sums.size(), kUnknown)};
  for (std::size_t i = 0; i < sums.size(); ++i) {
    if (series.sun.mean_sine[i] <= 0.0F || sums[i].seconds < half_s) continue;
    steps.global[i] = sums[i].global / sums[i].seconds;
    // A step of which some readings lack the sky is split as a whole.
    if (sums[i].sky_seconds == sums[i].seconds)
      steps.sky[i] = std::min(sums[i].sky / sums[i].seconds, steps.global[i]);
  }
  return steps;
}

void write_steps(const StepLight& steps, LightSeries& series) {
  for (std::size_t i = 0; i < steps.global.size(); ++i) {
    if (std::isnan(steps.global[i])) continue;
    const auto most_w = static_cast<float>(extraterrestrial_level_w_m2(series, i));
    series.steps[i].beam_w = std::clamp(steps.global[i] - steps.sky[i], 0.0F, most_w);
    series.steps[i].sky_w = steps.global[i] - series.steps[i].beam_w;
  }
}

}  // namespace sunfall

#include "light/interval_sun.h"

#include <array>

#include "light/clear.h"
#include "light/open_series.h"

namespace sunfall {

namespace {

constexpr double kUsualTurbidity = 3.0;

// Only a record with beam needs the cloudless sky.
std::vector<LightStep> clear_steps(const Readings& readings, const LightSeries& series) {
  if (!readings.has(kBeam)) return {};
  LightSeries clear = series;
  std::array<double, 12> turbidity{};
  turbidity.fill(kUsualTurbidity);
  fill_clear_sky(clear, turbidity);
  return clear.steps;
}

}  // namespace

std::vector<IntervalSun> suns_of(const Readings& readings, const LightSeries& series) {
  const std::vector<LightStep> clear = clear_steps(readings, series);
  std::vector<IntervalSun> suns(readings.size());
  const auto length_s = static_cast<double>(readings.step.count());
  for (std::size_t i = 0; i < readings.size(); ++i) {
    double sine_s = 0.0;
    double level_j = 0.0;
    double beam_level_j = 0.0;
    double beam_normal_j = 0.0;
    const auto add = [&](std::size_t step, double seconds) {
      const double sine = series.sun.mean_sine[step];
      sine_s += seconds * sine;
      level_j += seconds * extraterrestrial_level_w_m2(series, step);
      if (clear.empty() || sine <= 0.0) return;
      beam_level_j += seconds * clear[step].beam_w;
      beam_normal_j += seconds * clear[step].beam_w / sine;
    };
    for_each_overlap(series, readings.begin_s[i], readings.step.count(), add);
    suns[i].sine = static_cast<float>(sine_s / length_s);
    suns[i].level_w = static_cast<float>(level_j / length_s);
    suns[i].beam_sine = beam_normal_j > 0.0 ? static_cast<float>(beam_level_j / beam_normal_j) : suns[i].sine;
  }
  return suns;
}

}  // namespace sunfall

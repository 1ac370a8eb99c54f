// Gathers a light series on the dome: beam along the sun's path, sky by its radiance.

#include <algorithm>
#include <cmath>
#include <map>

#include "core/parallel.h"
#include "dome/gather_light.h"
#include "sunfall/dome.h"

namespace sunfall {
namespace {

using std::chrono::month_day;

// Sets of periods and the days of the series that lie in just these, in order.
using DaysOfPeriods = std::map<std::vector<std::size_t>, std::vector<std::size_t>>;

month_day day_of_series(const LightSeries& series, std::size_t day) {
  const auto local = series.sun.begin + std::chrono::days{day} + series.utc_offset;
  const std::chrono::year_month_day date{std::chrono::floor<std::chrono::days>(local)};
  return date.month() / date.day();
}

DaysOfPeriods days_of_periods(const LightSeries& series, const std::vector<Period>& periods) {
  DaysOfPeriods days;
  const std::size_t count = series.steps.size() * static_cast<std::size_t>(series.sun.step.count()) / 86400;
  for (std::size_t day = 0; day < count; ++day) {
    std::vector<std::size_t> in;
    for (std::size_t p = 0; p < periods.size(); ++p) {
      if (holds(periods[p], day_of_series(series, day))) in.push_back(p);
    }
    if (!in.empty()) days[in].push_back(day);
  }
  return days;
}

// One part of the light of some days, given to each period that they lie in.
void give(const GatheredLight& gathered, const std::vector<std::size_t>& periods, DomeLight& light,
          std::vector<std::vector<double>>& sky) {
  const std::size_t stride = light.periods.size();
  for (const std::size_t p : periods) {
    for (std::size_t i = 0; i < gathered.beam_level.size(); ++i) {
      light.beam.level[i * stride + p] += gathered.beam_level[i];
      light.beam.facing[i * stride + p] += gathered.beam_facing[i];
    }
    for (std::size_t k = 0; k < gathered.sky.size(); ++k) sky[p][k] += gathered.sky[k];
  }
}

// Spreads a band's light over the sector's lines and the band's steps, radiance even within the
// band: a step's level light is then proportional to its middle sine.
void spread_sky(const std::vector<std::vector<double>>& sums, DomeLight& light) {
  const Dome& dome = light.dome;
  const std::size_t periods = light.periods.size();
  for (int line = 0; line < dome.lines(); ++line) {
    const int sector = line / dome.lines_per_sector;
    for (int step = 0; step < dome.steps(); ++step) {
      const int band = step / dome.steps_per_band;
      const double sine = (step + 0.5) / dome.steps();
      const double band_sine = (band + 0.5) / dome.bands;
      const double part = sine / band_sine / (dome.lines_per_sector * dome.steps_per_band);
      const double facing = std::sqrt(1.0 - sine * sine) / sine;
      for (std::size_t p = 0; p < periods; ++p) {
        const double level = sums[p][static_cast<std::size_t>(sector) * dome.bands + band] * part;
        light.sky.level[light.index(line, step, p)] = level;
        light.sky.facing[light.index(line, step, p)] = level * facing;
      }
    }
  }
}

// From sums over all days to the mean day of each period.
void scale_to_days(DomeLight::Part& part, const std::vector<int>& days, int lines_and_steps) {
  const std::size_t periods = days.size();
  part.open.assign(periods, 0.0);
  for (std::size_t i = 0; i < static_cast<std::size_t>(lines_and_steps); ++i) {
    for (std::size_t p = 0; p < periods; ++p) {
      const double scale = days[p] > 0 ? 1.0 / days[p] : 0.0;
      part.level[i * periods + p] *= scale;
      part.facing[i * periods + p] *= scale;
      part.open[p] += part.level[i * periods + p];
    }
  }
}

}  // namespace

DomeLight make_dome_light(const LightSeries& series, const Dome& dome, SkyModel sky,
                          const std::vector<Period>& periods) {
  // Days are gathered by the set of periods that they lie in, a few sets at a time: each set on one core in
  // the order of its days, and the sets added up in their own order, so that the number of cores changes no
  // bit.
  constexpr std::size_t kSetsAtOnce = 16;
  DomeLight light;
  light.dome = dome;
  light.periods = periods;
  light.years = open_years(series, periods);
  const std::size_t size = static_cast<std::size_t>(dome.lines()) * dome.steps() * periods.size();
  for (DomeLight::Part* part : {&light.beam, &light.sky}) {
    part->level.assign(size, 0.0);
    part->facing.assign(size, 0.0);
  }
  std::vector<std::vector<double>> sums(
      periods.size(), std::vector<double>(static_cast<std::size_t>(dome.sectors) * dome.bands));
  std::vector<int> days(periods.size(), 0);
  const DaysOfPeriods sets = days_of_periods(series, periods);
  const std::vector<DaysOfPeriods::value_type> list(sets.begin(), sets.end());
  const SkyMethod method = method_for(series, dome, sky);
  for (std::size_t first = 0; first < list.size(); first += kSetsAtOnce) {
    std::vector<GatheredLight> gathered(std::min(kSetsAtOnce, list.size() - first));
    on_all_cores(0, gathered.size(), [&](std::size_t k) {
      gathered[k] = gather_light(series, list[first + k].second, dome, sky, method);
    });
    for (std::size_t k = 0; k < gathered.size(); ++k) {
      const auto& [in, days_in] = list[first + k];
      give(gathered[k], in, light, sums);
      for (const std::size_t p : in) days[p] += static_cast<int>(days_in.size());
    }
  }
  spread_sky(sums, light);
  scale_to_days(light.beam, days, dome.lines() * dome.steps());
  scale_to_days(light.sky, days, dome.lines() * dome.steps());
  return light;
}

}  // namespace sunfall

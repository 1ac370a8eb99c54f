// Gathers a light series on the dome: beam along the sun's path, sky by its radiance.

#include <algorithm>
#include <cmath>

#include "core/clones.h"
#include "dome/sky_patch.h"
#include "sunfall/dome.h"

namespace sunfall {
namespace {

using std::chrono::month_day;

// For every calendar day of the year, the periods that hold it.
class PeriodsOfDay {
 public:
  explicit PeriodsOfDay(const std::vector<Period>& periods) : periods_(periods) {}

  const std::vector<std::size_t>& of(month_day day) {
    if (day == day_) return found_;
    day_ = day;
    found_.clear();
    for (std::size_t p = 0; p < periods_.size(); ++p) {
      if (holds(periods_[p], day)) found_.push_back(p);
    }
    return found_;
  }

 private:
  const std::vector<Period>& periods_;
  month_day day_{};
  std::vector<std::size_t> found_;
};

month_day day_of_step(const LightSeries& series, std::size_t step) {
  const auto local = series.sun.begin + series.sun.step * step + series.utc_offset;
  const std::chrono::year_month_day date{std::chrono::floor<std::chrono::days>(local)};
  return date.month() / date.day();
}

// Adds light at a direction, shared bilinearly among the lines and steps around it.
class BeamBins {
 public:
  BeamBins(DomeLight& light) : light_(light), lines_(light.dome.lines()), steps_(light.dome.steps()) {}

  void add(const SkyDirection& direction, double level, const std::vector<std::size_t>& periods) {
    const double sine = std::clamp(direction.up, 0.0, 1.0);
    const double turn = std::atan2(direction.east, direction.north) / (2.0 * std::numbers::pi);
    const double line = turn * lines_ - 0.5;
    const double step = std::clamp(sine * steps_ - 0.5, 0.0, steps_ - 1.0);
    const double line_floor = std::floor(line);
    const int step0 = std::min(static_cast<int>(step), steps_ - 1);
    const int step1 = std::min(step0 + 1, steps_ - 1);
    const int line0 = wrapped_line(static_cast<int>(line_floor));
    const int line1 = wrapped_line(static_cast<int>(line_floor) + 1);
    const double across = line - line_floor, up = step - step0;
    // On a plane that faces the direction's azimuth light counts by its cosine of elevation.
    const double facing = level * std::sqrt(1.0 - sine * sine) / std::max(sine, 0.25 / steps_);
    for (const std::size_t p : periods) {
      put(line0, step0, p, level, facing, (1 - across) * (1 - up));
      put(line1, step0, p, level, facing, across * (1 - up));
      put(line0, step1, p, level, facing, (1 - across) * up);
      put(line1, step1, p, level, facing, across * up);
    }
  }

 private:
  int wrapped_line(int line) const { return (line % lines_ + lines_) % lines_; }
  void put(int line, int step, std::size_t period, double level, double facing, double weight) {
    const std::size_t at = light_.index(line, step, period);
    light_.beam.level[at] += level * weight;
    light_.beam.facing[at] += facing * weight;
  }

  DomeLight& light_;
  int lines_;
  int steps_;
};

// The sun moves a few degrees within a step; its light is laid along the path in this many pieces,
// so that lines between two steps of the clock are not left empty.
constexpr int kPieces = 12;

void add_beam(const LightSeries& series, std::size_t i, double mol, BeamBins& bins,
              const std::vector<std::size_t>& periods) {
  const SkyDirection& from = series.sun.edges[i];
  const SkyDirection& to = series.sun.edges[i + 1];
  SkyDirection pieces[kPieces];
  double weight[kPieces], sum = 0.0;
  for (int k = 0; k < kPieces; ++k) {
    const double t = (k + 0.5) / kPieces;
    SkyDirection& d = pieces[k];
    d = {from.east + t * (to.east - from.east), from.north + t * (to.north - from.north),
         from.up + t * (to.up - from.up)};
    const double length = std::sqrt(d.east * d.east + d.north * d.north + d.up * d.up);
    d = {d.east / length, d.north / length, d.up / length};
    weight[k] = std::max(d.up, 0.0);
    sum += weight[k];
  }
  for (int k = 0; k < kPieces; ++k) {
    // A step with beam but both edges below the horizon cannot happen in a sound series; its light
    // then stays at the horizon rather than being lost.
    const double part = sum > 0.0 ? weight[k] / sum : 1.0 / kPieces;
    if (part > 0.0) bins.add(pieces[k], mol * part, periods);
  }
}

SUNFALL_CLONES void add_scaled(const float* __restrict values, double scale, std::size_t count,
                               double* __restrict sums) {
  for (std::size_t k = 0; k < count; ++k) sums[k] += scale * values[k];
}

// [sector][band] of sky light on the level per period, mol. Days that follow each other mostly lie in
// the same periods: their light is added up once and given to the periods when these change.
class SkySums {
 public:
  SkySums(const Dome& dome, std::size_t periods)
      : size_(static_cast<std::size_t>(dome.sectors) * dome.bands),
        lately_(size_, 0.0),
        sums_(periods, std::vector<double>(size_, 0.0)) {}

  void add(const std::vector<float>& fraction, double mol, const std::vector<std::size_t>& periods) {
    if (periods != now_) settle();
    now_ = periods;
    add_scaled(fraction.data(), mol, size_, lately_.data());
  }
  // Must come before at().
  void settle() {
    for (const std::size_t p : now_) {
      for (std::size_t k = 0; k < size_; ++k) sums_[p][k] += lately_[k];
    }
    std::fill(lately_.begin(), lately_.end(), 0.0);
  }
  double at(std::size_t period, std::size_t cell) const { return sums_[period][cell]; }

 private:
  std::size_t size_;
  std::vector<double> lately_;
  std::vector<std::size_t> now_;
  std::vector<std::vector<double>> sums_;
};

// Spreads a band's light over the sector's lines and the band's steps, radiance even within the
// band: a step's level light is then proportional to its middle sine.
void spread_sky(const SkySums& sums, DomeLight& light) {
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
        const double level = sums.at(p, static_cast<std::size_t>(sector) * dome.bands + band) * part;
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
  DomeLight light;
  light.dome = dome;
  light.periods = periods;
  light.years = open_years(series, periods);
  const std::size_t size = static_cast<std::size_t>(dome.lines()) * dome.steps() * periods.size();
  for (DomeLight::Part* part : {&light.beam, &light.sky}) {
    part->level.assign(size, 0.0);
    part->facing.assign(size, 0.0);
  }
  BeamBins bins(light);
  SkyPatches patches(dome);
  SkySums sums(dome, periods.size());
  PeriodsOfDay periods_of_day(periods);
  std::vector<int> days(periods.size(), 0);
  const auto steps_per_day = static_cast<std::size_t>(std::chrono::days{1} / series.sun.step);
  const double mol_per_umol_s = 1e-6 * static_cast<double>(series.sun.step.count());

  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const std::vector<std::size_t>& in = periods_of_day.of(day_of_step(series, i));
    if (i % steps_per_day == 0) {
      for (const std::size_t p : in) ++days[p];
    }
    const LightStep& step = series.steps[i];
    if (in.empty()) continue;
    if (step.beam_umol > 0.0F) add_beam(series, i, step.beam_umol * mol_per_umol_s, bins, in);
    if (step.sky_umol <= 0.0F) continue;
    const double mol = step.sky_umol * mol_per_umol_s;
    sums.add(sky_fractions(patches, sky, series, i), mol, in);
  }
  sums.settle();
  spread_sky(sums, light);
  scale_to_days(light.beam, days, dome.lines() * dome.steps());
  scale_to_days(light.sky, days, dome.lines() * dome.steps());
  return light;
}

}  // namespace sunfall

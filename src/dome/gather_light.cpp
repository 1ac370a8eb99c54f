#include "dome/gather_light.h"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "core/clones.h"
#include "dome/sky_lattice.h"
#include "dome/sky_patch.h"

namespace sunfall {
namespace {

constexpr int kLatticeYears = 3;

// Adds light at a direction, shared bilinearly among the lines and steps around it.
class BeamBins {
 public:
  BeamBins(const Dome& dome, GatheredLight& light)
      : light_(light), lines_(dome.lines()), steps_(dome.steps()) {}

  void add(const SkyDirection& direction, double level) {
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
    put(line0, step0, level, facing, (1 - across) * (1 - up));
    put(line1, step0, level, facing, across * (1 - up));
    put(line0, step1, level, facing, (1 - across) * up);
    put(line1, step1, level, facing, across * up);
  }

 private:
  int wrapped_line(int line) const { return (line % lines_ + lines_) % lines_; }
  void put(int line, int step, double level, double facing, double weight) {
    const std::size_t at =
        static_cast<std::size_t>(line) * static_cast<std::size_t>(steps_) + static_cast<std::size_t>(step);
    light_.beam_level[at] += level * weight;
    light_.beam_facing[at] += facing * weight;
  }

  GatheredLight& light_;
  int lines_;
  int steps_;
};

// The sun moves a few degrees within a step; its light is laid along the path in this many pieces,
// so that lines between two steps of the clock are not left empty.
constexpr int kPieces = 12;

void add_beam(const LightSeries& series, std::size_t i, double mol, BeamBins& bins) {
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
    if (part > 0.0) bins.add(pieces[k], mol * part);
  }
}

SUNFALL_CLONES void add_scaled(const float* __restrict values, double scale, std::size_t count,
                               double* __restrict sums) {
  for (std::size_t k = 0; k < count; ++k) sums[k] += scale * values[k];
}

void add_sky_by_steps(const LightSeries& series, const std::vector<std::size_t>& steps, const Dome& dome,
                      SkyModel sky, double mol_per_umol_s, std::vector<double>& sums) {
  SkyPatches patches(dome);
  for (const std::size_t i : steps) {
    const std::vector<float>& fraction = sky_fractions(patches, sky, series, i);
    add_scaled(fraction.data(), series.steps[i].sky_umol * mol_per_umol_s, sums.size(), sums.data());
  }
}

void add_sky_by_lattice(const LightSeries& series, const std::vector<std::size_t>& steps, const Dome& dome,
                        double mol_per_umol_s, std::vector<double>& sums) {
  SkyLattice lattice(dome);
  for (const std::size_t i : steps) {
    const SkyDirection middle = middle_direction(series.sun.edges[i], series.sun.edges[i + 1]);
    const SkyState state = sky_state(series, i, middle);
    lattice.add(sky_indices(state), state.sun_zenith, middle, series.steps[i].sky_umol * mol_per_umol_s);
  }
  lattice.settle(sums);
}

}  // namespace

SkyMethod method_for(const LightSeries& series, const Dome& dome, SkyModel sky) {
  const bool lattice = sky == SkyModel::clearness && series.years >= kLatticeYears && fits_lattice(dome);
  return lattice ? SkyMethod::lattice : SkyMethod::steps;
}

GatheredLight gather_light(const LightSeries& series, const std::vector<std::size_t>& days, const Dome& dome,
                           SkyModel sky, SkyMethod method) {
  GatheredLight light;
  const std::size_t size = static_cast<std::size_t>(dome.lines()) * static_cast<std::size_t>(dome.steps());
  light.beam_level.assign(size, 0.0);
  light.beam_facing.assign(size, 0.0);
  light.sky.assign(static_cast<std::size_t>(dome.sectors) * static_cast<std::size_t>(dome.bands), 0.0);
  BeamBins bins(dome, light);
  const auto steps_per_day = static_cast<std::size_t>(std::chrono::days{1} / series.sun.step);
  const double mol_per_umol_s = 1e-6 * static_cast<double>(series.sun.step.count());
  std::vector<std::size_t> sky_steps;
  for (const std::size_t day : days) {
    for (std::size_t i = day * steps_per_day; i < (day + 1) * steps_per_day; ++i) {
      const LightStep& step = series.steps[i];
      if (step.beam_umol > 0.0F) add_beam(series, i, step.beam_umol * mol_per_umol_s, bins);
      if (step.sky_umol > 0.0F) sky_steps.push_back(i);
    }
  }
  if (method == SkyMethod::lattice) {
    add_sky_by_lattice(series, sky_steps, dome, mol_per_umol_s, light.sky);
  } else {
    add_sky_by_steps(series, sky_steps, dome, sky, mol_per_umol_s, light.sky);
  }
  return light;
}

}  // namespace sunfall

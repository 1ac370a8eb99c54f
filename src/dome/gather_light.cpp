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

// The sun moves a few degrees within a step; its light is laid along the path in this many pieces,
// so that lines between two steps of the clock are not left empty.
constexpr int kPieces = 12;

// Where a step's pieces lie on the dome and what each adds.
struct BeamPieces {
  double line[kPieces];    // in lines, from -lines / 2 to lines / 2
  double step[kPieces];    // in steps
  double level[kPieces];   // parts of the step's light
  double facing[kPieces];  // the same on a plane that faces the piece's azimuth
};

// atan(x), |x| < 0.1, to 1e-14: the next term is x^15 / 15.
double small_arc(double x) {
  const double s = x * x;
  return x * (1.0 - s * (1.0 / 3 - s * (1.0 / 5 - s * (1.0 / 7 - s * (1.0 / 9 - s * (1.0 / 11 - s / 13))))));
}

// Lays a step's light along its path and shares it bilinearly among the lines and steps around.
class BeamBins {
 public:
  BeamBins(const Dome& dome, GatheredLight& light)
      : light_(light), lines_(dome.lines()), steps_(dome.steps()) {}

  void add(const SkyDirection& from, const SkyDirection& to, double mol) {
    const BeamPieces pieces = cut(from, to);
    for (int k = 0; k < kPieces; ++k) {
      if (pieces.level[k] > 0.0) put(pieces, k, mol);
    }
  }

 private:
  BeamPieces cut(const SkyDirection& from, const SkyDirection& to) const {
    const double east = to.east - from.east, north = to.north - from.north, rise = to.up - from.up;
    double e[kPieces], n[kPieces], sine[kPieces], turn[kPieces];
    double sum = 0.0;
    for (int k = 0; k < kPieces; ++k) {
      const double t = (k + 0.5) / kPieces;
      e[k] = from.east + t * east;
      n[k] = from.north + t * north;
      const double up = from.up + t * rise;
      sine[k] = std::clamp(up / std::sqrt(e[k] * e[k] + n[k] * n[k] + up * up), 0.0, 1.0);
    }
    for (const double value : sine) sum += value;
    // From piece to piece the azimuth turns by a little; near the zenith by more, and then each is asked.
    turn[0] = std::atan2(e[0], n[0]);
    for (int k = 1; k < kPieces; ++k) {
      const double tangent = (e[k] * n[k - 1] - n[k] * e[k - 1]) / (e[k] * e[k - 1] + n[k] * n[k - 1]);
      turn[k] = std::abs(tangent) < 0.1 && e[k] * e[k - 1] + n[k] * n[k - 1] > 0.0
                    ? turn[k - 1] + small_arc(tangent)
                    : std::atan2(e[k], n[k]);
    }
    BeamPieces pieces;
    for (int k = 0; k < kPieces; ++k) {
      // A step with beam but both edges below the horizon cannot happen in a sound series; its light
      // then stays at the horizon rather than being lost.
      pieces.level[k] = sum > 0.0 ? sine[k] / sum : 1.0 / kPieces;
      // On a plane that faces the direction's azimuth light counts by its cosine of elevation.
      pieces.facing[k] =
          pieces.level[k] * std::sqrt(1.0 - sine[k] * sine[k]) / std::max(sine[k], 0.25 / steps_);
      pieces.line[k] = turn[k] / (2.0 * std::numbers::pi) * lines_ - 0.5;
      pieces.step[k] = std::clamp(sine[k] * steps_ - 0.5, 0.0, steps_ - 1.0);
    }
    return pieces;
  }

  void put(const BeamPieces& pieces, int k, double mol) {
    const double line_floor = std::floor(pieces.line[k]);
    const int step0 = std::min(static_cast<int>(pieces.step[k]), steps_ - 1);
    const int step1 = std::min(step0 + 1, steps_ - 1);
    const int line0 = wrapped_line(static_cast<int>(line_floor));
    const int line1 = wrapped_line(static_cast<int>(line_floor) + 1);
    const double across = pieces.line[k] - line_floor, up = pieces.step[k] - step0;
    const double level = mol * pieces.level[k], facing = mol * pieces.facing[k];
    put_at(line0, step0, level, facing, (1 - across) * (1 - up));
    put_at(line1, step0, level, facing, across * (1 - up));
    put_at(line0, step1, level, facing, (1 - across) * up);
    put_at(line1, step1, level, facing, across * up);
  }
  int wrapped_line(int line) const {
    const int once = line < 0 ? line + lines_ : line;
    return once < 0 || once >= lines_ ? (once % lines_ + lines_) % lines_ : once;
  }
  void put_at(int line, int step, double level, double facing, double weight) {
    const std::size_t at =
        static_cast<std::size_t>(line) * static_cast<std::size_t>(steps_) + static_cast<std::size_t>(step);
    light_.beam_level[at] += level * weight;
    light_.beam_facing[at] += facing * weight;
  }

  GatheredLight& light_;
  int lines_;
  int steps_;
};

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
      if (step.beam_umol > 0.0F)
        bins.add(series.sun.edges[i], series.sun.edges[i + 1], step.beam_umol * mol_per_umol_s);
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

// The beam on the dome against the plainest way of laying it there: a piece at a time, each asked for its
// azimuth.

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>
#include <numeric>

#include "light/series_checks.h"
#include "sunfall/dome.h"

namespace sunfall {
namespace {

// Sums of light on the level and on planes facing the sun, [line][step], of all steps of a series.
struct Laid {
  std::vector<double> level, facing;
};
Laid laid_plainly(const LightSeries& series, const Dome& dome) {
  const int lines = dome.lines(), steps = dome.steps();
  Laid laid;
  laid.level.assign(static_cast<std::size_t>(lines * steps), 0.0);
  laid.facing = laid.level;
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const SkyDirection &from = series.sun.edges[i], &to = series.sun.edges[i + 1];
    double sum = 0.0;
    const auto piece = [&](int k) {
      const double t = (k + 0.5) / 12;
      SkyDirection d{from.east + t * (to.east - from.east), from.north + t * (to.north - from.north),
                     from.up + t * (to.up - from.up)};
      const double length = std::sqrt(d.east * d.east + d.north * d.north + d.up * d.up);
      return SkyDirection{d.east / length, d.north / length, d.up / length};
    };
    for (int k = 0; k < 12; ++k) sum += std::max(piece(k).up, 0.0);
    if (!(series.steps[i].beam_umol > 0.0F) || !(sum > 0.0)) continue;
    for (int k = 0; k < 12; ++k) {
      const SkyDirection d = piece(k);
      const double sine = std::clamp(d.up, 0.0, 1.0);
      const double level = series.steps[i].beam_umol * 6e-4 * sine / sum;
      const double facing = level * std::sqrt(1.0 - sine * sine) / std::max(sine, 0.25 / steps);
      const double line = std::atan2(d.east, d.north) / (2.0 * std::numbers::pi) * lines - 0.5;
      const double step = std::clamp(sine * steps - 0.5, 0.0, steps - 1.0);
      for (const int right : {0, 1}) {
        for (const int upper : {0, 1}) {
          const int at_line = ((static_cast<int>(std::floor(line)) + right) % lines + lines) % lines;
          const int low = static_cast<int>(step);
          const int at_step = std::min(low + upper, steps - 1);
          const double across = line - std::floor(line), up = step - low;
          const double weight = (right == 1 ? across : 1.0 - across) * (upper == 1 ? up : 1.0 - up);
          laid.level[static_cast<std::size_t>(at_line * steps + at_step)] += level * weight;
          laid.facing[static_cast<std::size_t>(at_line * steps + at_step)] += facing * weight;
        }
      }
    }
  }
  return laid;
}

// Arcs from piece to piece are good to 1e-14 and eleven of them follow each other; a year adds 2e5 pieces to
// a dome. Near the zenith, where the sun passes at 10 degrees of latitude, arcs are long and taken otherwise.
TEST(BeamPath, IsThatOfItsPieces) {
  const std::vector<Period> year{{"year", std::chrono::January / 1, std::chrono::December / 31}};
  for (const double latitude_deg : {52.0, 10.0, 0.0, -34.0, 78.0, -90.0}) {
    SCOPED_TRACE(latitude_deg);
    const LightSeries series = light_of(ClearSource{}, place_at(latitude_deg));
    const Dome dome = Dome::of(DomeQuality::draft);
    const DomeLight light = make_dome_light(series, dome, SkyModel::isotropic, year);
    const Laid plain = laid_plainly(series, dome);
    const double level_sum = std::accumulate(plain.level.begin(), plain.level.end(), 0.0);
    const double facing_sum = std::accumulate(plain.facing.begin(), plain.facing.end(), 0.0);
    for (int line = 0; line < dome.lines(); ++line) {
      for (int step = 0; step < dome.steps(); ++step) {
        const auto at = static_cast<std::size_t>(line * dome.steps() + step);
        ASSERT_NEAR(365.0 * light.beam.level[light.index(line, step, 0)], plain.level[at], 1e-10 * level_sum);
        ASSERT_NEAR(365.0 * light.beam.facing[light.index(line, step, 0)], plain.facing[at],
                    1e-10 * facing_sum);
      }
    }
  }
}

}  // namespace
}  // namespace sunfall

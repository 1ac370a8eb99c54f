#include "map/loss_table.h"

#include <algorithm>
#include <cmath>

namespace sunfall {
namespace {

enum class Plane { level, facing };

const std::vector<double>& values_of(const DomeLight::Part& part, Plane plane) {
  return plane == Plane::level ? part.level : part.facing;
}

// The light of one look that lies below each horizon step, [step]; steps of the dome are cut in
// proportion to the sine of elevation.
std::vector<double> below_horizon(const DomeLight& light, const DomeLight::Part& part, Plane plane,
                                  const Look& look, std::size_t period) {
  const int steps = light.dome.steps();
  std::vector<double> cumulative(steps + 1, 0.0);
  for (int step = 0; step < steps; ++step) {
    double sum = 0.0;
    for (int line = look.first_line; line < look.first_line + look.lines; ++line) {
      sum += values_of(part, plane)[light.index(line, step, period)];
    }
    cumulative[step + 1] = cumulative[step] + sum;
  }
  std::vector<double> below(kHorizonSteps, 0.0);
  for (int h = 1; h < kHorizonSteps; ++h) {
    const double tangent = step_tangent(h);
    const double place = tangent / std::sqrt(1.0 + tangent * tangent) * steps;
    const int step = std::min(static_cast<int>(place), steps - 1);
    below[h] = cumulative[step] + (place - step) * (cumulative[step + 1] - cumulative[step]);
  }
  return below;
}

struct Column {
  const DomeLight::Part* part;
  std::size_t period;
  double open;
};

std::vector<Column> columns_of(const DomeLight& light) {
  std::vector<Column> columns;
  for (const DomeLight::Part* part : {&light.beam, &light.sky}) {
    for (std::size_t p = 0; p < light.periods.size(); ++p) columns.push_back({part, p, part->open[p]});
  }
  return columns;
}

// The strongest share of any period's beam that comes from a sector below 30 degrees.
double low_beam_share(const DomeLight& light, int sector) {
  const Dome& dome = light.dome;
  double most = 0.0;
  for (std::size_t p = 0; p < light.periods.size(); ++p) {
    double sum = 0.0;
    for (int line = sector * dome.lines_per_sector; line < (sector + 1) * dome.lines_per_sector; ++line) {
      for (int step = 0; step < dome.steps() / 2; ++step) sum += light.beam.level[light.index(line, step, p)];
    }
    if (light.beam.open[p] > 0.0) most = std::max(most, sum / light.beam.open[p]);
  }
  return most;
}

int looks_in_sector(double low_beam_share, const Dome& dome) {
  const int lines = dome.lines_per_sector;
  int looks = 1;
  while (looks < lines && (lines % looks != 0 || looks * dome.beam_per_look < low_beam_share)) ++looks;
  return std::min(looks, lines);
}

}  // namespace

std::vector<Look> looks_of(const DomeLight& light) {
  const Dome& dome = light.dome;
  std::vector<Look> looks;
  for (int sector = 0; sector < dome.sectors; ++sector) {
    const int count = looks_in_sector(low_beam_share(light, sector), dome);
    const int lines = dome.lines_per_sector / count;
    for (int k = 0; k < count; ++k) {
      const int first = sector * dome.lines_per_sector + k * lines;
      looks.push_back({first, lines, {Angle::degrees(360.0 * (first + 0.5 * lines) / dome.lines())}});
    }
  }
  return looks;
}

LossTable::LossTable(const DomeLight& light, const std::vector<Look>& looks) : looks_(looks.size()) {
  const std::vector<Column> columns = columns_of(light);
  columns_ = static_cast<int>(columns.size());
  blocks_ = (columns_ + kColumnBlock - 1) / kColumnBlock;
  entries_.assign(static_cast<std::size_t>(blocks_) * looks_ * kHorizonSteps * kColumnBlock, 0);
  units_.assign(columns_, 0.0);
  for (int c = 0; c < columns_; ++c) {
    if (columns[c].open <= 0.0) continue;
    std::vector<std::vector<double>> below;
    double most = 0.0;
    for (const Look& look : looks) {
      below.push_back(below_horizon(light, *columns[c].part, Plane::level, look, columns[c].period));
      most = std::max(most, below.back().back() / columns[c].open);
    }
    const double scale = (65535 / kLooksPerWord) / most;
    units_[c] = 1.0 / scale;
    for (std::size_t look = 0; look < looks_; ++look) {
      std::uint16_t* out =
          entries_.data() +
          (static_cast<std::size_t>(c / kColumnBlock) * looks_ + look) * kHorizonSteps * kColumnBlock +
          c % kColumnBlock;
      for (int h = 0; h < kHorizonSteps; ++h) {
        out[static_cast<std::size_t>(h) * kColumnBlock] =
            static_cast<std::uint16_t>(std::lround(below[look][h] / columns[c].open * scale));
      }
    }
  }
}

SlopeLossTable::SlopeLossTable(const DomeLight& light, const std::vector<Look>& looks) {
  const std::vector<Column> columns = columns_of(light);
  columns_ = static_cast<int>(columns.size());
  padded_ = (columns_ + 7) / 8 * 8;
  entries_.assign(looks.size() * kHorizonSteps * 2 * padded_, 0.0F);
  open_facing_.assign(looks.size() * padded_, 0.0F);
  for (int c = 0; c < columns_; ++c) {
    if (columns[c].open <= 0.0) continue;
    for (std::size_t look = 0; look < looks.size(); ++look) {
      for (const Plane plane : {Plane::level, Plane::facing}) {
        const auto below = below_horizon(light, *columns[c].part, plane, looks[look], columns[c].period);
        float* out =
            entries_.data() + look * kHorizonSteps * 2 * padded_ + (plane == Plane::facing ? padded_ : 0) + c;
        for (int h = 0; h < kHorizonSteps; ++h) {
          out[static_cast<std::size_t>(h) * 2 * padded_] = static_cast<float>(below[h] / columns[c].open);
        }
      }
      double facing = 0.0;
      for (int line = looks[look].first_line; line < looks[look].first_line + looks[look].lines; ++line) {
        for (int step = 0; step < light.dome.steps(); ++step) {
          facing += columns[c].part->facing[light.index(line, step, columns[c].period)];
        }
      }
      open_facing_[look * padded_ + c] = static_cast<float>(facing / columns[c].open);
    }
  }
}

}  // namespace sunfall

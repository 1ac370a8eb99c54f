#include "map/loss_table.h"

#include <algorithm>
#include <cmath>

namespace sunfall {
namespace {

enum class Plane { level, facing };

const std::vector<double>& values_of(const DomeLight::Part& part, Plane plane) {
  return plane == Plane::level ? part.level : part.facing;
}

// The light of one line that lies below each horizon step, [step]; steps of the dome are cut in
// proportion to the sine of elevation.
std::vector<double> below_horizon(const DomeLight& light, const DomeLight::Part& part, Plane plane, int line,
                                  std::size_t period) {
  const int steps = light.dome.steps();
  std::vector<double> cumulative(steps + 1, 0.0);
  for (int step = 0; step < steps; ++step) {
    cumulative[step + 1] = cumulative[step] + values_of(part, plane)[light.index(line, step, period)];
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

}  // namespace

LossTable::LossTable(const DomeLight& light) : lines_(light.dome.lines()) {
  const std::vector<Column> columns = columns_of(light);
  columns_ = static_cast<int>(columns.size());
  blocks_ = (columns_ + kColumnBlock - 1) / kColumnBlock;
  entries_.assign(static_cast<std::size_t>(blocks_) * lines_ * kHorizonSteps * kColumnBlock, 0);
  units_.assign(columns_, 0.0);
  for (int c = 0; c < columns_; ++c) {
    if (columns[c].open <= 0.0) continue;
    std::vector<std::vector<double>> below;
    double most = 0.0;
    for (int line = 0; line < lines_; ++line) {
      below.push_back(below_horizon(light, *columns[c].part, Plane::level, line, columns[c].period));
      most = std::max(most, below.back().back() / columns[c].open);
    }
    const double scale = 65535.0 / most;
    units_[c] = 1.0 / scale;
    for (int line = 0; line < lines_; ++line) {
      std::uint16_t* out =
          entries_.data() +
          (static_cast<std::size_t>(c / kColumnBlock) * lines_ + line) * kHorizonSteps * kColumnBlock +
          c % kColumnBlock;
      for (int h = 0; h < kHorizonSteps; ++h) {
        out[static_cast<std::size_t>(h) * kColumnBlock] =
            static_cast<std::uint16_t>(std::lround(below[line][h] / columns[c].open * scale));
      }
    }
  }
}

SlopeLossTable::SlopeLossTable(const DomeLight& light) {
  const std::vector<Column> columns = columns_of(light);
  columns_ = static_cast<int>(columns.size());
  padded_ = (columns_ + 7) / 8 * 8;
  const int lines = light.dome.lines();
  entries_.assign(static_cast<std::size_t>(lines) * kHorizonSteps * 2 * padded_, 0.0F);
  open_facing_.assign(static_cast<std::size_t>(lines) * padded_, 0.0F);
  for (int c = 0; c < columns_; ++c) {
    if (columns[c].open <= 0.0) continue;
    for (int line = 0; line < lines; ++line) {
      for (const Plane plane : {Plane::level, Plane::facing}) {
        const auto below = below_horizon(light, *columns[c].part, plane, line, columns[c].period);
        float* out = entries_.data() + static_cast<std::size_t>(line) * kHorizonSteps * 2 * padded_ +
                     (plane == Plane::facing ? padded_ : 0) + c;
        for (int h = 0; h < kHorizonSteps; ++h) {
          out[static_cast<std::size_t>(h) * 2 * padded_] = static_cast<float>(below[h] / columns[c].open);
        }
      }
      double facing = 0.0;
      for (int step = 0; step < light.dome.steps(); ++step) {
        facing += columns[c].part->facing[light.index(line, step, columns[c].period)];
      }
      open_facing_[static_cast<std::size_t>(line) * padded_ + c] =
          static_cast<float>(facing / columns[c].open);
    }
  }
}

}  // namespace sunfall

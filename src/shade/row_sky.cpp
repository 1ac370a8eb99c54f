#include "shade/row_sky.h"

#include <algorithm>
#include <cmath>

namespace sunfall {
namespace {

// Of something at `place` on a scale of `count` nodes: what the node after the first gets.
struct Share {
  int first;
  double to_next;
};
Share share_of(double place, int count) {
  const double held = std::clamp(place, 0.0, count - 1.0);
  const int first = std::min(static_cast<int>(held), count - 2);
  return {first, held - first};
}

struct Fold {
  Share off;
  double right;  // part that comes from the right
};
Fold fold_of(Azimuth line, Azimuth rows) {
  const double from_row = wrapped(line.from_true_north - rows.from_true_north).degrees();
  const double on_side = from_row < 180.0 ? from_row : from_row - 180.0;
  const double off = std::min(on_side, 180.0 - on_side) / 90.0 * (RowSky::kNodes - 1);
  const double right = off < 1e-9 ? 0.5 : from_row < 180.0 ? 1.0 : 0.0;
  return {share_of(off, RowSky::kNodes), right};
}

}  // namespace

RowSky::RowSky(const DomeLight& light, Azimuth rows)
    : periods_(light.periods.size()), level_(2 * static_cast<std::size_t>(kNodes) * kSteps * periods_, 0.0) {
  const auto add = [&](Side side, int node, int step, double part, std::size_t from) {
    if (part == 0.0) return;
    double* to = &level_[((static_cast<std::size_t>(side) * kNodes + node) * kSteps + step) * periods_];
    for (std::size_t p = 0; p < periods_; ++p) {
      to[p] += part * (light.beam.level[from + p] + light.sky.level[from + p]);
    }
  };
  for (int line = 0; line < light.dome.lines(); ++line) {
    const Fold fold = fold_of(light.dome.line_azimuth(line), rows);
    for (int step = 0; step < light.dome.steps(); ++step) {
      const std::size_t from = light.index(line, step, 0);
      const Share up = share_of((step + 0.5) / light.dome.steps() * kSteps - 0.5, kSteps);
      for (const Side side : {right, left}) {
        const double part = side == right ? fold.right : 1.0 - fold.right;
        add(side, fold.off.first, up.first, part * (1.0 - fold.off.to_next) * (1.0 - up.to_next), from);
        add(side, fold.off.first + 1, up.first, part * fold.off.to_next * (1.0 - up.to_next), from);
        add(side, fold.off.first, up.first + 1, part * (1.0 - fold.off.to_next) * up.to_next, from);
        add(side, fold.off.first + 1, up.first + 1, part * fold.off.to_next * up.to_next, from);
      }
    }
  }
}

std::vector<double> open_light(const DomeLight& light) {
  std::vector<double> open(light.periods.size());
  for (std::size_t p = 0; p < open.size(); ++p) open[p] = light.beam.open[p] + light.sky.open[p];
  return open;
}

}  // namespace sunfall

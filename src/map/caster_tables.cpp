#include "map/caster_tables.h"

#include <algorithm>
#include <cmath>
#include <map>

#include "sunfall/rows.h"

namespace sunfall {
namespace {

// Below this sine of elevation (19 degrees) leaves far away cast shade, and every band of the dome counts.
constexpr double kFineSine = 1.0 / 3.0;

}  // namespace

std::vector<CasterBand> caster_bands(const Dome& dome) {
  std::vector<CasterBand> bands;
  for (int band = 0; band < dome.bands;) {
    const bool fine = double(band) / dome.bands < kFineSine;
    const int end = std::min(band + (fine ? 1 : 2), dome.bands);
    const double sine = 0.5 * (band + end) / dome.bands;
    bands.push_back({band * dome.steps_per_band, end * dome.steps_per_band,
                     static_cast<float>(sine / std::sqrt(1.0 - sine * sine))});
    band = end;
  }
  return bands;
}

CasterTables::CasterTables(const DomeLight& light, const std::vector<Look>& looks, const LossTable& level,
                           const SlopeLossTable* slope, const Casters& casters)
    : looks_(looks.size()), bands_(caster_bands(light.dome)) {
  find_states(light, casters, level.columns());
  const std::size_t edge_count = bands_.size() + 1;
  const auto step_at = [&](std::size_t edge) { return edge == 0 ? 0 : bands_[edge - 1].end_step; };
  edges_.assign(static_cast<std::size_t>(level.blocks()) * looks_ * edge_count * kColumnBlock, 0);
  if (slope) {
    slope_padded_ = slope->padded();
    slope_edges_.assign(looks_ * edge_count * 2 * slope_padded_, 0.0F);
  }
  const std::size_t periods = light.periods.size();
  for (std::size_t look = 0; look < looks_; ++look) {
    for (int c = 0; c < level.columns(); ++c) {
      const DomeLight::Part& part = static_cast<std::size_t>(c) < periods ? light.beam : light.sky;
      const std::size_t period = static_cast<std::size_t>(c) % periods;
      if (part.open[period] <= 0.0) continue;
      std::uint16_t* out =
          edges_.data() +
          (static_cast<std::size_t>(c / kColumnBlock) * looks_ + look) * edge_count * kColumnBlock +
          c % kColumnBlock;
      double below = 0.0, facing = 0.0;
      int step = 0;
      for (std::size_t edge = 0; edge < edge_count; ++edge) {
        for (; step < step_at(edge); ++step) {
          for (int line = looks[look].first_line; line < looks[look].first_line + looks[look].lines; ++line) {
            below += part.level[light.index(line, step, period)];
            facing += part.facing[light.index(line, step, period)];
          }
        }
        out[edge * kColumnBlock] =
            static_cast<std::uint16_t>(std::lround(below / part.open[period] / level.units()[c]));
        if (slope) {
          float* to = slope_edges_.data() + (look * edge_count + edge) * 2 * slope_padded_ + c;
          to[0] = static_cast<float>(below / part.open[period]);
          to[slope_padded_] = static_cast<float>(facing / part.open[period]);
        }
      }
    }
  }
}

int CasterTables::groups_of(const Casters& casters) {
  std::vector<std::pair<std::array<double, 12>, bool>> known;
  for (const auto& caster : casters) {
    const std::pair group{caster->leafing(), caster->crop().has_value()};
    if (std::find(known.begin(), known.end(), group) == known.end()) known.push_back(group);
  }
  return static_cast<int>(known.size());
}

void CasterTables::find_states(const DomeLight& light, const Casters& casters, int columns) {
  std::vector<std::array<double, 12>> leafings;
  for (const auto& caster : casters) {
    const bool crop = caster->crop().has_value();
    int group = 0;
    while (group < groups_ && (leafings[group] != caster->leafing() || of_crops_[group] != crop)) ++group;
    group_of_.push_back(group);
    if (group < groups_) continue;
    leafings.push_back(caster->leafing());
    of_crops_.push_back(crop);
    ++groups_;
  }
  std::map<std::vector<std::uint32_t>, int> known;
  const std::size_t periods = light.periods.size();
  const int padded = (columns + kColumnBlock - 1) / kColumnBlock * kColumnBlock;
  state_of_column_.assign(padded, 0);
  for (std::size_t p = 0; p < periods; ++p) {
    std::vector<std::uint32_t> leaf;
    for (const auto& leafing : leafings) {
      leaf.push_back(static_cast<std::uint32_t>(std::lround(256.0 * leafing_of(light.periods[p], leafing))));
    }
    const auto [place, fresh] = known.emplace(leaf, states_);
    if (fresh) {
      leaf_.insert(leaf_.end(), leaf.begin(), leaf.end());
      ++states_;
    }
    state_of_column_[p] = state_of_column_[periods + p] = static_cast<std::uint16_t>(place->second);
  }
}

}  // namespace sunfall

#include "shade/row_sums.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "core/clones.h"
#include "shade/row_cycle.h"
#include "shade/row_leaves.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

SUNFALL_CLONES void add_scaled(const double* __restrict values, double scale, std::size_t count,
                               double* __restrict sums) {
  for (std::size_t k = 0; k < count; ++k) sums[k] += scale * values[k];
}

}  // namespace

RowColumns::RowColumns(std::span<const RowSky> skies, std::span<const std::size_t> periods)
    : count(skies.size() * 2 * periods.size()) {
  level.reserve(static_cast<std::size_t>(RowSky::kNodes) * RowSky::kSteps * count);
  for (int node = 0; node < RowSky::kNodes; ++node) {
    for (int step = 0; step < RowSky::kSteps; ++step) {
      for (const RowSky& sky : skies) {
        for (const RowSky::Side side : {RowSky::right, RowSky::left}) {
          for (const std::size_t period : periods) level.push_back(sky.level(side, node, step)[period]);
        }
      }
    }
  }
}

std::vector<LeafLight> leaf_lights(std::span<const RowSky> skies, const std::vector<Period>& periods,
                                   const std::array<double, 12>& leafing) {
  std::vector<LeafLight> lights;
  for (const LeafingGroup& group : leafing_groups(periods, leafing)) {
    lights.push_back({group, RowColumns(skies, group.periods)});
  }
  return lights;
}

std::vector<RowSums> sum_over_sky(const CropRows& rows, std::span<const LeafLight> lights,
                                  std::span<const double> across_m, double height_m) {
  std::vector<RowSums> all;
  std::vector<RowLeaves> leaves;
  for (const LeafLight& light : lights) {
    const std::vector<double> dark(light.columns.count, 0.0);
    all.push_back({dark, std::vector<std::vector<double>>(across_m.size(), dark)});
    leaves.emplace_back(rows, light.group.leafing);
  }
  std::vector<double> paths(across_m.size());
  for (int node = 0; node < RowSky::kNodes; ++node) {
    for (int step = 0; step < RowSky::kSteps; ++step) {
      const double sine = RowSky::sine_of(step);
      const RowRay ray = row_ray({Angle()}, {RowSky::angle_of(node)}, sine / std::sqrt(1.0 - sine * sine));
      const CyclePaths cycle(rows, ray, 0.0);
      for (std::size_t i = 0; i < paths.size(); ++i) paths[i] = row_path(rows, ray, across_m[i], height_m);
      for (std::size_t k = 0; k < lights.size(); ++k) {
        const RowColumns& columns = lights[k].columns;
        const double* light = columns.at(node, step);
        const double depth = leaves[k].depth(sine);
        const double taken = (1.0 - cycle.passage(depth)) * (1.0 - leaves[k].reflected(sine));
        add_scaled(light, taken, columns.count, all[k].taken.data());
        for (std::size_t i = 0; i < paths.size(); ++i) {
          add_scaled(light, std::exp(-depth * paths[i]), columns.count, all[k].place[i].data());
        }
      }
    }
  }
  return all;
}

double leafing_of(const Period& period, const std::array<double, 12>& leafing) {
  using namespace std::chrono;
  // A leap year, so that a period of 29 February alone has a day.
  double sum = 0.0;
  int days_in = 0;
  for (sys_days day = year{2024} / January / 1; day < sys_days{year{2025} / January / 1}; day += days{1}) {
    const year_month_day date{day};
    const month_day at = date.month() / date.day();
    const bool in = period.from <= period.to ? period.from <= at && at <= period.to
                                             : at >= period.from || at <= period.to;
    if (!in) continue;
    sum += leafing[static_cast<unsigned>(date.month()) - 1];
    ++days_in;
  }
  return days_in > 0 ? sum / days_in : 0.0;
}

std::vector<LeafingGroup> leafing_groups(const std::vector<Period>& periods,
                                         const std::array<double, 12>& leafing) {
  std::vector<LeafingGroup> groups;
  for (std::size_t p = 0; p < periods.size(); ++p) {
    const double share = leafing_of(periods[p], leafing);
    const auto same = std::find_if(groups.begin(), groups.end(), [&](const LeafingGroup& group) {
      return std::abs(group.leafing - share) < 1e-12;
    });
    if (same != groups.end()) {
      same->periods.push_back(p);
    } else {
      groups.push_back({share, {p}});
    }
  }
  return groups;
}

void require_sound(const CropRows& rows, const std::array<double, 12>& leafing) {
  if (const auto fault = fault_of(rows)) {
    throw Error(ErrorKind::plan, {fault->what, "rows: " + fault->key, fault->found, fault->remedy});
  }
  for (const double share : leafing) {
    if (share >= 0.0 && share <= 1.0) continue;
    throw Error(ErrorKind::plan,
                {"leafing must be 0 to 1 in every month", "rows: leafing", fmt::format("{:g}", share), ""});
  }
}

}  // namespace sunfall

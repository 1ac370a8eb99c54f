#include "map/casters.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "geo/canopy_check.h"
#include "geo/geodesy.h"
#include "geo/plot_area.h"
#include "map/open_canopy.h"
#include "shade/canopy.h"
#include "shade/rows_caster.h"

namespace sunfall {
namespace {

void add_canopy(const CanopyPlan& canopy, std::size_t number, const Plan& plan, const Terrain& terrain,
                PlanCasters& out) {
  const std::string name = canopy.name.empty() ? fmt::format("canopy {}", number + 1) : canopy.name;
  std::vector<std::string> notes;
  const RasterSource ground = RasterSource::open(plan.site.ground, "ground");
  std::shared_ptr<const CanopySource> source = open_canopy(canopy, ground, notes);
  for (const std::string& note : notes) out.notes.push_back(name + ": " + note);
  if (plan.site.surface) {
    const CanopyInSurface found =
        canopy_in_surface(*source, ground, RasterSource::open(*plan.site.surface, "surface"));
    if (const auto note = canopy_in_surface_note(found, name)) out.notes.push_back(*note);
  }
  CanopyOptions options;
  options.leaves = {canopy.leaf_angle, canopy.clumping, canopy.absorptance};
  options.leafing = canopy.leafing;
  out.casters.push_back(std::make_unique<Canopy>(std::move(source), terrain, options));
}

MapPoint middle_of(const std::vector<std::vector<MapPoint>>& rings) {
  MapPoint sum;
  for (const MapPoint& point : rings.front()) sum.east += point.east, sum.north += point.north;
  const double count = static_cast<double>(rings.front().size());
  return {sum.east / count, sum.north / count};
}

// What rows let through of the mean over their cycle is not in proportion to their leaves: where cells are
// that wide, each state of leaf is a caster of its own, there in its months.
void add_rows(const RowsPlan& rows, std::size_t number, const Terrain& terrain, PlanCasters& out) {
  const PlotArea area = read_area({rows.area.file, rows.area.layer, rows.area.where}, terrain.frame());
  const std::string name = rows.name.empty() ? fmt::format("rows {}", number + 1) : rows.name;
  for (const std::string& note : area.notes) out.notes.push_back(name + ": " + note);
  const Angle convergence = geo_place(terrain.frame(), middle_of(area.rings)).convergence;
  RowsInputs inputs;
  inputs.number = static_cast<int>(number);
  inputs.rings = area.rings;
  inputs.azimuth = to_grid(rows.azimuth, convergence);
  inputs.rows = rows.rows;
  inputs.months = rows.leafing;
  inputs.receiver_height_m = terrain.receiver_height_m();
  if (!RowsCaster::whole_cycle(terrain.frame().cell_m, rows.rows)) {
    out.casters.push_back(std::make_unique<RowsCaster>(inputs, terrain));
    return;
  }
  std::vector<double> states(rows.leafing.begin(), rows.leafing.end());
  std::sort(states.begin(), states.end());
  states.erase(std::unique(states.begin(), states.end()), states.end());
  for (const double leafing : states) {
    inputs.leafing = leafing;
    inputs.one_state = true;
    for (std::size_t m = 0; m < 12; ++m) inputs.months[m] = rows.leafing[m] == leafing ? 1.0 : 0.0;
    out.casters.push_back(std::make_unique<RowsCaster>(inputs, terrain));
  }
}

}  // namespace

PlanCasters make_casters(const Plan& plan, const Terrain& terrain) {
  PlanCasters out;
  for (std::size_t i = 0; i < plan.canopy.size(); ++i) add_canopy(plan.canopy[i], i, plan, terrain, out);
  for (std::size_t i = 0; i < plan.rows.size(); ++i) add_rows(plan.rows[i], i, terrain, out);
  return out;
}

std::vector<std::filesystem::path> files_of_casters(const Plan& plan) {
  std::vector<std::filesystem::path> files;
  const auto add = [&](const std::optional<std::filesystem::path>& file) {
    if (file && std::find(files.begin(), files.end(), *file) == files.end()) files.push_back(*file);
  };
  for (const CanopyPlan& canopy : plan.canopy) {
    if (canopy.trees) {
      add(canopy.trees->layer.file);
      continue;
    }
    add(canopy.top_m.file);
    add(canopy.base_m.file);
    if (canopy.leaf_density) add(canopy.leaf_density->file);
  }
  for (const RowsPlan& rows : plan.rows) add(rows.area.file);
  return files;
}

}  // namespace sunfall

// sunfall vet PLAN: checks the plan and every input, and says what will run.

#include <fmt/format.h>

#include <chrono>
#include <memory>
#include <nlohmann/json.hpp>
#include <thread>

#include "app/command_line.h"
#include "app/terminal_progress.h"
#include "map/casters.h"
#include "map/layers.h"
#include "map/open_terrain.h"
#include "map/site.h"
#include "map/tile_solver.h"
#include "report/write_run.h"
#include "shade/terrain.h"
#include "sunfall/map.h"

namespace sunfall {
namespace {

struct Estimate {
  std::size_t tiles = 0;
  double seconds = 0.0;
  double memory_mib = 0.0;
};

// Solves a small tile in the middle of the map and scales up. Memory is that of the tiles at work
// and the coarser levels of the whole map, or afterwards of the layers being finished, and the raster cache.
Estimate estimate(const Plan& plan, const Terrain& terrain, const Casters& casters, const DomeLight& light,
                  int jobs) {
  const GridFrame& frame = terrain.frame();
  const MapOptions options;
  const int side = std::min({192, frame.columns, frame.rows});
  const CellWindow window{(frame.columns - side) / 2, (frame.rows - side) / 2, side, side};
  const TileSolver solver(terrain, light, plan.site.receiver_plane, casters);
  const auto begin = std::chrono::steady_clock::now();
  solver.solve(terrain.tile(window), Angle());
  const double seconds = std::chrono::duration<double>(std::chrono::steady_clock::now() - begin).count();
  const std::size_t layers = layers_of(plan, light.periods, {}).size();
  Estimate out;
  const double tile = options.tile_cells;
  out.tiles = static_cast<std::size_t>(std::ceil(frame.columns / tile) * std::ceil(frame.rows / tile));
  const double per_cell = seconds / (double(side) * side) + 6e-9 * double(layers);
  out.seconds = per_cell * double(frame.size()) / std::min<double>(jobs, double(out.tiles)) + 1.0;
  const double working = std::min(tile * tile, double(frame.size()));
  const double percentiles = plan.output.percentiles ? 12.0 * double(light.periods.size() + 1) : 0.0;
  const double solving =
      jobs * working * (400.0 + 8.0 * double(solver.columns()) + percentiles) + 1.4 * double(frame.size());
  const int groups = CasterTables::groups_of(casters);
  const double leaves =
      2.0 * jobs * working * groups * double(caster_looks(groups)) * double(caster_bands(light.dome).size());
  // What a layer holds while it is finished, per cell: found by measuring, a little up.
  const double finishing = std::min<double>(jobs, double(layers)) * 6.0 * double(frame.size());
  out.memory_mib = std::max(solving + leaves, finishing) / 1048576.0 + 320.0;
  return out;
}

nlohmann::ordered_json as_json(const Plan& plan, const Site& site, const Terrain& terrain,
                               const DomeLight& light, const Estimate& cost, std::size_t plots,
                               const std::vector<std::string>& notes) {
  const OpenField open = open_field(light);
  std::vector<double> months;
  for (std::size_t m = 0; m < 12; ++m) months.push_back(open.beam[m] + open.sky[m]);
  return {{"plan", plan.name},
          {"grid",
           {{"columns", site.frame.columns},
            {"rows", site.frame.rows},
            {"cell_m", site.frame.cell_m},
            {"crs", crs_name(site.frame)},
            {"valid_fraction", terrain.valid_fraction()}}},
          {"place",
           {{"longitude", site.middle.place.longitude.degrees()},
            {"latitude", site.middle.place.latitude.degrees()},
            {"height_m", site.middle.place.height_m},
            {"convergence_deg", site.middle.convergence.degrees()}}},
          {"light",
           {{"description", site.series.description},
            {"is_ceiling", site.series.is_ceiling},
            {"umol_per_joule", umol_per_joule(site.series)}}},
          {"open_field_dli_month", months},
          {"plots", plots},
          {"tiles", cost.tiles},
          {"expected_s", cost.seconds},
          {"expected_memory_mib", cost.memory_mib},
          {"defaults", plan.defaults},
          {"notes", notes}};
}

void print_text(const Plan& plan, const Site& site, const Terrain& terrain, const DomeLight& light,
                const Estimate& cost, std::size_t plots, const std::vector<std::string>& notes) {
  const GridFrame& frame = site.frame;
  const OpenField open = open_field(light);
  fmt::print("{}\n\n", plan.name);
  fmt::print("Grid       {} × {} cells of {:g} m, {}\n", frame.columns, frame.rows, frame.cell_m,
             crs_name(frame));
  fmt::print("           {:.1f} % of the cells have a height, {:.1f} to {:.1f} m\n",
             100.0 * terrain.valid_fraction(), terrain.lowest_m(), terrain.highest_m());
  fmt::print("Place      {}, {:.0f} m; grid north is {:.2f}° {} of true north\n",
             place_text(site.middle.place), site.middle.place.height_m,
             std::abs(site.middle.convergence.degrees()),
             site.middle.convergence.degrees() < 0 ? "west" : "east");
  fmt::print("Shade      ground{}{}{}{}\n", plan.site.surface ? ", surface" : "",
             plan.site.far_ground ? ", far ground" : "",
             plan.canopy.empty() ? "" : fmt::format(", canopy ({})", plan.canopy.size()),
             plan.rows.empty() ? "" : fmt::format(", crop rows ({})", plan.rows.size()));
  fmt::print("Receiver   {:g} m above the ground, {}\n", plan.site.receiver_height_m,
             plan.site.receiver_plane == ReceiverPlane::level ? "level" : "in the plane of the ground");
  fmt::print("Light      {}{}\n", site.series.description,
             site.series.is_ceiling ? " (a cloudless ceiling)" : "");
  fmt::print("           {:.3f} µmol per J of global radiation\n", umol_per_joule(site.series));
  fmt::print("Open field ");
  for (std::size_t m = 0; m < 12; ++m) fmt::print("{:.1f} ", open.beam[m] + open.sky[m]);
  fmt::print("mol m-2 d-1, January to December\n");
  fmt::print("Dome       {} sectors × {} bands\n", light.dome.sectors, light.dome.bands);
  if (plan.plots) fmt::print("Plots      {}\n", plots);
  fmt::print("Work       {} tile{}, about {:.0f} s, about {:.0f} MiB of memory\n", cost.tiles,
             cost.tiles == 1 ? "" : "s", std::max(1.0, cost.seconds), cost.memory_mib);
  if (!plan.defaults.empty()) fmt::print("\nLeft open in the plan:\n");
  for (const std::string& line : plan.defaults) fmt::print("  {}\n", line);
  fmt::print("\nNotes:\n");
  for (const std::string& note : notes) fmt::print("  {}\n", note);
}

void run_vet(const CommonOptions& options) {
  const Plan plan = plan_of(options);
  const Site site = site_of(plan);
  const std::size_t plots = plots_of(plan, site.frame).size();
  TerminalProgress progress(options.quiet || options.json);
  const Terrain terrain(open_terrain(plan.site), progress);
  const DomeLight light = dome_light_of(plan, site);
  const int jobs =
      options.jobs > 0 ? options.jobs : static_cast<int>(std::max(1U, std::thread::hardware_concurrency()));
  const PlanCasters casters = make_casters(plan, terrain);
  std::vector<std::string> notes = site.notes;
  notes.insert(notes.end(), casters.notes.begin(), casters.notes.end());
  const Estimate cost = estimate(plan, terrain, casters.casters, light, jobs);
  if (options.json) {
    fmt::print("{}\n", as_json(plan, site, terrain, light, cost, plots, notes).dump());
  } else if (!options.quiet) {
    print_text(plan, site, terrain, light, cost, plots, notes);
  }
}

}  // namespace

Action add_vet(CLI::App& app, CLI::App*& command) {
  auto options = std::make_shared<CommonOptions>();
  command = add_command(app, "vet", "check a plan and its inputs; say what will run, how large, how long",
                        *options);
  return [options] { run_vet(*options); };
}

}  // namespace sunfall

// sunfall map PLAN [--on DIR] [-o DIR]

#include <fmt/format.h>
#include <tbb/global_control.h>

#include <cmath>
#include <cstdio>
#include <memory>
#include <nlohmann/json.hpp>
#include <optional>

#include "app/command_line.h"
#include "app/former_run.h"
#include "app/run_folder.h"
#include "app/terminal_progress.h"
#include "map/finished_run.h"
#include "map/site.h"
#include "map/years.h"
#include "report/write_run.h"
#include "sunfall/error.h"
#include "sunfall/map.h"

namespace sunfall {
namespace {

struct MapCommand {
  CommonOptions common;
  std::filesystem::path folder;
  std::filesystem::path on;  // a finished run whose shares are used; or empty
};

void print_months(const MapResult& maps) {
  fmt::print("Open field, mol m-2 d-1:");
  for (std::size_t m = 0; m < 12; ++m) fmt::print(" {:.1f}", maps.open.beam[m] + maps.open.sky[m]);
  fmt::print("; year {:.1f}\n", maps.open.year);
  if (!has_percentiles(maps.open)) return;
  const std::vector<YearPercentiles> years = percentiles_of(maps.open);
  for (std::size_t i = 0; i < kYearPercents.size(); ++i) {
    fmt::print("  P{} over {} years:      ", kYearPercents[i], maps.open.years.size());
    for (std::size_t m = 0; m < 12; ++m) fmt::print(" {:.1f}", years[m][i]);
    fmt::print("; year {:.1f}\n", years.back()[i]);
  }
}

// Cells without a value are easily overlooked: a whole map of them may mean a surface that counts its
// heights from another zero.
void print_valid(const MapResult& maps) {
  if (maps.valid_fraction >= 1.0) return;
  fmt::print("{:.1f} % of the cells have a value; the others lie under the surface or have no height\n",
             std::floor(1000.0 * maps.valid_fraction) / 10.0);
}

// The finished run that the command names, if it fits the plan and will stay as it is.
std::optional<FinishedRun> finished_run_of(const MapCommand& command, const Plan& plan,
                                           const std::filesystem::path& out) {
  if (command.on.empty()) return std::nullopt;
  std::error_code ignored;
  if (std::filesystem::equivalent(command.on, out, ignored)) {
    throw Error(ErrorKind::plan, {"the new run would take the place of the finished one", "--on",
                                  command.on.string(), "Give the new run a folder of its own with -o"});
  }
  FinishedRun run(command.on);
  run.require_geometry(geometry_of(plan), plan.file.string());
  return run;
}

void run_map(const MapCommand& command) {
  const Plan plan = plan_of(command.common);
  const std::filesystem::path out =
      command.folder.empty() ? std::filesystem::path("outputs") / plan.file.stem() : command.folder;
  require_apart_from_inputs(plan, out);
  const std::optional<FinishedRun> finished = finished_run_of(command, plan, out);
  Site site = site_of(plan);
  const std::vector<Plot> plots = plots_of(plan, site.frame);
  TerminalProgress progress(command.common.quiet);
  RunFolder folder(out);
  MapOptions options;
  options.jobs = command.common.jobs;
  if (!plots.empty()) options.plots = cells_of_plots(plots, site.frame);
  // Left to itself, TBB keeps to the number of cores, and says so on standard error.
  std::optional<tbb::global_control> workers;
  if (options.jobs > 0) {
    workers.emplace(tbb::global_control::max_allowed_parallelism, static_cast<std::size_t>(options.jobs));
  }
  const auto provenance = provenance_of(plan, site);
  MapResult maps;
  if (finished) {
    const OpenField open = open_field(open_years(site.series, plan.periods));
    forget_steps(site);
    maps = make_maps_on(*finished, plan, open, provenance, folder.staging(), options, progress);
  } else {
    const DomeLight light = dome_light_of(plan, site);
    forget_steps(site);
    maps = make_maps(plan, light, provenance, folder.staging(), options, progress);
  }
  write_run(plan, site, maps, plots, folder.staging(), options, progress);
  folder.publish("summary.json", files_of_former_run(out));
  if (command.common.json) {
    const nlohmann::ordered_json line{{"folder", out.string()},
                                      {"summary", (out / "summary.json").string()},
                                      {"layers", maps.layers.size()}};
    fmt::print("{}\n", line.dump());
  } else if (!command.common.quiet) {
    print_months(maps);
    print_valid(maps);
    fmt::print("{} layers, tables and pictures are in {}\n", maps.layers.size(), out.string());
    if (site.series.is_ceiling) fmt::print("This is a cloudless ceiling, not a forecast.\n");
    fmt::print("Notes:\n");
    for (const std::string& note : site.notes) fmt::print("  {}\n", note);
    for (const std::string& note : maps.notes) fmt::print("  {}\n", note);
  }
}

}  // namespace

Action add_map(CLI::App& app, CLI::App*& command) {
  auto options = std::make_shared<MapCommand>();
  command = add_command(app, "map", "make light maps, tables and pictures", options->common);
  command->add_option("-o,--output", options->folder,
                      "the run's folder (default: outputs/NAME of the plan's file)");
  command->add_option("--on", options->on,
                      "folder of a finished run with shares, of the same plan but for its light: geometry is "
                      "taken from there, not solved again");
  return [options] { run_map(*options); };
}

}  // namespace sunfall

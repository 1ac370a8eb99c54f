// How fast light maps are made, in ratios that another machine can be held to:
//   bench_map [--quick | --answers]
// Prints a table of times and the goals; exits 1 where an answer is wrong. A goal that is missed is told
// and no more, because other work on the machine disturbs it.

#include <fmt/format.h>
#include <unistd.h>

#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <exception>
#include <stdexcept>
#include <string_view>

#include "bench/command_part.h"
#include "bench/country.h"
#include "bench/geometry_part.h"
#include "bench/rays_part.h"
#include "map/loss_table.h"
#include "map/scene.h"
#include "sunfall/map.h"

namespace sunfall::bench {
namespace {

struct Extent {
  int main_side = 3200;                      // against the hillshade: ten million cells
  std::vector<int> sides{1024, 2048, 4096};  // cost and memory by size; rays on the first
  int repeats = 3;
  double command_cells = 24e6;  // the whole command is repeated up to about so many
  std::size_t marched_cells = 400;
  std::size_t ray_cells = 16'000;
};

constexpr double kMillion = 1e6;

Extent extent_of(int count, char** words) {
  if (count == 1) return {};
  const std::string_view word = count == 2 ? words[1] : "";
  if (word == "--quick") return {1280, {512, 1024, 1536}, 3, 3e6, 200, 4000};
  if (word == "--answers") return {768, {384}, 1, 0.0, 100, 2000};
  throw std::invalid_argument("usage: bench_map [--quick | --answers]");
}

// A folder of our own under TMPDIR, gone at the end.
class WorkFolder {
 public:
  WorkFolder() {
    std::string pattern = (std::filesystem::temp_directory_path() / "sunfall-bench-XXXXXX").string();
    if (mkdtemp(pattern.data()) == nullptr) throw std::runtime_error("no temporary folder");
    path_ = pattern;
  }
  ~WorkFolder() {
    std::error_code ignored;
    std::filesystem::remove_all(path_, ignored);
  }
  WorkFolder(const WorkFolder&) = delete;
  WorkFolder& operator=(const WorkFolder&) = delete;
  const std::filesystem::path& path() const { return path_; }

 private:
  std::filesystem::path path_;
};

std::string million(double cells) { return fmt::format("{:.1f} million cells", cells / kMillion); }

DomeLight light_of_plan(const oracle::Ground& ground) {
  return make_dome_light(ground.series, Dome::of(ground.plan.dome.quality), ground.plan.dome.sky,
                         ground.plan.periods);
}

// Peaks are read before this process grows; see child.h. Large maps repeat less often.
std::vector<CommandRuns> commands_by_size(const std::vector<Country>& countries, const Extent& extent) {
  std::vector<CommandRuns> all;
  for (const Country& country : countries) {
    const int affordable = static_cast<int>(extent.command_cells / country.cells());
    all.push_back(run_command(country, std::clamp(affordable, 1, extent.repeats)));
    print_times("sunfall map, " + million(country.cells()), all.back().times);
    if (country.side != extent.main_side) std::filesystem::remove_all(all.back().layers);
  }
  return all;
}

void print_memory(const std::vector<CommandRuns>& all, double floor_mib) {
  fmt::print("\n{:<48}{:>8}{:>18}{:>18}\n", "MiB of the whole command", "peak", "vet says", "per cell more");
  for (std::size_t i = 0; i < all.size(); ++i) {
    std::string more;
    if (i > 0) {
      const double cells = all[i].country.cells() - all[i - 1].country.cells();
      more = fmt::format("{:.1f} bytes", (all[i].peak_mib - all[i - 1].peak_mib) * 1048576.0 / cells);
    }
    fmt::print("{:<48}{:>8.0f}{:>18.0f}{:>18}\n", million(all[i].country.cells()), all[i].peak_mib,
               all[i].expected_mib, more);
  }
  fmt::print("Tiles of {0} x {0} cells, one a job. Peaks below {1:.0f} MiB could not have been seen.\n\n",
             MapOptions{}.tile_cells, floor_mib);
}

struct Solved {
  Country country;
  Repeats times;
};

// Geometry and light of a map; of the main one also the answers.
Solved solve_country(const Country& country, const Extent& extent, const CommandRuns* main_runs,
                     Findings& findings) {
  const oracle::Ground ground(read_plan(country.plan()));
  const DomeLight light = light_of_plan(ground);
  std::vector<CellLight> cells = some_cells(ground.terrain.frame(), extent.marched_cells);
  Solved solved{country, {}};
  for (int i = 0; i < extent.repeats; ++i) solved.times.add(geometry_and_light(ground, light, cells));
  print_times("geometry and light, " + million(country.cells()), solved.times);
  if (main_runs) {
    check_layers(*main_runs, cells, findings);
    check_against_march(ground, light, cells, findings);
  }
  return solved;
}

void print_per_cell(const std::vector<Solved>& solved, const std::vector<CommandRuns>& commands) {
  fmt::print("\n{:<48}{:>12}{:>8}{:>16}{:>8}\n", "µs a cell", "solve wall", "CPU", "command wall", "CPU");
  for (const Solved& one : solved) {
    const double cells = one.country.cells();
    for (const CommandRuns& command : commands) {
      if (command.country.side != one.country.side) continue;
      const Cost solve = one.times.middle(), whole = command.times.middle();
      fmt::print("{:<48}{:>12.3f}{:>8.3f}{:>16.3f}{:>8.3f}\n", million(cells), solve.wall_s / cells * 1e6,
                 solve.cpu_s / cells * 1e6, whole.wall_s / cells * 1e6, whole.cpu_s / cells * 1e6);
    }
  }
}

void print_stages(const CommandRuns& runs) {
  fmt::print("\nStages of sunfall map, {}, seconds:", million(runs.country.cells()));
  for (const auto& [stage, seconds] : runs.stages) fmt::print("  {} {:.2f}", stage, seconds);
  fmt::print("\n");
}

// How much more a cell costs in the dearest map than in the cheapest, per cent of CPU time: the least
// of the repetitions, as what other work adds is not ours.
double unevenness(const std::vector<Solved>& solved) {
  double least = HUGE_VAL, most = 0.0;
  for (const Solved& one : solved) {
    const double per_cell = one.times.least().cpu_s / one.country.cells();
    least = std::min(least, per_cell);
    most = std::max(most, per_cell);
  }
  return 100.0 * (most / least - 1.0);
}

// Scaled from the sampled cells to the whole map.
Repeats race(RayRace& rays, const Country& country, const DomeLight& light, Packing packing, int times,
             const std::string& how) {
  const double scale = country.cells() / double(rays.sampled_cells());
  Repeats scaled;
  for (int i = 0; i < times; ++i) {
    const Cost cost = rays.trace(light, packing);
    scaled.add({scale * cost.wall_s, scale * cost.cpu_s});
  }
  print_times("Embree, " + how, scaled);
  return scaled;
}

void race_rays(const Solved& own, const Extent& extent, Findings& findings) {
  const oracle::Ground ground(read_plan(own.country.plan()));
  const DomeLight light = light_of_plan(ground), even = testing::even_sky(light.dome);
  RayRace rays(ground, extent.ray_cells);
  fmt::print(
      "\nThe dome by rays from {} of {}, scaled to all; {} x {} rays a cell, or as many azimuths as\n"
      "the solver looks along ({}); the tree took {:.1f} s and is not counted.\n",
      rays.sampled_cells(), million(own.country.cells()), light.dome.sectors, light.dome.bands,
      looks_of(light).size(), rays.building().wall_s);
  print_times_head();
  const Cost ours = own.times.middle();
  const auto ratio = [&](const Repeats& times) { return times.middle().wall_s / ours.wall_s; };
  // The same dome: as many azimuths as our horizons come from.
  const Repeats same =
      race(rays, own.country, light, Packing::cells, extent.repeats, "our azimuths, 16 cells at a time");
  findings.at_least("(b) Embree over ours, the same azimuths, 16 neighbouring cells at a time", ratio(same),
                    100, 300);
  findings.figure("    the same in CPU time", same.middle().cpu_s / ours.cpu_s);
  findings.figure("    one azimuth a sector",
                  ratio(race(rays, own.country, even, Packing::cells, 1, "one azimuth a sector, 16 cells")));
  rays.check_sky_view(light.dome, findings);
  findings.figure("    one azimuth a sector, 16 rays of one cell at a time",
                  ratio(race(rays, own.country, even, Packing::sector, 1, "16 rays of a cell at a time")));
  findings.figure("    one azimuth a sector, ray by ray",
                  ratio(race(rays, own.country, even, Packing::single, 1, "ray by ray")));
}

}  // namespace

bool run(const Extent& extent) {
  Findings findings;
  fmt::print("{}\n\n", machine_line());
  const WorkFolder folder;
  std::vector<int> sides = extent.sides;
  sides.insert(std::upper_bound(sides.begin(), sides.end(), extent.main_side), extent.main_side);
  const std::vector<Country> countries = countries_in(folder.path(), sides);
  run_apart([&] { write_countries(countries); });
  const auto main_at = std::find(sides.begin(), sides.end(), extent.main_side) - sides.begin();

  print_times_head();
  Hillshade hillshade(countries[main_at]);
  hillshade.run(3);  // spread over the run, as other work comes and goes
  const double floor_mib = own_peak_mib();
  const std::vector<CommandRuns> commands = commands_by_size(countries, extent);
  check_jobs(countries.front(), findings);
  hillshade.run(3);
  print_memory(commands, floor_mib);

  print_times_head();
  std::vector<Solved> solved;
  for (const Country& country : countries) {
    const bool is_main = country.side == extent.main_side;
    solved.push_back(solve_country(country, extent, is_main ? &commands[main_at] : nullptr, findings));
  }
  hillshade.run(3);
  print_times("gdaldem hillshade, " + million(countries[main_at].cells()), hillshade.times());
  print_per_cell(solved, commands);
  print_stages(commands[main_at]);
  race_rays(solved.front(), extent, findings);

  const Cost pass = hillshade.times().middle();
  const Cost solve = solved[main_at].times.middle(), whole = commands[main_at].times.middle();
  fmt::print("\nRatios of middle times, all cores against all cores where a program uses them:\n");
  findings.at_most("(a) geometry and light, in hillshades", solve.wall_s / pass.wall_s, 40, 20);
  findings.figure("    the same in CPU time", solve.cpu_s / pass.cpu_s);
  findings.at_most("(a) whole command, in hillshades", whole.wall_s / pass.wall_s, 90, 50);
  findings.figure("    the same in CPU time", whole.cpu_s / pass.cpu_s);
  double fullest = 0.0;
  for (const CommandRuns& runs : commands)
    fullest = std::max(fullest, 100.0 * runs.peak_mib / runs.expected_mib);
  findings.at_most("(d) peak memory as a part of what vet says, %", fullest, 100, 100);
  findings.at_most("(c) cost of a cell, dearest size of map over cheapest, %", unevenness(solved), 20, 20);
  findings.print();
  fmt::print("{}\n", machine_line());
  return findings.answers_hold();
}

}  // namespace sunfall::bench

int main(int count, char** words) try {
  return sunfall::bench::run(sunfall::bench::extent_of(count, words)) ? 0 : 1;
} catch (const std::invalid_argument& fault) {
  fmt::print(stderr, "{}\n", fault.what());
  return 2;
} catch (const std::exception& fault) {
  fmt::print(stderr, "bench_map: {}\n", fault.what());
  return 1;
}

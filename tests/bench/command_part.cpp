#include "bench/command_part.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <fstream>
#include <nlohmann/json.hpp>

#include "core/fingerprint.h"
#include "geo/layer_writer.h"

namespace sunfall::bench {
namespace {

constexpr double kDliQuantum = 1.0 / 128.0;  // layers are rounded to multiples of it

std::vector<std::string> map_words(const Country& country, const std::filesystem::path& out, int jobs) {
  std::vector<std::string> words{SUNFALL_PROGRAM, "map", country.plan().string(), "-o", out, "--quiet"};
  if (jobs > 0) words.insert(words.end(), {"--jobs", std::to_string(jobs)});
  return words;
}

double expected_memory_mib(const Country& country) {
  const std::filesystem::path told = country.folder / "vet.json";
  run_child({SUNFALL_PROGRAM, "vet", country.plan().string(), "--json"}, told);
  std::ifstream in(told);
  return nlohmann::json::parse(in).at("expected_memory_mib").get<double>();
}

std::vector<std::filesystem::path> layer_files(const std::filesystem::path& folder) {
  std::vector<std::filesystem::path> files;
  for (const auto& entry : std::filesystem::directory_iterator(folder)) {
    if (entry.path().extension() == ".tif") files.push_back(entry.path().filename());
  }
  std::sort(files.begin(), files.end());
  return files;
}

}  // namespace

Hillshade::Hillshade(Country country) : country_(std::move(country)) {
  run(1);
  times_ = {};
}

void Hillshade::run(int times) {
  const std::filesystem::path out = country_.folder / "hillshade.tif";
  for (int i = 0; i < times; ++i) {
    std::filesystem::remove(out);
    times_.add(run_child({"gdaldem", "hillshade", "-q", country_.surface().string(), out.string()}).cost);
  }
}

CommandRuns run_command(const Country& country, int times) {
  CommandRuns runs{country, country.folder / "run", {}, 0.0, expected_memory_mib(country), {}};
  for (int i = 0; i < times; ++i) {
    std::filesystem::remove_all(runs.layers);
    const ChildCost child = run_child(map_words(country, runs.layers, 0));
    runs.times.add(child.cost);
    runs.peak_mib = std::max(runs.peak_mib, child.peak_mib);
  }
  std::ifstream in(runs.layers / "summary.json");
  nlohmann::json::parse(in).at("timings_s").get_to(runs.stages);
  return runs;
}

void check_jobs(const Country& country, Findings& findings) {
  const std::filesystem::path one = country.folder / "one-job", two = country.folder / "two-jobs";
  run_child(map_words(country, one, 1));
  run_child(map_words(country, two, 2));
  const std::vector<std::filesystem::path> files = layer_files(one);
  std::size_t same = 0;
  for (const auto& file : files) same += fingerprint(one / file) == fingerprint(two / file) ? 1 : 0;
  findings.check(files.size() > 12 && same == files.size() && layer_files(two) == files,
                 fmt::format("{} of {} layers have the same bytes for one job and two", same, files.size()));
  std::filesystem::remove_all(one);
  std::filesystem::remove_all(two);
}

void check_layers(const CommandRuns& runs, const std::vector<CellLight>& cells, Findings& findings) {
  std::size_t compared = 0, missing = 0, wrong = 0;
  double most = 0.0;
  for (std::size_t layer = 0; layer < cells.front().dli.size(); ++layer) {
    const bool year = layer + 1 == cells.front().dli.size();
    const std::string name = year ? "dli-year.tif" : fmt::format("dli-{:02}.tif", layer + 1);
    const Grid<float> values = read_layer(runs.layers / name, {0, 0, runs.country.side, runs.country.side});
    for (const CellLight& cell : cells) {
      const float written = values.at(cell.cell.column, cell.cell.row);
      if (!cell.usable || std::isnan(written)) {
        ++missing;
        wrong += cell.usable == std::isnan(written) ? 1 : 0;
        continue;
      }
      const double apart = std::abs(double(written) - cell.dli[layer]);
      ++compared;
      most = std::max(most, apart);
      wrong += apart > 0.5 * kDliQuantum * (1.0 + 1e-6) ? 1 : 0;
    }
  }
  findings.check(wrong == 0 && compared > missing,
                 fmt::format("the command's layers against the solver's numbers: {} values, at most {:.5f} "
                             "mol apart (rounding {:.5f}), {} wrong",
                             compared + missing, most, 0.5 * kDliQuantum, wrong));
}

}  // namespace sunfall::bench

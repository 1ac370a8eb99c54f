// How long thirty years of hours take from file to dome, against reading the file once: by a general reader
// (OGR), by lines, by lines and numbers. The answer is verified in the same run. `--answers` takes three
// years and prints no times.

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>
#include <cstdlib>
#include <ctime>
#include <fstream>
#include <string>
#include <vector>

#include "core/parallel.h"
#include "geo/table_reading.h"
#include "light/station.h"
#include "sunfall/dome.h"

namespace {

using namespace sunfall;

constexpr int kFirstYear = 1991;

struct Cost {
  double wall_s = 1e9;
  double processor_s = 1e9;  // of all cores together: hardly changes with what else the machine does
};

// Best of some runs: what else the machine does only adds.
template <typename Work>
Cost best_of(int runs, const Work& work) {
  Cost best;
  for (int i = 0; i < runs; ++i) {
    const Stopwatch watch;
    const std::clock_t start = std::clock();
    work();
    best.processor_s = std::min(best.processor_s, double(std::clock() - start) / CLOCKS_PER_SEC);
    best.wall_s = std::min(best.wall_s, watch.seconds());
  }
  return best;
}

// A plain line reader: each line of the file, nothing done with it.
std::size_t count_lines(const std::filesystem::path& file) {
  std::ifstream in(file);
  std::string line;
  std::size_t lines = 0;
  while (std::getline(in, line)) ++lines;
  return lines;
}

// The same, with its two numbers taken out.
double sum_values(const std::filesystem::path& file) {
  std::ifstream in(file);
  std::string line;
  double sum = 0.0;
  while (std::getline(in, line)) {
    for (std::size_t at = line.find(','); at != std::string::npos; at = line.find(',', at + 1))
      sum += std::strtod(line.c_str() + at + 1, nullptr);
  }
  return sum;
}

bool near(const char* what, double found, double truth, double part) {
  const bool good = std::abs(found - truth) <= part * truth;
  if (!good) fmt::print(stderr, "{}: {} instead of {}\n", what, found, truth);
  return good;
}

}  // namespace

int main(int count, char** words) {
  const bool answers_only = count > 1 && std::string(words[1]) == "--answers";
  const int years = answers_only ? 3 : 30;
  const Place place = place_at(52.0, 5.0);
  std::string text;
  double truth_mol = 0.0;
  long days = 0;
  for (int k = 0; k < years; ++k) {
    const LightSeries truth = cloudy_truth(place, kFirstYear + k, "+00:00", static_cast<unsigned>(k));
    const std::string year = logged(truth, {.columns = "gd"});
    text += k == 0 ? year : year.substr(year.find('\n') + 1);
    for (const LightStep& step : truth.steps) truth_mol += 6e-4 * global_umol(step);
    days += static_cast<long>(truth.steps.size() / kStepsPerDay);
  }
  const TextFile file(text);
  const SeriesSource source = source_of(file, {.columns = "gd"});
  const Dome dome = Dome::of(DomeQuality::standard);
  LightSeries series;
  DomeLight light;
  const int runs = answers_only ? 1 : 3;
  const Cost series_cost = best_of(runs, [&] { series = light_of(source, place); });
  const Cost dome_cost =
      best_of(runs, [&] { light = make_dome_light(series, dome, SkyModel::clearness, month_periods()); });

  double found_mol = 0.0;
  const std::array<int, 12> month_days = days_of_months(series);
  for (std::size_t month = 0; month < 12; ++month)
    found_mol += (light.beam.open[month] + light.sky.open[month]) * month_days[month];
  double series_mol = 0.0;
  for (const LightStep& step : series.steps) series_mol += 6e-4 * global_umol(step);
  // Hours give back their light to 1 % (light.md), and the dome that of its series to 1e-6 (dome.h).
  const bool good =
      near("light of the series", series_mol / double(days), truth_mol / double(days), 0.01) &&
      near("light of the dome", found_mol, series_mol, 1e-6) &&
      count_lines(file.path()) == static_cast<std::size_t>(days) * 24 + 1 &&
      read_table_by_ogr(file.path()).rows == days * 24 &&
      near("sum of the file by OGR", read_table_by_ogr(file.path()).sum, sum_values(file.path()), 1e-12);
  if (!good) return 1;
  if (answers_only) return 0;
  const Cost lines = best_of(5, [&] { count_lines(file.path()); });
  const Cost values = best_of(5, [&] { sum_values(file.path()); });
  const Cost table = best_of(5, [&] { read_table_by_ogr(file.path()); });
  fmt::print("{} years of hours, {:.1f} MB\n", years, double(text.size()) / 1e6);
  const auto print = [](const char* what, const Cost& cost) {
    fmt::print("{:<24} {:.3f} s, processor {:.3f} s\n", what, cost.wall_s, cost.processor_s);
  };
  print("its lines", lines);
  print("its lines and numbers", values);
  print("its rows by OGR", table);
  print("file to series", series_cost);
  print("series to dome", dome_cost);
  const Cost all{series_cost.wall_s + dome_cost.wall_s, series_cost.processor_s + dome_cost.processor_s};
  const auto against = [&](const char* what, const Cost& cost) {
    fmt::print("file to dome: {:.1f} times {} (processor {:.1f})\n", all.wall_s / cost.wall_s, what,
               all.processor_s / cost.processor_s);
  };
  against("its rows by OGR", table);
  against("its lines", lines);
  against("its lines and numbers", values);
  return 0;
}

#pragma once
// The whole command as a user runs it, and the hillshade that it is measured in.

#include <filesystem>
#include <map>
#include <string>
#include <vector>

#include "bench/child.h"
#include "bench/country.h"
#include "bench/geometry_part.h"

namespace sunfall::bench {

// One pass of gdaldem hillshade over the surface, read from the page cache and written.
class Hillshade {
 public:
  // The first pass only warms the page cache.
  explicit Hillshade(Country country);
  void run(int times);
  const Repeats& times() const { return times_; }

 private:
  Country country_;
  Repeats times_;
};

struct CommandRuns {
  Country country;
  std::filesystem::path layers;  // the last run's folder
  Repeats times;
  double peak_mib = 0.0;
  double expected_mib = 0.0;             // what `sunfall vet` says beforehand
  std::map<std::string, double> stages;  // seconds, of the last run
};
// `sunfall map` with as many jobs as cores.
CommandRuns run_command(const Country& country, int times);

// The same bytes for one job and two.
void check_jobs(const Country& country, Findings& findings);

// The layers hold the solver's own numbers, rounded.
void check_layers(const CommandRuns& runs, const std::vector<CellLight>& cells, Findings& findings);

}  // namespace sunfall::bench

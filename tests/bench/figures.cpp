#include "bench/figures.h"

#include <fmt/format.h>
#include <sys/resource.h>

#include <algorithm>
#include <cstdlib>
#include <fstream>
#include <thread>

namespace sunfall::bench {
namespace {

double seconds(const timeval& time) { return double(time.tv_sec) + 1e-6 * double(time.tv_usec); }

double own_cpu_s() {
  rusage used{};
  getrusage(RUSAGE_SELF, &used);
  return seconds(used.ru_utime) + seconds(used.ru_stime);
}

std::string processor_name() {
  std::ifstream in("/proc/cpuinfo");
  for (std::string line; std::getline(in, line);) {
    if (line.starts_with("model name")) return line.substr(std::min(line.find(':') + 2, line.size()));
  }
  return "unknown processor";
}

std::string bound(const char* word, double goal, double aim) {
  return goal == aim ? fmt::format("{} {:g}", word, goal)
                     : fmt::format("{} {:g} (aim {:g})", word, goal, aim);
}

}  // namespace

Meter::Meter() : begin_(std::chrono::steady_clock::now()), cpu_begin_s_(own_cpu_s()) {}

Cost Meter::cost() const {
  return {std::chrono::duration<double>(std::chrono::steady_clock::now() - begin_).count(),
          own_cpu_s() - cpu_begin_s_};
}

void Repeats::add(const Cost& cost) {
  const auto insert = [](std::vector<double>& sorted, double value) {
    sorted.insert(std::upper_bound(sorted.begin(), sorted.end(), value), value);
  };
  insert(wall_s_, cost.wall_s);
  insert(cpu_s_, cost.cpu_s);
}

Cost Repeats::least() const { return {wall_s_.front(), cpu_s_.front()}; }
Cost Repeats::middle() const { return {wall_s_[wall_s_.size() / 2], cpu_s_[cpu_s_.size() / 2]}; }
Cost Repeats::most() const { return {wall_s_.back(), cpu_s_.back()}; }

void print_times_head() {
  fmt::print("{:<48}{:>8}{:>9}{:>9}{:>11}{:>7}\n", "seconds", "least", "middle", "most", "CPU middle",
             "times");
}

void print_times(const std::string& what, const Repeats& repeats) {
  fmt::print("{:<48}{:>8.3f}{:>9.3f}{:>9.3f}{:>11.3f}{:>7}\n", what, repeats.least().wall_s,
             repeats.middle().wall_s, repeats.most().wall_s, repeats.middle().cpu_s, repeats.count());
  std::fflush(stdout);
}

std::string machine_line() {
  double load[3] = {0.0, 0.0, 0.0};
  if (getloadavg(load, 3) != 3) load[0] = load[1] = load[2] = -1.0;
  return fmt::format("{} cores, {}, load average {:.2f} {:.2f} {:.2f}", std::thread::hardware_concurrency(),
                     processor_name(), load[0], load[1], load[2]);
}

void Findings::check(bool holds, const std::string& what) {
  ++(holds ? held_ : failed_);
  fmt::print("  {}  {}\n", holds ? "right" : "WRONG", what);
  std::fflush(stdout);
}

void Findings::at_most(const std::string& what, double value, double goal_value, double aim) {
  goal(what, value <= goal_value, value <= aim, fmt::format("{:.1f}", value),
       bound("at most", goal_value, aim));
}

void Findings::at_least(const std::string& what, double value, double goal_value, double aim) {
  goal(what, value >= goal_value, value >= aim, fmt::format("{:.0f}", value),
       bound("at least", goal_value, aim));
}

void Findings::figure(const std::string& what, double value) {
  goals_.push_back(fmt::format("{:<62}{:>8.1f}", what, value));
}

void Findings::goal(const std::string& what, bool met, bool aim_met, const std::string& value,
                    const std::string& wanted) {
  goals_.push_back(fmt::format("{:<62}{:>8}   {:<26}{}", what, value, wanted,
                               aim_met ? "aim met"
                               : met   ? "met"
                                       : "MISSED"));
}

void Findings::print() const {
  for (const std::string& line : goals_) fmt::print("{}\n", line);
  fmt::print("{} checks of answers held, {} failed.\n", held_, failed_);
}

}  // namespace sunfall::bench

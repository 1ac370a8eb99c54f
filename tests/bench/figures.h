#pragma once
// What was measured, what was checked, and how both are told.

#include <chrono>
#include <string>
#include <vector>

namespace sunfall::bench {

// Of this process with all its threads, or of a child.
struct Cost {
  double wall_s = 0.0;
  double cpu_s = 0.0;
};

class Meter {
 public:
  Meter();
  Cost cost() const;

 private:
  std::chrono::steady_clock::time_point begin_;
  double cpu_begin_s_;
};

// The same work done several times.
class Repeats {
 public:
  void add(const Cost& cost);
  std::size_t count() const { return wall_s_.size(); }
  // Least, middle and largest, each by itself.
  Cost least() const;
  Cost middle() const;
  Cost most() const;

 private:
  std::vector<double> wall_s_;  // sorted
  std::vector<double> cpu_s_;
};

// One line of the table of times: what, least/middle/most wall time, CPU time, repetitions.
void print_times_head();
void print_times(const std::string& what, const Repeats& repeats);

// "2 cores, AMD EPYC, load 0.12": whoever reads the figures must know what else ran.
std::string machine_line();

// Checks decide the exit status; goals are only told, since a busy machine misses them innocently.
class Findings {
 public:
  void check(bool holds, const std::string& what);
  void at_most(const std::string& what, double value, double goal, double aim);
  void at_least(const std::string& what, double value, double goal, double aim);
  // Without a goal.
  void figure(const std::string& what, double value);
  bool answers_hold() const { return failed_ == 0; }
  // All goals again, at the end, and how many checks held.
  void print() const;

 private:
  void goal(const std::string& what, bool met, bool aim_met, const std::string& value,
            const std::string& wanted);
  int held_ = 0;
  int failed_ = 0;
  std::vector<std::string> goals_;
};

}  // namespace sunfall::bench

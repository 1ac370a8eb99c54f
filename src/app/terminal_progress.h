#pragma once
// Progress for people: a bar with the time left on a terminal, a few plain lines elsewhere. On
// standard error, so that standard output stays for results.

#include <chrono>
#include <string>

#include "sunfall/progress.h"

namespace sunfall {

class TerminalProgress : public Progress {
 public:
  explicit TerminalProgress(bool quiet);
  ~TerminalProgress() override;
  void advance(std::string_view stage, double done) override;
  bool stop_requested() const override;

 private:
  void draw_bar(double done);
  void write_line(double done);

  bool quiet_;
  bool terminal_;
  std::string stage_;
  int shown_ = -1;  // tenths on a terminal line, quarters elsewhere
  bool line_open_ = false;
  std::chrono::steady_clock::time_point begin_;
};

}  // namespace sunfall

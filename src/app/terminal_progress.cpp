#include "app/terminal_progress.h"

#include <fmt/format.h>
#include <unistd.h>

#include <cstdio>

#include "app/interrupt.h"

namespace sunfall {
namespace {

std::string duration_text(double seconds) {
  if (seconds < 90.0) return fmt::format("{:.0f} s", seconds);
  if (seconds < 5400.0) return fmt::format("{:.0f} min", seconds / 60.0);
  return fmt::format("{:.1f} h", seconds / 3600.0);
}

// Nobody may be reading (a closed pipe, a full disk); that is no reason to end the work.
void tell(const std::string& text) { static_cast<void>(std::fputs(text.c_str(), stderr)); }

}  // namespace

TerminalProgress::TerminalProgress(bool quiet) : quiet_(quiet), terminal_(isatty(STDERR_FILENO) != 0) {}

TerminalProgress::~TerminalProgress() {
  if (line_open_) tell("\n");
}

bool TerminalProgress::stop_requested() const { return interrupted(); }

void TerminalProgress::advance(std::string_view stage, double done) {
  if (quiet_) return;
  if (stage != stage_) {
    if (line_open_) tell("\n");
    line_open_ = false;
    stage_ = stage;
    shown_ = -1;
    begin_ = std::chrono::steady_clock::now();
  }
  if (terminal_)
    draw_bar(done);
  else
    write_line(done);
}

void TerminalProgress::draw_bar(double done) {
  const int percent = static_cast<int>(done * 100.0);
  if (percent == shown_) return;
  shown_ = percent;
  const double passed = std::chrono::duration<double>(std::chrono::steady_clock::now() - begin_).count();
  const std::string left =
      done > 0.02 && done < 1.0 ? duration_text(passed / done * (1.0 - done)) + " left" : "";
  const std::string bar(static_cast<std::size_t>(percent) / 4, '#');
  tell(fmt::format("\r{:<22} [{:<25}] {:3} % {:<14}", stage_, bar, percent, left));
  line_open_ = done < 1.0;
  if (!line_open_) tell("\n");  // what is printed next begins on a line of its own
  std::fflush(stderr);
}

void TerminalProgress::write_line(double done) {
  const int quarter = static_cast<int>(done * 4.0);
  if (quarter == shown_ || quarter == 0) return;
  shown_ = quarter;
  tell(fmt::format("{}: {} %\n", stage_, quarter * 25));
}

}  // namespace sunfall

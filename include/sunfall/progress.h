#pragma once
// How long work tells its caller where it is, and how the caller stops it.

#include <functional>
#include <string_view>

namespace sunfall {

class Progress {
 public:
  virtual ~Progress() = default;
  // `done` runs from 0 to 1 within the named stage. Called from one thread at a time.
  virtual void advance(std::string_view stage, double done) = 0;
  // True when the user asked to stop; long work then throws Error(interrupted) at the next step.
  virtual bool stop_requested() const = 0;
};

// Says nothing, never stops.
class SilentProgress : public Progress {
 public:
  void advance(std::string_view, double) override {}
  bool stop_requested() const override { return false; }
};

}  // namespace sunfall

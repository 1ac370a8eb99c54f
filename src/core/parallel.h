#pragma once
// Loops over independent pieces of work on several threads, and what they need besides.

#include <tbb/parallel_for.h>
#include <tbb/task_arena.h>

#include <chrono>
#include <cstddef>
#include <mutex>
#include <string>

#include "sunfall/progress.h"

namespace sunfall {

// Runs work(i) for i in [0, count) on `jobs` threads (0: as many as the machine has). The first
// exception that a piece throws comes out.
template <typename Work>
void on_all_cores(int jobs, std::size_t count, Work work) {
  tbb::task_arena arena(jobs > 0 ? jobs : tbb::task_arena::automatic);
  arena.execute([&] {
    tbb::parallel_for(
        tbb::blocked_range<std::size_t>(0, count, 1),
        [&](const tbb::blocked_range<std::size_t>& range) {
          for (std::size_t i = range.begin(); i < range.end(); ++i) work(i);
        },
        tbb::simple_partitioner());
  });
}

// Tells progress from several threads, one at a time.
class SharedProgress {
 public:
  SharedProgress(Progress& progress, std::string stage, std::size_t total)
      : progress_(progress), stage_(std::move(stage)), total_(total) {}
  void one_done() {
    const std::lock_guard lock(telling_);
    progress_.advance(stage_, double(++done_) / double(total_));
  }

 private:
  Progress& progress_;
  std::string stage_;
  std::size_t total_;
  std::size_t done_ = 0;
  std::mutex telling_;
};

class Stopwatch {
 public:
  double seconds() const {
    return std::chrono::duration<double>(std::chrono::steady_clock::now() - start_).count();
  }

 private:
  std::chrono::steady_clock::time_point start_ = std::chrono::steady_clock::now();
};

}  // namespace sunfall

#pragma once
// Other programs, run to their end and weighed.

#include <filesystem>
#include <functional>
#include <string>
#include <vector>

#include "bench/figures.h"

namespace sunfall::bench {

struct ChildCost {
  Cost cost;
  // Of resident memory. Linux counts in what this process itself ever held (the child begins as its
  // shadow), so children are weighed before this process has grown.
  double peak_mib = 0.0;
};

// Standard output goes to the file, or nowhere. Throws std::runtime_error where it ends badly.
ChildCost run_child(const std::vector<std::string>& words, const std::filesystem::path& output = "/dev/null");

// Does the work in a shadow of this process, so that the memory it takes is not ours. Before any thread
// is started. Throws std::runtime_error where the work throws.
void run_apart(const std::function<void()>& work);

// The most resident memory that this process ever held.
double own_peak_mib();

}  // namespace sunfall::bench

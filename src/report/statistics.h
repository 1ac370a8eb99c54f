#pragma once
// What a plot's cells come to.

#include <cstddef>
#include <vector>

#include "core/quantile.h"
#include "sunfall/grid.h"

namespace sunfall {

struct PlotStatistics {
  std::size_t count = 0;  // of the values that are there
  double mean = kMissing;
  double p10 = kMissing;
  double least = kMissing;
  double most = kMissing;
  // Standard deviation over mean. The cells are the whole plot and no sample of it, so the deviation
  // divides by their number. Missing where the mean is 0.
  double cv = kMissing;
};

// Missing values are left out; nothing left gives missing statistics. P10 is that of core/quantile.h.
// The order of the values does not matter, not even to the last bit.
PlotStatistics statistics(std::vector<float> values);

}  // namespace sunfall

#pragma once
// How a day's diffuse sum is spread over its steps.

#include <span>
#include <vector>

namespace sunfall {

// What a step can hold, all in the same unit.
struct StepShare {
  double shape = 0.0;  // the course that the sky part follows, any scale
  double least = 0.0;  // so that the beam stays within the extraterrestrial
  double most = 0.0;   // the step's global radiation
};

// Sky parts that follow `shape`, stay within [least, most] and sum to `total`. Where the sum of the
// least is more than the total, the least; where that of the most is less, the most.
std::vector<double> spread_sky(std::span<const StepShare> steps, double total);

}  // namespace sunfall

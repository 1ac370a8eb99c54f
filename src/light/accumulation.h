#pragma once
// Energies that a forecast sums up from its start, made into those of single steps.

#include <chrono>
#include <cstdint>
#include <vector>

namespace sunfall {

struct StepEnergies {
  std::vector<double> value;  // of the step that ends at each time; NaN where it cannot be told
  long resets = 0;            // how often the sum began anew
};

// `run_s` tells when each value's forecast began; then a reset is where it changes, and the first value of a
// run counts where it is one step long. Where it is empty, a sum begins anew where it falls by more than a
// file's rounding, and, since a bright first step can hide the end of a dull run, at every time of day at
// which it falls now and then, and at those that continue these evenly round the day. The first value after
// is then taken for that of one step. A value of exactly 0 at a reset is the sum at the start itself, which
// says nothing of the step before.
StepEnergies step_energies(const std::vector<double>& sum, const std::vector<std::int64_t>& time_s,
                           const std::vector<std::int64_t>& run_s, std::chrono::seconds step);

// Whether values rise much more often than they fall, as sums since a start do and the light of single steps,
// which falls as often as it rises, does not.
bool look_accumulated(const std::vector<double>& value);

}  // namespace sunfall

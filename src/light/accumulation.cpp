#include "light/accumulation.h"

#include <algorithm>
#include <cmath>
#include <limits>
#include <map>
#include <numeric>

namespace sunfall {
namespace {

constexpr double kNone = std::numeric_limits<double>::quiet_NaN();
// What a file's rounding may take off a sum: of the sum itself, and of the largest one.
constexpr double kRounding = 0.02;
constexpr double kRoundingOfLargest = 1e-3;
constexpr double kLeastFalls = 0.05;  // of the days that can show one
constexpr double kMoreRises = 1.5;    // runs of three steps rise twice for each fall
constexpr std::int64_t kDay_s = 86400;

// Where a sum begins anew in a file that does not say when its forecasts began.
class Resets {
 public:
  Resets(const std::vector<double>& sum, const std::vector<std::int64_t>& time_s, std::int64_t step_s) {
    for (const double value : sum) largest_ = std::max(largest_, std::isnan(value) ? 0.0 : value);
    struct Count {
      double all = 0.0;
      double falls = 0.0;
    };
    std::map<std::int64_t, Count> counts;
    for (std::size_t i = 1; i < sum.size(); ++i) {
      if (time_s[i] - time_s[i - 1] != step_s || !falls(sum[i - 1], 0.0) || std::isnan(sum[i])) continue;
      Count& count = counts[of_day(time_s[i])];
      ++count.all;
      if (falls(sum[i - 1], sum[i])) ++count.falls;
    }
    for (const auto& [time_of_day_s, count] : counts) {
      if (count.falls < std::max(3.0, kLeastFalls * count.all)) continue;
      if (period_s_ == 0) {
        first_s_ = time_of_day_s;
        period_s_ = kDay_s;
      }
      period_s_ = std::gcd(period_s_, time_of_day_s - first_s_);
    }
  }
  bool at(std::int64_t time_s) const { return period_s_ > 0 && of_day(time_s - first_s_) % period_s_ == 0; }
  bool falls(double before, double now) const {
    return before - now > std::max(kRounding * before, kRoundingOfLargest * largest_);
  }

 private:
  static std::int64_t of_day(std::int64_t time_s) { return ((time_s % kDay_s) + kDay_s) % kDay_s; }

  double largest_ = 0.0;
  std::int64_t first_s_ = 0;
  std::int64_t period_s_ = 0;
};

}  // namespace

StepEnergies step_energies(const std::vector<double>& sum, const std::vector<std::int64_t>& time_s,
                           const std::vector<std::int64_t>& run_s, std::chrono::seconds step) {
  const std::int64_t step_s = step.count();
  const bool runs_known = !run_s.empty();
  const Resets resets(runs_known ? std::vector<double>{} : sum, time_s, step_s);
  StepEnergies energies;
  energies.value.assign(sum.size(), kNone);
  for (std::size_t i = 0; i < sum.size(); ++i) {
    const bool follows = i > 0 && time_s[i] - time_s[i - 1] == step_s;
    const bool anew = runs_known ? i == 0 || run_s[i] != run_s[i - 1]
                                 : resets.at(time_s[i]) || (i > 0 && resets.falls(sum[i - 1], sum[i]));
    if (anew) {
      if (i > 0) ++energies.resets;
      const bool one_step =
          runs_known ? time_s[i] - run_s[i] == step_s : sum[i] != 0.0 && (follows || i == 0);
      if (one_step) energies.value[i] = sum[i];
    } else if (follows) {
      energies.value[i] = std::max(0.0, sum[i] - sum[i - 1]);
      // max() hides a NaN that stands on its right.
      if (std::isnan(sum[i]) || std::isnan(sum[i - 1])) energies.value[i] = kNone;
    }
  }
  return energies;
}

bool look_accumulated(const std::vector<double>& value) {
  double rises = 0.0;
  double falls = 0.0;
  for (std::size_t i = 1; i < value.size(); ++i) {
    if (value[i] > value[i - 1]) ++rises;
    if (value[i] < value[i - 1]) ++falls;
  }
  return rises > kMoreRises * falls;
}

}  // namespace sunfall

#include "light/varied_days.h"

#include <algorithm>
#include <cmath>
#include <numeric>

namespace sunfall {
namespace {

constexpr double kLeastVaried = 0.02;
constexpr double kMostVaried = 0.95;
constexpr double kSteepest = 1e4;  // so steep that all days stand at a bound

// Raises the slope until `mean_at(slope)`, which grows with it, is the mean.
template <typename MeanAt>
double slope_of(double mean, const MeanAt& mean_at) {
  double low = -kSteepest;
  double high = kSteepest;
  for (int round = 0; round < 100; ++round) {
    const double middle = 0.5 * (low + high);
    (mean_at(middle) < mean ? low : high) = middle;
  }
  return high;
}

// The distribution's own mean.
double mean_of(const ClearnessSpread& spread) {
  const double width = spread.most - spread.least;
  const double x = spread.slope;
  if (std::abs(x) < 1e-3) return spread.least + width * (0.5 + x / 12.0);
  // 1 / (1 − exp(−x)) − 1/x, for either sign without overflow.
  const double part = x > 0.0 ? 1.0 / -std::expm1(-x) - 1.0 / x : std::exp(x) / std::expm1(x) - 1.0 / x;
  return spread.least + width * part;
}

}  // namespace

double ClearnessSpread::quantile(double rank) const {
  const double width = most - least;
  if (std::abs(slope) < 1e-9) return least + width * rank;
  if (slope > 0.0) return most + width * std::log(rank + (1.0 - rank) * std::exp(-slope)) / slope;
  return least + width * std::log1p(rank * std::expm1(slope)) / slope;
}

ClearnessSpread clearness_bounds(double mean) {
  const double held = std::max(mean, 0.2);
  double most = 0.6313 + 0.267 * held - 11.9 * std::pow(held - 0.75, 8);
  if (mean > 0.8) most = std::max(most, mean + 0.25 * (1.0 - mean));
  return {std::min(0.05, 0.5 * mean), most};
}

ClearnessSpread clearness_spread(double mean) {
  ClearnessSpread spread = clearness_bounds(mean);
  spread.slope = slope_of(mean, [&](double slope) { return mean_of({spread.least, spread.most, slope}); });
  return spread;
}

ClearnessMaker::ClearnessMaker(int seed, double persistence)
    : random_(static_cast<std::uint64_t>(seed)), persistence_(persistence), state_(normal()) {}

double ClearnessMaker::uniform() { return (static_cast<double>(random_() >> 12) + 0.5) * 0x1p-52; }

double ClearnessMaker::normal() {
  double sum = -6.0;
  for (int i = 0; i < 12; ++i) sum += uniform();
  return sum;
}

std::vector<double> ClearnessMaker::month(double mean, std::span<const double> above_air) {
  const std::size_t days = above_air.size();
  std::vector<double> moods(days);
  const double fresh = std::sqrt(1.0 - persistence_ * persistence_);
  for (double& mood : moods) mood = state_ = persistence_ * state_ + fresh * normal();
  std::vector<double> jitter(days);
  for (double& part : jitter) part = uniform();

  const double sum = std::accumulate(above_air.begin(), above_air.end(), 0.0);
  if (mean < kLeastVaried || mean > kMostVaried || sum <= 0.0) return std::vector<double>(days, mean);

  std::vector<std::size_t> order(days);
  std::iota(order.begin(), order.end(), std::size_t{0});
  std::stable_sort(order.begin(), order.end(),
                   [&](std::size_t a, std::size_t b) { return moods[a] < moods[b]; });
  std::vector<double> rank(days);
  for (std::size_t place = 0; place < days; ++place) {
    rank[order[place]] = (static_cast<double>(place) + jitter[place]) / static_cast<double>(days);
  }

  // The month's own slope, a little off the distribution's, meets the mean exactly within the bounds.
  ClearnessSpread spread = clearness_bounds(mean);
  const auto mean_at = [&](double slope) {
    spread.slope = slope;
    double light = 0.0;
    for (std::size_t day = 0; day < days; ++day) light += above_air[day] * spread.quantile(rank[day]);
    return light / sum;
  };
  spread.slope = slope_of(mean, mean_at);
  std::vector<double> clearness(days);
  for (std::size_t day = 0; day < days; ++day) clearness[day] = spread.quantile(rank[day]);
  return clearness;
}

}  // namespace sunfall

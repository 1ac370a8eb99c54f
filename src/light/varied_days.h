#pragma once
// Days that vary about a month's mean clearness.

#include <cstdint>
#include <random>
#include <span>
#include <vector>

namespace sunfall {

// Clearness of the days of a month: between `least` and `most` with the density that grows or falls as
// exp(γ K), Bendt, Collares-Pereira and Rabl (1981), Solar Energy 27:1-5.
struct ClearnessSpread {
  double least = 0.05;
  double most = 0.8;
  double slope = 0.0;  // γ (most − least)

  // The clearness that a part `rank` of the days stays below, 0 < rank < 1.
  double quantile(double rank) const;
};

// The bounds for a month's mean clearness, with no slope yet. 0.05 and 0.6313 + 0.267 K − 11.9 (K − 0.75)^8
// (Hollands and Huget 1983), published for means of 0.3 to 0.7. Below 0.2 the upper bound is held and the
// lower is at most half the mean; above 0.8 the upper is at least a quarter of the way from the mean to 1.
ClearnessSpread clearness_bounds(double mean);

// The same with the slope that gives the mean: γ by
// mean = [(least − 1/γ) exp(γ least) − (most − 1/γ) exp(γ most)] / [exp(γ least) − exp(γ most)].
ClearnessSpread clearness_spread(double mean);

// Makes month after month. Equal seeds make equal days on any machine: the engine's numbers are fixed by the
// C++ standard, and the order of days follows from sums and products of them alone.
class ClearnessMaker {
 public:
  // `persistence`: correlation of a day's rank with that of the day before (0.29 in Graham, Hollands and Unny
  // 1988, Solar Energy 40:83; from memory), carried from month to month.
  ClearnessMaker(int seed, double persistence);

  // Clearness of the days of a month whose light above the air is given, so that their light sums to `mean`
  // times its sum. One day falls in each of as many equal parts of the distribution as there are days, at
  // random within it. Means below 0.02 and above 0.95 leave no room: all days are alike.
  std::vector<double> month(double mean, std::span<const double> above_air);

 private:
  double uniform();  // between 0 and 1, neither of them
  double normal();   // near enough for an order of days: twelve uniforms less six

  std::mt19937_64 random_;
  double persistence_;
  double state_;
};

}  // namespace sunfall

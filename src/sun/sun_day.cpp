#include <algorithm>
#include <cmath>
#include <numbers>
#include <optional>
#include <vector>

#include "sun/ephemeris.h"
#include "sun/observer.h"
#include "sunfall/sun.h"

namespace sunfall {
namespace {

constexpr double kDay_s = 86400.0;
constexpr double kScan_s = 600.0;
constexpr double kPrecision_s = 0.01;

// How far the sun stands above the threshold, radians, as a function of time.
class Height {
 public:
  Height(const SunPath& path, const Observer& observer, Angle threshold)
      : path_(path), observer_(observer), threshold_rad_(threshold.radians()) {}

  double operator()(double unix_s) const {
    return elevation(observer_.geometric(path_.at(unix_s), unix_s)).radians() - threshold_rad_;
  }

 private:
  const SunPath& path_;
  const Observer& observer_;
  double threshold_rad_;
};

double bisect(const Height& height, double low_s, double high_s) {
  const bool rising = height(low_s) < 0.0;
  while (high_s - low_s > kPrecision_s) {
    const double middle_s = 0.5 * (low_s + high_s);
    ((height(middle_s) < 0.0) == rising ? low_s : high_s) = middle_s;
  }
  return 0.5 * (low_s + high_s);
}

// The highest (sign 1) or lowest (sign -1) moment between two times with one extremum between them.
double extremum(const Height& height, double low_s, double high_s, double sign) {
  while (high_s - low_s > kPrecision_s) {
    const double third = (high_s - low_s) / 3.0;
    if (sign * height(low_s + third) < sign * height(high_s - third)) {
      low_s += third;
    } else {
      high_s -= third;
    }
  }
  return 0.5 * (low_s + high_s);
}

// Times between which the height is monotone: a scan, and the extrema between its samples, so that
// a sun that shows itself for a minute at polar noon is not missed.
std::vector<double> monotone_knots(const Height& height, double begin_s) {
  std::vector<double> knots;
  for (double t = begin_s; t <= begin_s + kDay_s; t += kScan_s) {
    const double here = height(t);
    const double before = height(t - kScan_s);
    const double after = height(t + kScan_s);
    if (here > before && here >= after) {
      knots.push_back(extremum(height, t - kScan_s, t + kScan_s, 1.0));
    } else if (here < before && here <= after) {
      knots.push_back(extremum(height, t - kScan_s, t + kScan_s, -1.0));
    }
    knots.push_back(t);
  }
  for (double& knot : knots) knot = std::clamp(knot, begin_s, begin_s + kDay_s);
  std::sort(knots.begin(), knots.end());
  return knots;
}

struct Crossings {
  std::vector<double> rises_s;
  std::vector<double> sets_s;
};

Crossings find_crossings(const Height& height, double begin_s) {
  Crossings found;
  const std::vector<double> knots = monotone_knots(height, begin_s);
  for (std::size_t i = 0; i + 1 < knots.size(); ++i) {
    const bool up_before = height(knots[i]) >= 0.0;
    const bool up_after = height(knots[i + 1]) >= 0.0;
    if (up_before == up_after) continue;
    (up_after ? found.rises_s : found.sets_s).push_back(bisect(height, knots[i], knots[i + 1]));
  }
  return found;
}

// The meridian passage nearest to a time: the hour angle is linear to seconds, so a few corrections
// settle it.
double transit_near(const SunPath& path, const Observer& observer, double unix_s) {
  constexpr double seconds_a_radian = kDay_s / (2.0 * std::numbers::pi);
  for (int i = 0; i < 4; ++i) unix_s -= observer.hour_angle_rad(path.at(unix_s), unix_s) * seconds_a_radian;
  return unix_s;
}

UtcTime to_time(double unix_s) { return UtcTime{std::chrono::seconds{std::llround(unix_s)}}; }

// Rise before the transit where the date has one, else any of the date, else the date's begin.
double chosen_rise(const std::vector<double>& rises_s, double transit_s, double begin_s) {
  if (rises_s.empty()) return begin_s;
  const auto later = std::upper_bound(rises_s.begin(), rises_s.end(), transit_s);
  return later == rises_s.begin() ? rises_s.front() : *(later - 1);
}

// Set after the transit where the date has one, else any of the date, else the date's end.
double chosen_set(const std::vector<double>& sets_s, double transit_s, double begin_s) {
  if (sets_s.empty()) return begin_s + kDay_s;
  const auto later = std::upper_bound(sets_s.begin(), sets_s.end(), transit_s);
  return later == sets_s.end() ? sets_s.back() : *later;
}

}  // namespace

SunDay sun_day(Date date, std::chrono::seconds utc_offset, const Place& place, Angle threshold) {
  const UtcTime begin = std::chrono::sys_days{date} - utc_offset;
  // A day more on either side: the scan and the transit may look over the date's edges.
  const SunPath path(begin - std::chrono::days{1}, begin + std::chrono::days{2});
  const Observer observer(place);
  const Height height(path, observer, threshold);
  const double begin_s = unix_seconds(begin);

  SunDay day;
  const double transit_s = transit_near(path, observer, begin_s + 0.5 * kDay_s);
  day.transit = to_time(transit_s);
  const Crossings crossings = find_crossings(height, begin_s);
  if (crossings.rises_s.empty() && crossings.sets_s.empty()) {
    day.kind = height(begin_s) >= 0.0 ? SunDay::Kind::always_up : SunDay::Kind::never_up;
    return day;
  }
  day.rise = to_time(chosen_rise(crossings.rises_s, transit_s, begin_s));
  day.set = to_time(chosen_set(crossings.sets_s, transit_s, begin_s));
  return day;
}

}  // namespace sunfall

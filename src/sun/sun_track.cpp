#include <algorithm>
#include <array>
#include <cmath>

#include "sun/ephemeris.h"
#include "sun/observer.h"
#include "sun/positive_mean.h"
#include "sunfall/sun.h"

namespace sunfall {
namespace {

// Within 20 minutes the sine of the elevation is a parabola to 3e-8.
constexpr double kLongestParabola_s = 1200.0;

struct Sighting {
  const SunPath& path;
  const Observer& observer;

  SkyDirection at(double unix_s) const { return observer.geometric(path.at(unix_s), unix_s); }
};

// Mean of max(0, sine) over a step of which the sines at both edges are known.
double mean_sine_of_step(const Sighting& sighting, double begin_s, double step_s, double first, double last) {
  const int parts = std::max(1, static_cast<int>(std::ceil(step_s / kLongestParabola_s)));
  const double part_s = step_s / parts;
  double sum = 0.0;
  double left = first;
  for (int i = 0; i < parts; ++i) {
    const double part_begin_s = begin_s + i * part_s;
    const double middle = sighting.at(part_begin_s + 0.5 * part_s).up;
    const double right = i + 1 == parts ? last : sighting.at(part_begin_s + part_s).up;
    sum += positive_mean(left, middle, right);
    left = right;
  }
  return sum / parts;
}

}  // namespace

SunTrack sun_track(UtcTime begin, std::chrono::seconds step, std::size_t count, const Place& place) {
  SunTrack track;
  track.begin = begin;
  track.step = step;
  track.edges.reserve(count + 1);
  track.mean_sine.reserve(count);
  track.normal_w_m2.reserve(count);
  const SunPath path(begin, begin + step * static_cast<long long>(count));
  const Observer observer(place);
  const Sighting sighting{path, observer};
  const double begin_s = unix_seconds(begin);
  const auto step_s = static_cast<double>(step.count());

  SkyDirection left = sighting.at(begin_s);
  track.edges.push_back(observer.apparent(left));
  for (std::size_t i = 0; i < count; ++i) {
    const double step_begin_s = begin_s + static_cast<double>(i) * step_s;
    const SkyDirection right = sighting.at(step_begin_s + step_s);
    track.edges.push_back(observer.apparent(right));
    track.mean_sine.push_back(
        static_cast<float>(mean_sine_of_step(sighting, step_begin_s, step_s, left.up, right.up)));
    track.normal_w_m2.push_back(
        static_cast<float>(extraterrestrial_normal_w_m2(path.at(step_begin_s + 0.5 * step_s).distance_au)));
    left = right;
  }
  return track;
}

double extraterrestrial_daily_mj_m2(Date date, std::chrono::seconds utc_offset, const Place& place) {
  constexpr std::chrono::seconds step{600};
  constexpr std::size_t steps_a_day = 144;
  const UtcTime begin = std::chrono::sys_days{date} - utc_offset;
  const SunTrack track = sun_track(begin, step, steps_a_day, place);
  double sum_j_m2 = 0.0;
  for (std::size_t i = 0; i < track.size(); ++i) {
    sum_j_m2 += static_cast<double>(track.mean_sine[i]) * track.normal_w_m2[i] * step.count();
  }
  return sum_j_m2 * 1e-6;
}

}  // namespace sunfall

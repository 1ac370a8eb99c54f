#include <algorithm>
#include <array>
#include <cmath>

#include "core/parallel.h"
#include "sun/ephemeris.h"
#include "sun/observer.h"
#include "sun/positive_mean.h"
#include "sunfall/sun.h"

namespace sunfall {
namespace {

// Within 20 minutes the sine of the elevation is a parabola to 3e-8.
constexpr double kLongestParabola_s = 1200.0;

// Between four edges 10 minutes apart a cubic gives the middle's sine to 9/384·(2π·600/86400)⁴ = 8e-8, 5e-6
// degrees.
constexpr double kLongestCubic_s = 600.0;

constexpr std::size_t kBlock = 4096;
// use(i) for i in [0, count), in blocks on all cores.
template <typename Use>
void on_all_blocks(std::size_t count, const Use& use) {
  on_all_cores(0, (count + kBlock - 1) / kBlock, [&](std::size_t block) {
    const std::size_t end = std::min(count, (block + 1) * kBlock);
    for (std::size_t i = block * kBlock; i < end; ++i) use(i);
  });
}

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
  track.edges.resize(count + 1);
  track.mean_sine.resize(count);
  track.normal_w_m2.resize(count);
  const SunPath path(begin, begin + step * static_cast<long long>(count));
  const Observer observer(place);
  const Sighting sighting{path, observer};
  const double begin_s = unix_seconds(begin);
  const auto step_s = static_cast<double>(step.count());
  const auto time_of = [&](std::size_t edge) { return begin_s + static_cast<double>(edge) * step_s; };

  // Every value is a function of its own time, or of its neighbours' in `sine`: blocks may come in any order.
  std::vector<double> sine(count + 1);
  on_all_blocks(count + 1, [&](std::size_t edge) {
    const SkyDirection geometric = sighting.at(time_of(edge));
    sine[edge] = geometric.up;
    track.edges[edge] = observer.apparent(geometric);
  });
  on_all_blocks(count, [&](std::size_t i) {
    const bool between = step_s <= kLongestCubic_s && i > 0 && i + 2 < sine.size();
    const double mean =
        between ? positive_mean(sine[i], (9.0 * (sine[i] + sine[i + 1]) - sine[i - 1] - sine[i + 2]) / 16.0,
                                sine[i + 1])
                : mean_sine_of_step(sighting, time_of(i), step_s, sine[i], sine[i + 1]);
    track.mean_sine[i] = static_cast<float>(mean);
    track.normal_w_m2[i] =
        static_cast<float>(extraterrestrial_normal_w_m2(path.distance_au(time_of(i) + 0.5 * step_s)));
  });
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

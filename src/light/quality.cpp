#include "light/quality.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

#include "light/radiation_limits.h"

namespace sunfall {
namespace {

constexpr std::int64_t kStuckFor_s = 3 * 3600;
// Lower values stay the same for hours under a thick overcast, as far as a logger can tell.
constexpr double kStuckFrom_w_m2 = 20.0;
// The thickest clouds pass some hundredths (Nollas, Salazar and Gueymard 2023 set a floor of that order).
constexpr double kDarkestClearness = 0.005;
constexpr double kDarkFrom_w_m2 = 200.0;  // above the air: a sun some 9 degrees high

void reject(Readings& readings, std::size_t i) {
  for (auto& value : readings.value) {
    if (!value.empty()) value[i] = std::numeric_limits<float>::quiet_NaN();
  }
}

double value_w(const Readings& readings, std::size_t quantity, std::size_t i, double watts) {
  return readings.has(quantity) ? readings.value[quantity][i] * watts
                                : std::numeric_limits<double>::quiet_NaN();
}

// Comparisons with NaN are false: a quantity that is missing exceeds nothing.
bool exceeds(double value, double least, double most) { return value < least || value > most; }

bool is_open(double global_w, double diffuse_w, double beam_w, const IntervalSun& sun) {
  const double sum_w = diffuse_w + beam_w * sun.beam_sine;
  if (sum_w > kClosureFrom_w_m2 && std::abs(global_w / sum_w - 1.0) > closure_tolerance(sun.sine))
    return true;
  return global_w > kClosureFrom_w_m2 && diffuse_w / global_w > most_diffuse_over_global(sun.sine);
}

void judge_one(Readings& readings, std::size_t i, const IntervalSun& sun, double watts, QualityTally& tally) {
  const double normal_w = sun.level_w / sun.sine;
  const double global_w = value_w(readings, kGlobal, i, watts);
  const double diffuse_w = value_w(readings, kDiffuse, i, watts);
  const double beam_w = value_w(readings, kBeam, i, watts);
  if (std::isnan(global_w) && std::isnan(diffuse_w) && std::isnan(beam_w)) return;
  ++tally.judged;
  const RadiationLimits most = physically_possible(sun.sine, normal_w);
  if (exceeds(global_w, kLeastPossible_w_m2, most.global) ||
      exceeds(diffuse_w, kLeastPossible_w_m2, most.diffuse) ||
      exceeds(beam_w, kLeastPossible_w_m2, most.beam_normal)) {
    ++tally.impossible;
    reject(readings, i);
    return;
  }
  if (is_open(global_w, diffuse_w, beam_w, sun)) {
    ++tally.open;
    reject(readings, i);
    return;
  }
  const RadiationLimits rare = extremely_rare(sun.sine, normal_w);
  if (global_w > rare.global || diffuse_w > rare.diffuse || beam_w > rare.beam_normal) ++tally.rare;
}

// Journée and Bertrand (2011), Solar Energy 85:72-86, step test: how far a quantity over its extraterrestrial
// may move between readings, for a sun above 2 degrees. The figures are from memory. Made for means of 10
// minutes; the edge of a cloud moves minutes farther.
constexpr double kMostStep[kQuantities] = {0.75, 0.35, 0.65};  // global, diffuse, beam
constexpr std::int64_t kStepFrom_s = 600;
constexpr std::int64_t kStepTo_s = 3600;  // over longer ones the sun itself moves far
constexpr double kStepSine = 0.0349;

// A step alone does not tell which of two readings is wrong. One that lies beyond it from both neighbours, to
// one side, is.
bool is_spike(const Readings& readings, const std::vector<IntervalSun>& suns, std::size_t i, double watts) {
  const std::int64_t step_s = readings.step.count();
  if (readings.begin_s[i] - readings.begin_s[i - 1] != step_s ||
      readings.begin_s[i + 1] - readings.begin_s[i] != step_s) {
    return false;
  }
  for (std::size_t q = 0; q < kQuantities; ++q) {
    if (!readings.has(q)) continue;
    const auto part = [&](std::size_t at) {
      const double above_air_w = q == kBeam ? suns[at].level_w / suns[at].sine : suns[at].level_w;
      return suns[at].sine > kStepSine ? readings.value[q][at] * watts / above_air_w
                                       : std::numeric_limits<double>::quiet_NaN();
    };
    const double from_before = part(i) - part(i - 1);
    const double from_after = part(i) - part(i + 1);
    if (std::min(from_before, from_after) > kMostStep[q] || std::max(from_before, from_after) < -kMostStep[q])
      return true;
  }
  return false;
}

long reject_spikes(Readings& readings, const std::vector<IntervalSun>& suns, double watts) {
  if (readings.step.count() < kStepFrom_s || readings.step.count() > kStepTo_s) return 0;
  std::vector<std::size_t> spikes;
  for (std::size_t i = 1; i + 1 < readings.size(); ++i) {
    if (is_spike(readings, suns, i, watts)) spikes.push_back(i);
  }
  for (const std::size_t i : spikes) reject(readings, i);
  return static_cast<long>(spikes.size());
}

// The quantity that tells most about a sensor's health.
const std::vector<float>& leading(const Readings& readings) {
  return readings.value[readings.has(kGlobal) ? kGlobal : kDiffuse];
}

// Rejects the runs of at least three hours, and four readings, in which `belongs(i, first)` holds throughout.
template <typename Belongs>
long reject_runs(Readings& readings, const Belongs& belongs) {
  const std::int64_t step_s = readings.step.count();
  const auto least = static_cast<std::size_t>(std::max<std::int64_t>(4, kStuckFor_s / step_s));
  long rejected = 0;
  for (std::size_t first = 0; first < readings.size();) {
    std::size_t end = first;
    while (end < readings.size() && belongs(end, first) &&
           (end == first || readings.begin_s[end] - readings.begin_s[end - 1] == step_s)) {
      ++end;
    }
    if (end - first >= least) {
      for (std::size_t i = first; i < end; ++i) reject(readings, i);
      rejected += static_cast<long>(end - first);
    }
    first = std::max(end, first + 1);
  }
  return rejected;
}

}  // namespace

QualityTally judge(Readings& readings, const std::vector<IntervalSun>& suns, double watts) {
  QualityTally tally;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (suns[i].sine > 0.0F) judge_one(readings, i, suns[i], watts, tally);
  }
  tally.spikes = reject_spikes(readings, suns, watts);
  const std::vector<float>& value = leading(readings);
  tally.stuck = reject_runs(readings, [&](std::size_t i, std::size_t first) {
    return value[i] == value[first] && value[i] * watts > kStuckFrom_w_m2 && suns[i].level_w > 0.0F;
  });
  tally.dark = reject_runs(readings, [&](std::size_t i, std::size_t) {
    return value[i] * watts < kDarkestClearness * suns[i].level_w && suns[i].level_w > kDarkFrom_w_m2;
  });
  return tally;
}

std::string QualityTally::notes() const {
  std::string text;
  const auto add = [&](long count, const char* words) {
    if (count > 0) text += fmt::format("{}{} {}", text.empty() ? "" : ", ", count, words);
  };
  add(impossible, "beyond what is physically possible");
  add(open, "whose parts do not sum to the whole");
  add(spikes, "that jump away from both neighbours");
  add(stuck, "from a sensor that stood still");
  add(dark, "dark by day");
  if (text.empty() && rare == 0) return "";
  std::string all = fmt::format("of {} readings by day", judged);
  all += text.empty() ? " none was rejected" : " these were rejected: " + text;
  if (rare > 0) all += fmt::format("; {} extremely rare ones were kept", rare);
  return all + " (limits after Long and Shi 2008" +
         (spikes > 0 ? ", steps after Journée and Bertrand 2011)" : ")");
}

}  // namespace sunfall

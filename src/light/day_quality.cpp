#include "light/day_quality.h"

#include <fmt/format.h>

#include <cmath>
#include <limits>

#include "light/radiation_limits.h"

namespace sunfall {
namespace {

constexpr double kDay_s = 86400.0;
constexpr double kTwilight_w_m2 = 0.05e6 / kDay_s;  // frost on an instrument, twilight, rounding
constexpr double kDarkestClearness = 0.005;         // the thickest clouds pass some hundredths
constexpr double kDarkFrom_w_m2 = 5e6 / kDay_s;
constexpr std::size_t kStuckDays = 5;
constexpr double kStuckFrom_w_m2 = 1e6 / kDay_s;
// The looser of the hourly bounds: a day holds a low sun too.
constexpr double kClosure = 0.15;
constexpr double kMostDiffuse = 1.10;

class DayJudge {
 public:
  DayJudge(Readings& readings, const std::vector<IntervalSun>& suns, double watts)
      : readings_(readings), suns_(suns), watts_(watts) {}

  DayTally judge() {
    for (std::size_t i = 0; i < readings_.size(); ++i) {
      if (is_known(i)) ++tally_.days;
    }
    reject_stuck();
    for (std::size_t i = 0; i < readings_.size(); ++i) {
      if (is_impossible(i)) {
        reject(i, tally_.impossible);
      } else if (is_open(i)) {
        reject(i, tally_.open);
      } else if (value_w(leading(), i) < kDarkestClearness * suns_[i].level_w &&
                 suns_[i].level_w > kDarkFrom_w_m2) {
        reject(i, tally_.dark);
      }
    }
    return tally_;
  }

 private:
  // NaN where the file has none; comparisons with NaN are false.
  double value_w(std::size_t quantity, std::size_t i) const {
    return readings_.has(quantity) ? readings_.value[quantity][i] * watts_
                                   : std::numeric_limits<double>::quiet_NaN();
  }
  std::size_t leading() const { return readings_.has(kGlobal) ? kGlobal : kDiffuse; }
  bool is_known(std::size_t i) const {
    return !std::isnan(value_w(kGlobal, i)) || !std::isnan(value_w(kDiffuse, i)) ||
           !std::isnan(value_w(kBeam, i));
  }
  void reject(std::size_t i, long& count) {
    for (auto& value : readings_.value) {
      if (!value.empty()) value[i] = std::numeric_limits<float>::quiet_NaN();
    }
    ++count;
  }

  bool is_impossible(std::size_t i) const {
    const double most_w = suns_[i].level_w + kTwilight_w_m2;
    const double diffuse_w = value_w(kDiffuse, i);
    const double beam_level_w = value_w(kBeam, i) * suns_[i].beam_sine;
    for (const double watts : {value_w(kGlobal, i), diffuse_w, value_w(kBeam, i)}) {
      if (watts < kLeastPossible_w_m2) return true;
    }
    return value_w(kGlobal, i) > most_w || diffuse_w > most_w || beam_level_w > most_w ||
           beam_level_w + diffuse_w > most_w;
  }
  bool is_open(std::size_t i) const {
    const double global_w = value_w(kGlobal, i);
    const double diffuse_w = value_w(kDiffuse, i);
    const double sum_w = diffuse_w + value_w(kBeam, i) * suns_[i].beam_sine;
    if (sum_w > kClosureFrom_w_m2 && std::abs(global_w / sum_w - 1.0) > kClosure) return true;
    return global_w > kClosureFrom_w_m2 && diffuse_w > kMostDiffuse * global_w;
  }

  void reject_stuck() {
    const std::vector<float> value = readings_.value[leading()];
    for (std::size_t first = 0; first < value.size();) {
      std::size_t end = first + 1;
      while (end < value.size() && value[end] == value[first]) ++end;
      if (end - first >= kStuckDays && value[first] * watts_ > kStuckFrom_w_m2) {
        for (std::size_t i = first; i < end; ++i) reject(i, tally_.stuck);
      }
      first = end;
    }
  }

  Readings& readings_;
  const std::vector<IntervalSun>& suns_;
  double watts_;
  DayTally tally_;
};

}  // namespace

std::string DayTally::note() const {
  std::string text;
  const auto add = [&](long count, const std::string& words) {
    if (count > 0) text += fmt::format("{}{} {}", text.empty() ? "" : ", ", count, words);
  };
  add(impossible, "negative or brighter than the sun above the air");
  add(open, "whose parts do not sum to the whole");
  add(dark, "dark");
  add(stuck, fmt::format("in runs of {} or more with the same value", kStuckDays));
  return text.empty() ? "" : fmt::format("of {} days these were rejected: {}", days, text);
}

DayTally judge_days(Readings& readings, const std::vector<IntervalSun>& suns, double watts) {
  return DayJudge(readings, suns, watts).judge();
}

}  // namespace sunfall

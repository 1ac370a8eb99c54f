#include "light/split_hours.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <numbers>
#include <optional>

#include "light/hourly_split.h"
#include "light/open_series.h"
#include "light/sky_split.h"

namespace sunfall {
namespace {

constexpr std::size_t kStepsPerHour = 6;

double solar_time_h(const LightSeries& series, std::size_t step) {
  const SkyDirection& a = series.sun.edges[step];
  const SkyDirection& b = series.sun.edges[step + 1];
  const Angle latitude = series.place.latitude;
  const double south = (a.up + b.up) * cos(latitude) - (a.north + b.north) * sin(latitude);
  return 12.0 + std::atan2(-(a.east + b.east), south) * 12.0 / std::numbers::pi;
}

// A stretch of steps and the clearness of those that are known.
struct Stretch {
  std::size_t begin = 0;
  std::size_t end = 0;
  double global = 0.0;
  double above_air = 0.0;
  std::optional<double> clearness() const {
    if (above_air <= 0.0) return std::nullopt;
    return global / above_air;
  }
};

class HourSplitter {
 public:
  HourSplitter(StepLight& steps, const LightSeries& series, SeriesSource::Split model)
      : steps_(steps), series_(series), model_(model) {}

  long split(std::size_t first) {
    std::vector<Stretch> hours;
    if (first > 0) hours.push_back(stretch(0, first));
    for (std::size_t i = first; i < steps_.global.size(); i += kStepsPerHour) {
      hours.push_back(stretch(i, std::min(i + kStepsPerHour, steps_.global.size())));
    }
    long count = 0;
    for (std::size_t i = 0; i < hours.size(); ++i) {
      if (!wants_split(hours[i])) continue;
      fill(hours[i], diffuse_part(hours, i));
      ++count;
    }
    return count;
  }

 private:
  Stretch stretch(std::size_t begin, std::size_t end) const {
    Stretch sums{begin, end};
    for (std::size_t i = begin; i < end; ++i) {
      if (std::isnan(steps_.global[i])) continue;
      sums.global += steps_.global[i];
      sums.above_air += extraterrestrial_level_w_m2(series_, i);
    }
    return sums;
  }

  bool is_open(std::size_t i) const { return !std::isnan(steps_.global[i]) && std::isnan(steps_.sky[i]); }
  bool wants_split(const Stretch& hour) const {
    for (std::size_t i = hour.begin; i < hour.end; ++i) {
      if (is_open(i)) return true;
    }
    return false;
  }

  double diffuse_part(const std::vector<Stretch>& hours, std::size_t i) {
    const double clearness = hours[i].clearness().value_or(0.0);
    if (model_ == SeriesSource::Split::erbs) return erbs_hourly_diffuse_part(clearness);
    const auto before = i > 0 ? hours[i - 1].clearness() : std::nullopt;
    const auto after = i + 1 < hours.size() ? hours[i + 1].clearness() : std::nullopt;
    const double neighbours =
        before && after ? 0.5 * (*before + *after) : before.value_or(after.value_or(clearness));
    const std::size_t middle = (hours[i].begin + hours[i].end) / 2;
    return brl_diffuse_part({clearness, day_clearness(middle / kStepsPerDay), neighbours,
                             solar_time_h(series_, middle), elevation(hours[i])});
  }

  Angle elevation(const Stretch& hour) const {
    double sine = 0.0;
    double count = 0.0;
    for (std::size_t i = hour.begin; i < hour.end; ++i) {
      if (std::isnan(steps_.global[i])) continue;
      sine += series_.sun.mean_sine[i];
      count += 1.0;
    }
    return Angle::radians(std::asin(std::clamp(sine / std::max(count, 1.0), 0.0, 1.0)));
  }

  double day_clearness(std::size_t day) {
    if (day != day_) {
      day_ = day;
      day_clearness_ = stretch(day * kStepsPerDay, (day + 1) * kStepsPerDay).clearness().value_or(0.0);
    }
    return day_clearness_;
  }

  void fill(const Stretch& hour, double diffuse_part) {
    std::array<StepShare, kStepsPerHour> shares;
    std::array<std::size_t, kStepsPerHour> at{};
    std::size_t count = 0;
    double total = 0.0;
    for (std::size_t i = hour.begin; i < hour.end; ++i) {
      if (!is_open(i)) continue;
      const double above_air = extraterrestrial_level_w_m2(series_, i);
      const double global = steps_.global[i];
      shares[count] = {above_air, std::max(0.0, global - above_air), global};
      at[count++] = i;
      total += diffuse_part * global;
    }
    const std::vector<double> sky = spread_sky({shares.data(), count}, total);
    for (std::size_t k = 0; k < count; ++k) steps_.sky[at[k]] = static_cast<float>(sky[k]);
  }

  StepLight& steps_;
  const LightSeries& series_;
  SeriesSource::Split model_;
  std::size_t day_ = static_cast<std::size_t>(-1);
  double day_clearness_ = 0.0;
};

}  // namespace

long split_hours(StepLight& steps, const LightSeries& series, SeriesSource::Split model,
                 std::chrono::seconds phase) {
  const std::int64_t begin_s = series.sun.begin.time_since_epoch().count();
  const std::int64_t to_hour_s = ((phase.count() - begin_s) % 3600 + 3600) % 3600;
  const auto first = static_cast<std::size_t>(to_hour_s / kLightStep.count());
  return HourSplitter(steps, series, model).split(first);
}

}  // namespace sunfall

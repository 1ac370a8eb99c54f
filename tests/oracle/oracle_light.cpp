#include "oracle/oracle_light.h"

#include <tbb/parallel_for.h>

#include <algorithm>
#include <cmath>
#include <numbers>

#include "dome/sky_radiance.h"

namespace sunfall::oracle {
namespace {

constexpr int kAzimuths = 360;  // of the sky, from grid north
constexpr int kBands = 90;      // equal in sine
// The sky's months are those of every third day, which moves the sun by less than a degree.
constexpr int kDayStride = 3;
constexpr double kTurn = 2.0 * std::numbers::pi;

double grid_turn(double east, double north, Angle convergence) {
  const double turn = (std::atan2(east, north) - convergence.radians()) / kTurn;
  return turn - std::floor(turn);
}

SkyDirection along(const LightSeries& series, std::size_t i, double t) {
  const SkyDirection &a = series.sun.edges[i], &b = series.sun.edges[i + 1];
  const SkyDirection d{a.east + t * (b.east - a.east), a.north + t * (b.north - a.north),
                       a.up + t * (b.up - a.up)};
  const double length = std::hypot(d.east, d.north, d.up);
  return {d.east / length, d.north / length, d.up / length};
}

// One moment's radiance over the dome, times the sine: relative light on the level, sum 1.
class Radiance {
 public:
  explicit Radiance(Angle convergence) : values_(static_cast<std::size_t>(kAzimuths) * kBands) {
    for (int k = 0; k < kAzimuths; ++k) {
      const double azimuth = kTurn * (k + 0.5) / kAzimuths + convergence.radians();
      east_.push_back(std::sin(azimuth));
      north_.push_back(std::cos(azimuth));
    }
  }
  const std::vector<double>& of(const LightSeries& series, std::size_t i, SkyModel sky) {
    SkyDirection sun = along(series, i, 0.5);
    if (sun.up < 0.0) {
      const double flat = std::hypot(sun.east, sun.north);
      sun = {sun.east / flat, sun.north / flat, 0.0};
    }
    SkyState state;
    state.sky_w_m2 = series.steps[i].sky_w;
    state.beam_normal_w_m2 = series.steps[i].beam_w / std::max<double>(series.sun.mean_sine[i], 1e-3);
    state.extraterrestrial_w_m2 = series.sun.normal_w_m2[i];
    state.sun_zenith = Angle::radians(std::acos(sun.up));
    const SkyShape s = perez_shape(sky_indices(state), state.sun_zenith);
    double sum = 0.0;
    for (int band = 0; band < kBands; ++band) {
      const double sine = (band + 0.5) / kBands, cosine = std::sqrt(1.0 - sine * sine);
      const double gradation = sky == SkyModel::isotropic  ? 1.0
                               : sky == SkyModel::overcast ? 1.0 + 2.0 * sine
                                                           : 1.0 + s.a * std::exp(s.b / std::max(sine, 0.01));
      for (int k = 0; k < kAzimuths; ++k) {
        double glow = 1.0;
        if (sky == SkyModel::clearness) {
          const double cosine_gap =
              std::clamp(sine * sun.up + cosine * (east_[k] * sun.east + north_[k] * sun.north), -1.0, 1.0);
          glow = 1.0 + s.c * std::exp(s.d * std::acos(cosine_gap)) + s.e * cosine_gap * cosine_gap;
        }
        const double value = std::max(gradation, 0.0) * std::max(glow, 0.0) * sine;
        values_[static_cast<std::size_t>(k) * kBands + band] = value;
        sum += value;
      }
    }
    for (double& value : values_) value /= sum;
    return values_;
  }

 private:
  std::vector<double> east_, north_;
  std::vector<double> values_;
};

double mol_of(const LightSeries& series, float umol) {
  return umol * 1e-6 * static_cast<double>(series.sun.step.count());
}

}  // namespace

OracleLight::OracleLight(const LightSeries& series, SkyModel sky, Angle convergence) {
  follow_sun(series, convergence);
  gather_sky(series, sky, convergence);
  const auto days = days_of_months(series);
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const int month = month_of_step(series, i);
    open_.beam[month] += mol_of(series, series.steps[i].beam_umol) / days[month];
    open_.sky[month] += mol_of(series, series.steps[i].sky_umol) / days[month];
  }
}

void OracleLight::follow_sun(const LightSeries& series, Angle convergence) {
  const int pieces = static_cast<int>(series.sun.step.count() / 60);
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    if (series.steps[i].beam_umol <= 0.0F) continue;
    double sum = 0.0;
    for (int k = 0; k < pieces; ++k) sum += std::max(along(series, i, (k + 0.5) / pieces).up, 0.0);
    for (int k = 0; k < pieces && sum > 0.0; ++k) {
      const SkyDirection d = along(series, i, (k + 0.5) / pieces);
      if (d.up <= 0.0) continue;
      minutes_.push_back({static_cast<float>(grid_turn(d.east, d.north, convergence)),
                          static_cast<float>(std::asin(d.up)),
                          static_cast<float>(mol_of(series, series.steps[i].beam_umol) * d.up / sum),
                          month_of_step(series, i)});
    }
  }
}

void OracleLight::gather_sky(const LightSeries& series, SkyModel sky, Angle convergence) {
  constexpr std::size_t kPatches = static_cast<std::size_t>(kAzimuths) * kBands;
  const auto steps_per_day = static_cast<std::size_t>(std::chrono::days{1} / series.sun.step);
  below_.assign(12 * static_cast<std::size_t>(kAzimuths) * (kBands + 1), 0.0F);
  tbb::parallel_for(0, 12, [&](int month) {
    Radiance radiance(convergence);
    std::vector<double> sums(kPatches, 0.0);
    double all = 0.0;
    for (std::size_t i = 0; i < series.steps.size(); ++i) {
      if (series.steps[i].sky_umol <= 0.0F || i / steps_per_day % kDayStride != 0) continue;
      if (month_of_step(series, i) != month) continue;
      const std::vector<double>& values = radiance.of(series, i, sky);
      for (std::size_t k = 0; k < kPatches; ++k) sums[k] += series.steps[i].sky_umol * values[k];
      all += series.steps[i].sky_umol;
    }
    if (all <= 0.0) return;
    for (int azimuth = 0; azimuth < kAzimuths; ++azimuth) {
      const std::size_t row = (static_cast<std::size_t>(month) * kAzimuths + azimuth) * (kBands + 1);
      double sum = 0.0;
      for (int band = 0; band < kBands; ++band) {
        sum += sums[static_cast<std::size_t>(azimuth) * kBands + band] / all;
        below_[row + band + 1] = static_cast<float>(sum);
      }
    }
  });
}

MonthShares OracleLight::under(const RayHorizon& horizon) const {
  MonthShares shares;
  std::array<double, 12> all{};
  for (const SunMinute& minute : minutes_) {
    all[minute.month] += minute.mol;
    if (minute.elevation > horizon.at(minute.turn)) shares.beam[minute.month] += minute.mol;
  }
  const int looks = static_cast<int>(horizon.elevation.size());
  const double per_azimuth = static_cast<double>(kAzimuths) / looks;
  shares.sky.fill(1.0);
  for (int k = 0; k < looks; ++k) {
    if (horizon.elevation[k] <= 1e-3F) continue;
    // Level light within a band grows with the square of the sine.
    const double place = std::sin(double(horizon.elevation[k])) * kBands;
    const int band = std::min(static_cast<int>(place), kBands - 1);
    const double part = (place * place - double(band) * band) / (2.0 * band + 1.0);
    // A horizon on the edge between two azimuths counts half for each.
    const double at = k * per_azimuth;
    const int right = static_cast<int>(at) % kAzimuths;
    const bool edge = at == std::floor(at);
    const int left = edge ? (right + kAzimuths - 1) % kAzimuths : right;
    for (int month = 0; month < 12; ++month) {
      for (const int azimuth : {left, right}) {
        const float* below =
            below_.data() + (static_cast<std::size_t>(month) * kAzimuths + azimuth) * (kBands + 1);
        shares.sky[month] -= 0.5 * per_azimuth * (below[band] + part * (below[band + 1] - below[band]));
      }
    }
  }
  for (int month = 0; month < 12; ++month) {
    shares.beam[month] = all[month] > 0.0 ? shares.beam[month] / all[month] : 1.0;
  }
  return shares;
}

}  // namespace sunfall::oracle

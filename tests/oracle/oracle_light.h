#pragma once
// Shares of the open field's light under a horizon, straight from the light series: the beam minute by
// minute at the sun's own direction, the sky by its radiance on a dome of its own. Nothing of the
// dome light tables is used.

#include <array>
#include <vector>

#include "oracle/ray_surface.h"
#include "sunfall/dome.h"
#include "sunfall/light.h"

namespace sunfall::oracle {

struct MonthShares {
  std::array<double, 12> beam{};
  std::array<double, 12> sky{};
};

class OracleLight {
 public:
  OracleLight(const LightSeries& series, SkyModel sky, Angle convergence);

  MonthShares under(const RayHorizon& horizon) const;
  // mol m-2 d-1 in the open.
  const MonthShares& open() const { return open_; }

 private:
  struct SunMinute {
    float turn;  // from grid north
    float elevation;
    float mol;
    int month;
  };
  void follow_sun(const LightSeries& series, Angle convergence);
  void gather_sky(const LightSeries& series, SkyModel sky, Angle convergence);

  MonthShares open_;
  std::vector<SunMinute> minutes_;
  // [month][azimuth][band edge]: part of the month's sky light that comes from below, per azimuth
  std::vector<float> below_;
};

}  // namespace sunfall::oracle

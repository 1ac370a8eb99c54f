#pragma once
// What holds for every light series, and sums that tests need.

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <string>

#include "light/open_series.h"
#include "sunfall/light.h"

namespace sunfall {

inline Place place_at(double latitude_deg, double longitude_deg = 5.0, double height_m = 10.0) {
  return {Angle::degrees(latitude_deg), Angle::degrees(longitude_deg), height_m};
}

inline LightSeries light_of(const LightSource& source, const Place& place, int year = 2025,
                            const std::string& clock = "+00:00") {
  return make_light(source, place, Clock::parse(clock, "test"), {.year = year}, "farm.toml:9 light");
}

inline double global_w(const LightStep& step) { return static_cast<double>(step.beam_w) + step.sky_w; }
inline double global_umol(const LightStep& step) {
  return static_cast<double>(step.beam_umol) + step.sky_umol;
}

inline std::array<double, 12> monthly_global_mj_m2_d(const LightSeries& series) {
  return monthly_mean_mj_m2_d(series, [&](std::size_t i) { return global_w(series.steps[i]); });
}

// Finite, never negative, dark at night, the beam no stronger than the sun above the air.
inline void expect_sound(const LightSeries& series) {
  ASSERT_EQ(series.steps.size(), series.sun.size());
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const LightStep& step = series.steps[i];
    for (const float value : {step.beam_umol, step.sky_umol, step.beam_w, step.sky_w}) {
      ASSERT_TRUE(std::isfinite(value)) << i;
      ASSERT_GE(value, 0.0F) << i;
    }
    const double sine = series.sun.mean_sine[i];
    // A float keeps 6e-8 of the beam.
    ASSERT_LE(step.beam_w, sine * series.sun.normal_w_m2[i] * (1.0 + 1e-6)) << i;
    // 1361 W m-2 carry 2405 µmol above the air (Bird and Riordan's spectrum): 1.767 a joule of sun. The
    // air takes more from the rest of the spectrum: 1.99 per joule of beam (G173 direct: 1.93).
    ASSERT_LE(step.beam_umol, sine * series.sun.normal_w_m2[i] * 1.99) << i;
    if (sine == 0.0) {
      ASSERT_EQ(global_w(step) + global_umol(step), 0.0) << i;
    }
  }
}

}  // namespace sunfall

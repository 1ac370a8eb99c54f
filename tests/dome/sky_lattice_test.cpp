// Long records' skies by the lattice against one sky for each step.

#include "dome/sky_lattice.h"

#include <gtest/gtest.h>

#include <numeric>

#include "dome/gather_light.h"
#include "light/station.h"

namespace sunfall {
namespace {

std::vector<std::size_t> days_from(std::size_t first, std::size_t count) {
  std::vector<std::size_t> days(count);
  std::iota(days.begin(), days.end(), first);
  return days;
}

// Every wall up to any band takes the same light by both, to a thousandth of the month's: 0.5 % (see
// sky_lattice.h) of the part that the glow brings to the sectors of one month's sun, of which one wall sees a
// fifth or so. A single patch may differ by more, by the glow's 0.5 % in azimuth, brightness and height each,
// and by as much for the days on which the sun stands between two sectors.
TEST(SkyLattice, TakesTheSameLightFromEveryWall) {
  for (const double latitude_deg : {52.0, 5.0}) {
    const LightSeries series = cloudy_truth(place_at(latitude_deg, 15.0), 2025, "+01:00");
    for (const DomeQuality quality : {DomeQuality::draft, DomeQuality::standard, DomeQuality::fine}) {
      const Dome dome = Dome::of(quality);
      for (const std::size_t first : {std::size_t{0}, std::size_t{151}}) {
        const auto days = days_from(first, 30);
        const auto exact = gather_light(series, days, dome, SkyModel::clearness, SkyMethod::steps);
        const auto quick = gather_light(series, days, dome, SkyModel::clearness, SkyMethod::lattice);
        EXPECT_EQ(exact.beam_level, quick.beam_level);
        const double whole = std::accumulate(exact.sky.begin(), exact.sky.end(), 0.0);
        EXPECT_NEAR(std::accumulate(quick.sky.begin(), quick.sky.end(), 0.0), whole, 1e-6 * whole);
        double worst_patch = 0.0, worst_wall = 0.0, brightest = 0.0;
        const int wall = dome.sectors / 6;  // 60 degrees wide
        for (int s = 0; s < dome.sectors; ++s) {
          double behind = 0.0;
          for (int b = 0; b < dome.bands; ++b) {
            const auto k = static_cast<std::size_t>(s * dome.bands + b);
            worst_patch = std::max(worst_patch, std::abs(quick.sky[k] - exact.sky[k]));
            brightest = std::max(brightest, exact.sky[k]);
            for (int w = 0; w < wall; ++w) {
              const auto at = static_cast<std::size_t>((s + w) % dome.sectors * dome.bands + b);
              behind += quick.sky[at] - exact.sky[at];
            }
            worst_wall = std::max(worst_wall, std::abs(behind));
          }
        }
        std::printf(
            "latitude %g, %d sectors, day %zu: worst patch %.2e of the brightest, worst wall %.2e of all\n",
            latitude_deg, dome.sectors, first, worst_patch / brightest, worst_wall / whole);
        EXPECT_LE(worst_patch, 0.015 * brightest);
        EXPECT_LE(worst_wall, 1e-3 * whole);
      }
    }
  }
}

TEST(SkyLattice, IsForLongRecordsOfTheAllWeatherSky) {
  LightSeries series;
  series.years = 2;
  const Dome dome = Dome::of(DomeQuality::standard);
  EXPECT_EQ(method_for(series, dome, SkyModel::clearness), SkyMethod::steps);
  series.years = 3;
  EXPECT_EQ(method_for(series, dome, SkyModel::clearness), SkyMethod::lattice);
  EXPECT_EQ(method_for(series, dome, SkyModel::isotropic), SkyMethod::steps);
  Dome odd = dome;
  odd.sectors = 100;
  EXPECT_EQ(method_for(series, odd, SkyModel::clearness), SkyMethod::steps);
}

}  // namespace
}  // namespace sunfall

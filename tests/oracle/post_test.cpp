// A thin tall thing: a post 2 m wide and 15 m high on flat ground in cells of 1 m. Around it the map
// must fall and rise with azimuth as the rays' does; a post seen from far away must not turn into
// spokes, bright and dark by whether one of the looks meets it.

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numbers>

#include "geo/layer_writer.h"
#include "light/series_checks.h"
#include "map/scene.h"
#include "oracle/comparison.h"

namespace sunfall::oracle {
namespace {

constexpr double kHeight_m = 15.0, kHalfWidth_m = 1.0, kReceiver_m = 0.5;

// Four cells around the middle of a map of 300 × 300.
double post(double east, double north) {
  return std::max(std::abs(east), std::abs(north)) < kHalfWidth_m ? kHeight_m : 0.0;
}

// Cells by azimuth from the post, neighbours differing.
std::vector<CellIndex> ring_of(const GridFrame& frame, double radius_m) {
  std::vector<CellIndex> ring;
  for (int k = 0; k < 720; ++k) {
    const double azimuth = 2.0 * std::numbers::pi * k / 720;
    const CellIndex cell{static_cast<int>(std::floor(0.5 * frame.columns + radius_m * std::sin(azimuth))),
                         static_cast<int>(std::floor(0.5 * frame.rows - radius_m * std::cos(azimuth)))};
    if (ring.empty() || !(ring.back() == cell)) ring.push_back(cell);
  }
  return ring;
}

// Light of the month as a part of the open field's.
std::vector<double> light_around(const std::vector<MonthShares>& shares, const MonthShares& open, int month) {
  std::vector<double> out;
  for (const MonthShares& s : shares) {
    out.push_back((s.beam[month] * open.beam[month] + s.sky[month] * open.sky[month]) /
                  (open.beam[month] + open.sky[month]));
  }
  return out;
}

double variation(const std::vector<double>& around) {
  double sum = 0.0;
  for (std::size_t i = 0; i < around.size(); ++i)
    sum += std::abs(around[(i + 1) % around.size()] - around[i]);
  return sum;
}

// The largest step from one cell to the next around the ring that the rays do not have.
double largest_step_of_ours(const std::vector<double>& ours, const std::vector<double>& rays) {
  double most = 0.0;
  for (std::size_t i = 0; i < ours.size(); ++i) {
    const std::size_t next = (i + 1) % ours.size();
    most = std::max(most, std::abs((ours[next] - rays[next]) - (ours[i] - rays[i])));
  }
  return most;
}

// What a reader of the map can see: the finest colour scale has 256 steps, and the largest differences between
// dome qualities are to stay within a hundredth of the open light.
constexpr double kVisibleStep = 0.01;

// The post's shade may be off by the light from below its top within two strips of azimuth: one for
// the directions that meet it, counted right to within one strip, and one for the beam's tables, which
// spread the sun's path over what lies beside. More would be a spoke. A strip is two of the dome's lines
// (1.67 degrees at standard, 1 at fine) however many looks a sector gets; the blur from reading between
// two lines of the sweep must find its room in it.
double spoke_bound(const DomeLight& light, double radius_m, std::size_t month) {
  constexpr int kStripLines = 2;
  const double rise = kHeight_m - kReceiver_m;
  const double sine = rise / std::hypot(rise, radius_m - kHalfWidth_m);
  double most = 0.0;
  for (int first = 0; first < light.dome.lines(); first += kStripLines) {
    double below = 0.0;
    for (int line = first; line < first + kStripLines; ++line) {
      for (int step = 0; step <= static_cast<int>(sine * light.dome.steps()); ++step) {
        const std::size_t at = light.index(line, step, month);
        below += light.beam.level[at] + light.sky.level[at];
      }
    }
    most = std::max(most, below);
  }
  return 2.0 * most / (light.beam.open[month] + light.sky.open[month]);
}

class Post : public ::testing::Test {
 protected:
  static Plan plan_in(const testing::Scene& scene) {
    Plan plan;
    plan.site.ground = scene.ground_file();
    plan.site.surface = scene.surface_file();
    plan.site.receiver_height_m = kReceiver_m;
    plan.site.clock = Clock::parse("+01:00", "test");
    plan.light = ClearSource{};
    plan.periods = month_periods();
    return plan;
  }
  testing::Scene scene_{[](double, double) { return 0.0; }, post};
};

TEST_F(Post, LeavesNoSpokes) {
  const Ground ground(plan_in(scene_));
  const OracleLight light(ground.series, SkyModel::clearness, ground.convergence);
  for (const DomeQuality quality : {DomeQuality::standard, DomeQuality::fine}) {
    const MapShares map(ground, quality);
    const DomeLight tables =
        make_dome_light(ground.series, Dome::of(quality), SkyModel::clearness, month_periods());
    for (const double radius_m : {20.0, 60.0, 120.0}) {
      const std::vector<CellIndex> ring = ring_of(ground.terrain.frame(), radius_m);
      const std::vector<MonthShares> rays = ray_shares(ground, light, ring, 1440);
      std::vector<MonthShares> ours;
      for (const CellIndex cell : ring) ours.push_back(map.of(cell));
      for (const int month : {0, 2, 5, 11}) {
        const Spread s = spread(ours, rays, light.open(), Light::both, month);
        const std::vector<double> a = light_around(ours, light.open(), month);
        const std::vector<double> b = light_around(rays, light.open(), month);
        const double loss = 1.0 - *std::min_element(b.begin(), b.end());
        const double bound = spoke_bound(tables, radius_m, month);
        fmt::print(
            "  {:8} {:3.0f} m month {:2}: {}; deepest shade {:.3f} %, bound {:.3f} %, variation {:.3f} "
            "against {:.3f} %\n",
            quality == DomeQuality::standard ? "standard" : "fine", radius_m, month + 1, told(s), 100 * loss,
            100 * bound, 100 * variation(a), 100 * variation(b));
        EXPECT_LT(s.most, bound);
        EXPECT_LT(largest_step_of_ours(a, b), kVisibleStep) << radius_m << " m, month " << month + 1;
      }
    }
  }
}

}  // namespace
}  // namespace sunfall::oracle

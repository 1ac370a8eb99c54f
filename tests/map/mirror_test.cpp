// Mirrored ground under a mirrored sky gets mirrored light.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "dome/horizon_steps.h"
#include "map/map_run.h"
#include "shade/rough_ground.h"

namespace sunfall::testing {
namespace {

constexpr int kSide = 128;  // whole cells of every level, so that levels mirror too

Height rough(double east_sign, double north_sign) {
  return [=](double east, double north) { return rough_height(east_sign * east, north_sign * north); };
}

SceneOptions square() {
  SceneOptions options;
  options.columns = options.rows = kSide;
  options.receiver_height_m = 0.5;
  return options;
}

TileShares shares_of(const Scene& scene, const DomeLight& light, Angle convergence) {
  const TileSolver solver(scene.terrain(), light, ReceiverPlane::level);
  return solver.solve(scene.terrain().tile({0, 0, kSide, kSide}), convergence);
}

std::size_t place(int column, int row) {
  return static_cast<std::size_t>(row) * kSide + static_cast<std::size_t>(column);
}

// The most that one horizon of the dome's can move an even sky's share by moving one step.
double largest_step_loss(const Dome& dome) {
  double most = 0.0;
  const auto below = [](int step) {
    const double tangent = step_tangent(step);
    return tangent * tangent / (1.0 + tangent * tangent);  // s² of the sky's light, s the sine
  };
  for (int step = 1; step < kHorizonSteps; ++step) most = std::max(most, below(step) - below(step - 1));
  return most / dome.sectors;
}

// Sums in the mirror round otherwise, so a horizon on the edge between two steps may fall to the
// other side; that more than two of a cell's 36 do is not to be expected. North is turned a little, and
// the other way in the mirror, because a look at exactly 45 degrees may count to either heading.
TEST(Mirror, EastAndWestUnderAnEvenSky) {
  const Scene scene(rough(1, 1), {}, square()), mirrored(rough(-1, 1), {}, square());
  const Dome dome = Dome::of(DomeQuality::draft);
  const DomeLight light = even_sky(dome);
  const TileShares one = shares_of(scene, light, Angle::degrees(2.0)),
                   other = shares_of(mirrored, light, Angle::degrees(-2.0));
  const double bound = 2.0 * largest_step_loss(dome) + kFloatRounding;
  int apart = 0;
  double least = 1.0;
  for (int row = 0; row < kSide; ++row) {
    for (int column = 0; column < kSide; ++column) {
      const double here = one.of(place(column, row))[kSkyColumn],
                   there = other.of(place(kSide - 1 - column, row))[kSkyColumn];
      ASSERT_NEAR(here, there, bound) << column << ", " << row;
      apart += std::abs(here - there) > kFloatRounding;
      least = std::min(least, here);
    }
  }
  EXPECT_LT(apart, kSide * kSide / 100);  // and only here and there
  EXPECT_LT(least, 0.8);                  // the ground does hide sky
}

// North of the equator in June as south of it in December, with the ground mirrored north to south,
// and the other way round: the sun goes nearly the same way in the months of the solstices.
class Hemispheres : public ::testing::Test {
 protected:
  static constexpr std::size_t kJanuary = 0, kJune = 5, kDecember = 11;

  SceneOptions north_ = centred(square(), 25831, 3.0, 52.0), south_ = centred(square(), 32731, 3.0, -52.0);
  Scene up_{rough(1, 1), {}, north_}, down_{rough(1, -1), {}, south_};
  PlanLight light_up_ = light_of_plan(clear_plan(up_, north_)),
            light_down_ = light_of_plan(clear_plan(down_, south_));

  static double open(const PlanLight& light, std::size_t month) {
    return light.dome.beam.open[month] + light.dome.sky.open[month];
  }
};

// Means over a month of 2025 of the sun's declination in degrees and of 1 / d²: the series of Spencer
// (1971), from memory, good to 0.035 degrees and 1e-4.
struct SunOfMonth {
  double declination_deg = 0.0;
  double closeness = 0.0;
};
SunOfMonth sun_of(int first_day, int days) {
  SunOfMonth out;
  for (int day = first_day; day < first_day + days; ++day) {
    const double a = 2.0 * std::numbers::pi * (day - 1) / 365.0;
    const double declination = 0.006918 - 0.399912 * std::cos(a) + 0.070257 * std::sin(a) -
                               0.006758 * std::cos(2 * a) + 0.000907 * std::sin(2 * a) -
                               0.002697 * std::cos(3 * a) + 0.00148 * std::sin(3 * a);
    out.declination_deg += declination * 180.0 / std::numbers::pi / days;
    out.closeness += (1.00011 + 0.034221 * std::cos(a) + 0.00128 * std::sin(a) + 0.000719 * std::cos(2 * a) +
                      0.000077 * std::sin(2 * a)) /
                     days;
  }
  return out;
}

// A clear sky's light goes with 1 / d², and with the declination as from December to January: 11 % a
// degree in winter, so that what the series leave open is 0.4 %; in summer it is 1 % a degree.
TEST_F(Hemispheres, OpenFieldsDifferByTheSunsDistanceAndCourse) {
  const SunOfMonth january = sun_of(1, 31), june = sun_of(152, 30), december = sun_of(335, 31);
  const double nearer = december.closeness / june.closeness;
  EXPECT_NEAR(open(light_down_, kDecember) / open(light_up_, kJune), nearer, 0.005);
  const double per_degree = std::log(open(light_up_, kJanuary) / open(light_up_, kDecember)) /
                            (january.declination_deg - december.declination_deg);
  const double higher = std::exp(per_degree * (december.declination_deg + june.declination_deg));
  EXPECT_NEAR(open(light_up_, kDecember) / open(light_down_, kJune), nearer * higher, 0.005);
}

// The sun of the one December stands 0.09 degrees higher than that of the other June, of the 14.6 degrees
// that it climbs: 0.6 % of its light may pass over where it did not.
TEST_F(Hemispheres, MirroredGroundHasTheSameShares) {
  const TileShares up = shares_of(up_, light_up_.dome, Angle()),
                   down = shares_of(down_, light_down_.dome, Angle());
  for (const auto& [month, other] : {std::pair{kJune, kDecember}, {kDecember, kJune}}) {
    for (const std::size_t part : {0U, 12U}) {
      double sum = 0.0;
      for (int row = 0; row < kSide; ++row) {
        for (int column = 0; column < kSide; ++column) {
          sum += std::abs(double(up.of(place(column, row))[part + month]) -
                          double(down.of(place(column, kSide - 1 - row))[part + other]));
        }
      }
      EXPECT_LT(sum / (kSide * kSide), 0.09 / 14.6) << "month " << month + 1 << (part ? " sky" : " beam");
    }
  }
}

}  // namespace
}  // namespace sunfall::testing

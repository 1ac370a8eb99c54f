// Light taken at an instant: energy, leaves in the sun, sides, and hedges of the literature through a day.

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

#include "shade/row_cycle.h"
#include "shade/row_leaves.h"
#include "shade/row_paths.h"
#include "shade/some_rows.h"
#include "sunfall/error.h"
#include "sunfall/rows.h"

namespace sunfall {
namespace {

using testing::grid;
using testing::kDegree;
using testing::kSections;

Angle degrees(double value) { return Angle::degrees(value); }

// What leaves take, added up leaf by leaf: at each place of the section a volume takes depth × the beam that
// has come down to it. Midpoint rule over a grid of places, without the means over the cycle that the
// code uses. Black leaves; taken + ground = 1.
TEST(RowInstant, LeavesTakeWhatTheGroundMisses) {
  for (const RowSection section : kSections) {
    CropRows rows;
    rows.section = section;
    rows.absorptance = 1.0;
    rows.leaf_angle = 1.7;
    const RowLeaves leaves(rows, 1.0);
    for (const double from_row : {0.0, 35.0, 90.0, -50.0}) {
      for (const double elevation : {15.0, 40.0, 75.0}) {
        const RowRay ray = row_ray({Angle()}, {degrees(from_row)}, std::tan(elevation * kDegree));
        constexpr int kWide = 200, kTall = 200;
        const double tall = rows.height_m - rows.base_m;
        double sum = 0.0;
        for (int j = 0; j < kTall; ++j) {
          const double z = rows.base_m + tall * (j + 0.5) / kTall;
          const double half = half_width_at(rows, z);
          for (int i = 0; i < kWide; ++i) {
            const double across = half * (2.0 * (i + 0.5) / kWide - 1.0);
            const double beam = std::exp(-leaves.depth(ray.sine) * row_path(rows, ray, across, z));
            sum += beam * leaves.depth(ray.sine) / ray.sine * (2.0 * half / kWide) * (tall / kTall);
          }
        }
        const RowInstant instant = rows_in_beam(rows, degrees(from_row), degrees(elevation));
        EXPECT_NEAR(instant.taken, sum / rows.spacing_m, 1e-3) << from_row << " " << elevation;
        EXPECT_EQ(instant.reflected, 0.0);
        EXPECT_NEAR(instant.taken + instant.ground, 1.0, 1e-12);
      }
    }
  }
}

TEST(RowInstant, ScatteringTakesLessAndReturnsSome) {
  CropRows rows;
  CropRows black = rows;
  black.absorptance = 1.0;
  for (const double from_row : {0.0, 35.0, 90.0}) {
    for (const double elevation : {5.0, 40.0, 90.0}) {
      const RowInstant green = rows_in_beam(rows, degrees(from_row), degrees(elevation));
      const RowInstant dark = rows_in_beam(black, degrees(from_row), degrees(elevation));
      EXPECT_NEAR(green.taken + green.reflected + green.ground, 1.0, 1e-12);
      EXPECT_GT(green.reflected, 0.0);
      EXPECT_LT(green.taken, dark.taken);
      EXPECT_GE(green.ground, dark.ground);
      EXPECT_LE(green.taken + green.ground, 1.0);
      EXPECT_EQ(green.sunlit_leaf, dark.sunlit_leaf);
    }
  }
}

// A closed canopy: (1 − e^-KL)/K. Leaf area index 3, spherical leaves.
TEST(RowInstant, SunlitLeavesOfAClosedCanopy) {
  CropRows rows;
  rows.spacing_m = rows.width_m = 2.0;
  rows.base_m = 0.0;
  rows.height_m = 1.5;
  rows.leaf_density = 2.0;
  const double elevations[] = {90.0, 45.0, 20.0};
  const double sunlit[] = {1.5537, 1.2447, 0.6755};
  for (int i = 0; i < 3; ++i) {
    const RowInstant instant = rows_in_beam(rows, degrees(30), degrees(elevations[i]));
    EXPECT_NEAR(instant.sunlit_leaf, sunlit[i], 0.6e-4);
    EXPECT_NEAR(instant.sunlit_leaf + instant.shaded_leaf, 3.0, 1e-9);
  }
  EXPECT_NEAR(rows_in_beam(rows, degrees(30), degrees(45), 0.5).sunlit_leaf,
              (1.0 - std::exp(-1.5 * std::sqrt(0.5))) / std::sqrt(0.5), 1e-6);
  EXPECT_EQ(rows_in_beam(rows, degrees(30), degrees(45), 0.0).ground, 1.0);
}

TEST(RowInstant, SidesAndReversedRows) {
  const CropRows rows;
  for (const double elevation : {10.0, 60.0}) {
    const RowInstant right = rows_in_beam(rows, degrees(70), degrees(elevation));
    const RowInstant left = rows_in_beam(rows, degrees(-70), degrees(elevation));
    const RowInstant reversed = rows_in_beam(rows, degrees(250), degrees(elevation));
    EXPECT_EQ(right.taken_right, right.taken);
    EXPECT_EQ(right.taken_left, 0.0);
    EXPECT_EQ(left.taken_left, left.taken);
    EXPECT_NEAR(left.taken, right.taken, 1e-12);
    EXPECT_NEAR(reversed.taken, right.taken, 1e-12);
    EXPECT_EQ(reversed.taken_left, reversed.taken);
    const RowInstant ahead = rows_in_beam(rows, degrees(180), degrees(elevation));
    EXPECT_EQ(ahead.taken_left, ahead.taken_right);
  }
}

// Jackson and Palmer (1972, J. Appl. Ecol. 9:341): hedges that cover half the ground, as tall as the alley is
// wide. Their abstract (seen): over 80 % of the light could be taken; less at lower latitude, most so with
// rows east to west; north to south nearly the same all season, east to west not. The figures were computed
// for these tests with the shadow of opaque boxes over the day, each sine of elevation counting as light; 0.2
// %.
double taken_over_a_day(double latitude_deg, double declination_deg, double rows_deg) {
  CropRows rows;
  rows.spacing_m = 2.0;
  rows.height_m = rows.width_m = 1.0;
  rows.base_m = 0.0;
  const double lat = latitude_deg * kDegree, dec = declination_deg * kDegree;
  double taken = 0.0, all = 0.0;
  constexpr int kTimes = 20'000;
  for (int i = 0; i < kTimes; ++i) {
    const double hour = std::numbers::pi * (2.0 * (i + 0.5) / kTimes - 1.0);
    const double up = std::sin(lat) * std::sin(dec) + std::cos(lat) * std::cos(dec) * std::cos(hour);
    if (up <= 1e-6) continue;
    const double east = -std::cos(dec) * std::sin(hour);
    const double north = std::cos(lat) * std::sin(dec) - std::sin(lat) * std::cos(dec) * std::cos(hour);
    const RowRay ray =
        row_ray({degrees(rows_deg)}, {Angle::radians(std::atan2(east, north))}, up / std::hypot(east, north));
    constexpr double kOpaque = 1e6;
    taken += up * (1.0 - cycle_passage(rows, ray, kOpaque, 0.0));
    all += up;
  }
  return taken / all;
}

TEST(RowInstant, HedgesOfJacksonAndPalmer) {
  struct Case {
    double latitude_deg, north_south_june, north_south_equinox, east_west_june, east_west_equinox;
  };
  constexpr double kJune = 23.44;
  for (const Case& c : {Case{51.3, .8332, .8566, .7167, 1.0}, Case{45.0, .8201, .8411, .6704, 1.0},
                        Case{34.0, .8035, .8197, .6066, .8373}}) {
    EXPECT_NEAR(taken_over_a_day(c.latitude_deg, kJune, 0), c.north_south_june, 0.002);
    EXPECT_NEAR(taken_over_a_day(c.latitude_deg, 0.0, 0), c.north_south_equinox, 0.002);
    EXPECT_NEAR(taken_over_a_day(c.latitude_deg, kJune, 90), c.east_west_june, 0.002);
    EXPECT_NEAR(taken_over_a_day(c.latitude_deg, 0.0, 90), c.east_west_equinox, 0.002);
  }
  EXPECT_GT(taken_over_a_day(51.3, kJune, 0), 0.8);
  const auto seasonal = [](double rows_deg) {
    return std::abs(taken_over_a_day(51.3, kJune, rows_deg) - taken_over_a_day(51.3, 0.0, rows_deg));
  };
  EXPECT_LT(seasonal(0), 0.03);
  EXPECT_GT(seasonal(90), 0.2);
  const auto lost = [](double rows_deg) {
    return taken_over_a_day(51.3, kJune, rows_deg) - taken_over_a_day(34.0, kJune, rows_deg);
  };
  EXPECT_GT(lost(0), 0.0);
  EXPECT_GT(lost(90), lost(0));
}

TEST(RowInstant, RefusesWhatCannotBe) {
  CropRows wide;
  wide.width_m = 5.0;
  EXPECT_THROW(rows_in_beam(wide, degrees(0), degrees(30)), Error);
  EXPECT_THROW(rows_in_beam({}, degrees(0), degrees(0)), Error);
  EXPECT_THROW(rows_in_beam({}, degrees(0), degrees(30), 1.5), Error);
}

}  // namespace
}  // namespace sunfall

// Rows under whole skies: the study of cases and the profile across the alley.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>

#include "light/series_checks.h"
#include "map/scene.h"
#include "shade/row_cycle.h"
#include "shade/row_leaves.h"
#include "shade/some_rows.h"
#include "sunfall/error.h"
#include "sunfall/rows.h"

namespace sunfall {
namespace {

using testing::kSections;

Azimuth azimuth(double degrees) { return {Angle::degrees(degrees)}; }

const DomeLight& clear_light() {
  static const DomeLight light = [] {
    std::vector<Period> periods = month_periods();
    periods.push_back({"season", std::chrono::April / 15, std::chrono::September / 30});
    return make_dome_light(light_of(ClearSource{}, place_at(52.0)), Dome::of(DomeQuality::standard),
                           SkyModel::clearness, periods);
  }();
  return light;
}

RowStudyRequest one_case(const CropRows& rows, double azimuth_deg) {
  RowStudyRequest request;
  request.rows = rows;
  request.azimuths = {azimuth(azimuth_deg)};
  request.spacings_m = {rows.spacing_m};
  request.heights_m = {rows.height_m};
  return request;
}

CropRows hedge(double height, double alley, double spacing) {
  CropRows rows;
  rows.spacing_m = spacing;
  rows.height_m = height;
  rows.width_m = spacing - alley;
  rows.base_m = 0.0;
  rows.absorptance = 1.0;
  rows.leaf_density = 20.0;
  return rows;
}

// Boxes that pass next to nothing, under an even sky: f = 1 − (a/P)[sqrt(1 + (h/a)²) − h/a], a the alley
// (crossed strings between two alley edges). Under an overcast one, (1 + 2 sin)/3, the first is .76838, by
// integration of the same shadow. At the greatest density, 20, a shadow's edge is soft by 0.1 m (one over
// the depth of a metre), so hedges are enlarged to the 50 m and 100 m that rows may have: 0.2 %.
TEST(RowStudy, OpaqueHedgesUnderEvenAndOvercastSkies) {
  struct Case {
    double height, alley, spacing, taken;
  };
  const auto taken = [](const DomeLight& light, const Case& c, double rows_deg) {
    const double size = std::min(50.0 / c.height, 100.0 / c.spacing);
    return study_rows(light, one_case(hedge(size * c.height, size * c.alley, size * c.spacing), rows_deg))
        .cases[0];
  };
  const Dome dome = Dome::of(DomeQuality::standard);
  const DomeLight even = testing::even_sky(dome);
  for (const Case& c :
       {Case{1, 1, 2, .79289}, Case{2, 1, 2, .88197}, Case{.5, 1, 2, .69098}, Case{2, 3, 4, .59861}}) {
    const RowCase found = taken(even, c, 33.0);
    EXPECT_NEAR(found.taken[0] / c.taken, 1.0, 0.002) << c.height << " " << c.alley;
    EXPECT_NEAR(found.taken_left[0], found.taken_right[0], 1e-6);
  }
  DomeLight overcast = even;
  overcast.sky.open[0] = 0.0;
  for (int line = 0; line < dome.lines(); ++line) {
    for (int step = 0; step < dome.steps(); ++step) {
      double& level = overcast.sky.level[overcast.index(line, step, 0)];
      level *= 1.0 + 2.0 * (step + 0.5) / dome.steps();
      overcast.sky.open[0] += level;
    }
  }
  EXPECT_NEAR(taken(overcast, {1, 1, 2, 0}, 0.0).taken[0] / .76838, 1.0, 0.002);
}

// The floor of such an alley: places see the strip of sky between two edges; its middle sees
// sin(atan(a/2h)) of an even sky.
TEST(RowStudy, FloorOfAnOpaqueAlley) {
  const DomeLight even = testing::even_sky(Dome::of(DomeQuality::standard));
  const CropRows rows = hedge(20.0, 20.0, 40.0);
  const RowCase found = study_rows(even, one_case(rows, 10.0)).cases[0];
  // All light that is not taken falls on the floor, half of the ground.
  EXPECT_NEAR(found.floor_mean[0], (1.0 - .79289) * 2.0, 0.004);
  RowProfileRequest request{rows, kFullLeaf, azimuth(10.0), 41};
  const RowProfile profile = profile_of_rows(even, request);
  // The cycle's two ends are the middle of the alley; the last place lies half a metre beside it.
  const auto strip = [](double left, double right) {
    return 0.5 * (std::sin(std::atan(left / 20.0)) + std::sin(std::atan(right / 20.0)));
  };
  const double beside = 20.0 - profile.across_m.back();
  EXPECT_NEAR(profile.share[0].back(), strip(10.0 - beside, 10.0 + beside), 0.002);
  EXPECT_NEAR(profile.share[0].front(), profile.share[0].back(), 1e-6);
  EXPECT_NEAR(profile.share[0][20], 0.0, 1e-3);  // under the hedge
}

// Sums over every line and step of the dome, taken one by one.
struct DirectSums {
  std::vector<double> taken, right, floor;  // [period]
};
DirectSums every_direction(const DomeLight& light, const CropRows& rows, double rows_deg, int places) {
  const std::size_t periods = light.periods.size();
  DirectSums sums{std::vector<double>(periods), std::vector<double>(periods), std::vector<double>(periods)};
  const RowLeaves leaves(rows, 1.0);
  for (int line = 0; line < light.dome.lines(); ++line) {
    const Angle from = light.dome.line_azimuth(line).from_true_north - Angle::degrees(rows_deg);
    for (int step = 0; step < light.dome.steps(); ++step) {
      const double sine = (step + 0.5) / light.dome.steps();
      const RowRay ray = row_ray({Angle()}, {from}, sine / std::sqrt(1.0 - sine * sine));
      const double part =
          (1.0 - cycle_passage(rows, ray, leaves.depth(sine), 0.0)) * (1.0 - leaves.reflected(sine));
      double floor = 0.0;
      for (int i = 0; i < places; ++i) {
        const double across = 0.5 * rows.width_m + (rows.spacing_m - rows.width_m) * (i + 0.5) / places;
        floor += std::exp(-leaves.depth(sine) * row_path(rows, ray, across, 0.0)) / places;
      }
      for (std::size_t p = 0; p < periods; ++p) {
        const std::size_t at = light.index(line, step, p);
        const double share =
            (light.beam.level[at] + light.sky.level[at]) / (light.beam.open[p] + light.sky.open[p]);
        sums.taken[p] += share * part;
        if (sin(from) > 0.0) sums.right[p] += share * part;
        sums.floor[p] += share * floor;
      }
    }
  }
  return sums;
}

// Folding the sky by its angle to the rows, and sixteen places of the alley, against all directions and 64
// places.
TEST(RowStudy, FoldedSkyAgainstEveryDirection) {
  for (const RowSection section : kSections) {
    CropRows rows;
    rows.section = section;
    for (const double rows_deg : {0.0, 12.3, 90.0}) {
      const RowCase found = study_rows(clear_light(), one_case(rows, rows_deg)).cases[0];
      const bool box = section == RowSection::box;
      const DirectSums sums = every_direction(clear_light(), rows, rows_deg, box ? 64 : 0);
      for (std::size_t p = 0; p < sums.taken.size(); ++p) {
        EXPECT_NEAR(found.taken[p], sums.taken[p], 0.001);
        EXPECT_NEAR(found.taken_right[p], sums.right[p], 0.001);
        if (box) {
          EXPECT_NEAR(found.floor_mean[p], sums.floor[p], 0.001);
        }
      }
    }
  }
}

// The ground's mean along the profile is what the leaves have not taken: two ways to the same sum.
TEST(RowStudy, ProfileClosesTheEnergy) {
  for (const RowSection section : kSections) {
    CropRows rows;
    rows.section = section;
    rows.absorptance = 1.0;
    const RowCase found = study_rows(clear_light(), one_case(rows, 25.0)).cases[0];
    const RowProfile profile = profile_of_rows(clear_light(), {rows, kFullLeaf, azimuth(25.0), 200});
    for (std::size_t period = 0; period < 13; ++period) {
      double mean = 0.0;
      for (const double share : profile.share[period]) mean += share / 200.0;
      EXPECT_NEAR(found.taken[period] + mean, 1.0, 0.001);
      EXPECT_NEAR(found.taken[period], found.taken_left[period] + found.taken_right[period], 1e-12);
      EXPECT_LE(found.floor_least[period], found.floor_mean[period]);
    }
    rows.absorptance = 0.85;
    const RowCase green = study_rows(clear_light(), one_case(rows, 25.0)).cases[0];
    const RowProfile under = profile_of_rows(clear_light(), {rows, kFullLeaf, azimuth(25.0), 200});
    double mean = 0.0;
    for (const double share : under.share[6]) mean += share / 200.0;
    EXPECT_LT(green.taken[6] + mean, 1.0);
    EXPECT_GT(green.taken[6] + mean, 0.9);
  }
}

TEST(RowStudy, ReversedAndMirroredRows) {
  const CropRows rows;
  const RowCase one = study_rows(clear_light(), one_case(rows, 25.0)).cases[0];
  const RowCase reversed = study_rows(clear_light(), one_case(rows, 205.0)).cases[0];
  const RowProfile profile = profile_of_rows(clear_light(), {rows, kFullLeaf, azimuth(25.0), 20});
  const RowProfile turned = profile_of_rows(clear_light(), {rows, kFullLeaf, azimuth(205.0), 20});
  // A clear sky is the same in the morning and the afternoon but for the sun's moving on (1e-3 of the light):
  // the mirror image east to west.
  const RowCase mirror = study_rows(clear_light(), one_case(rows, -25.0)).cases[0];
  const RowProfile image = profile_of_rows(clear_light(), {rows, kFullLeaf, azimuth(-25.0), 20});
  for (std::size_t period = 0; period < 13; ++period) {
    EXPECT_NEAR(one.taken[period], reversed.taken[period], 1e-9);
    EXPECT_NEAR(one.taken_right[period], reversed.taken_left[period], 1e-9);
    EXPECT_NEAR(one.floor_least[period], reversed.floor_least[period], 1e-9);
    EXPECT_NEAR(one.taken[period], mirror.taken[period], 2e-3);
    EXPECT_NEAR(one.taken_right[period], mirror.taken_left[period], 2e-3);
    for (int i = 0; i < 20; ++i) {
      EXPECT_NEAR(profile.share[period][i], turned.share[period][19 - i], 1e-9);
      EXPECT_NEAR(profile.share[period][i], image.share[period][19 - i], 4e-3);
    }
  }
}

// Under a closed canopy no direction of the rows matters; without leaves nothing is taken.
TEST(RowStudy, LeafingAndLists) {
  RowStudyRequest request;
  request.azimuths = {azimuth(0), azimuth(90)};
  request.spacings_m = {3.0, 4.0};
  request.heights_m = {2.0, 3.0, 3.5};
  request.leafing = {0, 0, 0.2, 0.5, 1, 1, 1, 1, 1, 0.5, 0.2, 0};
  const RowStudy study = study_rows(clear_light(), request);
  ASSERT_EQ(study.cases.size(), 12u);
  EXPECT_EQ(study.cases[4].spacing_m, 4.0);
  EXPECT_EQ(study.cases[4].height_m, 3.0);
  EXPECT_EQ(study.cases[11].azimuth.from_true_north.degrees(), 90.0);
  for (std::size_t i = 0; i < 12; ++i) {
    const RowCase& found = study.cases[i];
    EXPECT_EQ(found.taken[0], 0.0);
    EXPECT_NEAR(found.floor_least[11], 1.0, 1e-9);
    EXPECT_LT(found.taken[3], found.taken[4]);
    if (i % 3 > 0) {
      EXPECT_GT(found.taken[5], study.cases[i - 1].taken[5]);  // taller takes more
    }
    if (i % 6 >= 3) {
      EXPECT_LT(found.taken[5], study.cases[i - 3].taken[5]);  // wider apart less
    }
    // As if each month stood alone.
    CropRows alone = request.rows;
    alone.spacing_m = found.spacing_m;
    alone.height_m = found.height_m;
    alone.leaf_density *= 0.5;
    const RowCase half =
        study_rows(clear_light(), one_case(alone, found.azimuth.from_true_north.degrees())).cases[0];
    EXPECT_NEAR(found.taken[3], half.taken[3], 1e-12);
    EXPECT_NEAR(found.floor_mean[9], half.floor_mean[9], 1e-12);
  }
  // 15 April to 30 September: 16 days of 0.5 in 169.
  EXPECT_NEAR(leafing_of(clear_light().periods[12], request.leafing), (16 * 0.5 + 153) / 169.0, 1e-12);
  EXPECT_NEAR(leafing_of({"winter", std::chrono::October / 1, std::chrono::March / 31}, request.leafing),
              (31 * 0.5 + 30 * 0.2 + 31 * 0.2) / (31 + 30 + 31 + 31 + 29 + 31), 1e-12);
}

TEST(RowStudy, RefusesWhatCannotBe) {
  RowStudyRequest request = one_case({}, 0.0);
  request.azimuths.clear();
  EXPECT_THROW(study_rows(clear_light(), request), Error);
  request = one_case({}, 0.0);
  request.spacings_m.push_back(1.0);  // narrower than the rows
  EXPECT_THROW(study_rows(clear_light(), request), Error);
  request = one_case({}, 0.0);
  request.leafing[3] = 1.2;
  EXPECT_THROW(study_rows(clear_light(), request), Error);
  EXPECT_THROW(profile_of_rows(clear_light(), {{}, kFullLeaf, azimuth(0), 0}), Error);
}

}  // namespace
}  // namespace sunfall

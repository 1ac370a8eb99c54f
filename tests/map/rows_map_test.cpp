// Plots of crop rows in the map, against the row model without a map (include/sunfall/rows.h, tested in
// tests/shade against closed forms and marched rays), which follows every line of the dome through rows
// without end.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "map/scene.h"
#include "map/tile_solver.h"
#include "shade/rows_caster.h"
#include "sunfall/rows.h"

namespace sunfall::testing {
namespace {

constexpr double kReceiver_m = 0.5;
constexpr int kSide = 300;

CropRows orchard() {
  CropRows rows;
  rows.spacing_m = 6.0;
  rows.height_m = 3.5;
  rows.width_m = 2.0;
  rows.base_m = 0.8;
  rows.leaf_density = 1.2;
  return rows;
}

SceneOptions square(double cell_m) {
  SceneOptions options;
  options.columns = options.rows = kSide;
  options.cell_m = cell_m;
  options.receiver_height_m = kReceiver_m;
  return options;
}
double flat(double, double) { return 0.0; }

// The middle of the map, as far as `half_m` to each side.
std::vector<std::vector<MapPoint>> block(const Scene& scene, double half_m) {
  const MapPoint m = scene.terrain().frame().middle();
  return {{{m.east - half_m, m.north - half_m},
           {m.east + half_m, m.north - half_m},
           {m.east + half_m, m.north + half_m},
           {m.east - half_m, m.north + half_m}}};
}

Casters rows_in(const Scene& scene, const CropRows& rows, double azimuth_deg, double half_m) {
  RowsInputs inputs;
  inputs.rings = block(scene, half_m);
  inputs.azimuth = {Angle::degrees(azimuth_deg)};
  inputs.rows = rows;
  inputs.months.fill(1.0);
  inputs.receiver_height_m = kReceiver_m;
  Casters casters;
  casters.push_back(std::make_unique<RowsCaster>(inputs, scene.terrain()));
  return casters;
}

DomeLight clear_months(const Dome& dome) {
  const Place place{Angle::degrees(52.0), Angle::degrees(5.0)};
  const LightSeries series = make_light(ClearSource{}, place, Clock::parse("+01:00", "test"), {}, "test");
  return make_dome_light(series, dome, SkyModel::clearness, month_periods());
}

// Share of all light of each month at a cell.
std::vector<double> months_of(const TileShares& shares, const DomeLight& light, std::size_t cell) {
  std::vector<double> out;
  for (std::size_t p = 0; p < 12; ++p) {
    const double beam = light.beam.open[p], sky = light.sky.open[p];
    out.push_back((shares.of(cell)[p] * beam + shares.of(cell)[12 + p] * sky) / (beam + sky));
  }
  return out;
}

RowProfile profile_along(const DomeLight& light, double azimuth_deg) {
  RowProfileRequest request;
  request.rows = orchard();
  request.azimuth = {Angle::degrees(azimuth_deg)};
  request.positions = 96;
  request.height_m = kReceiver_m;
  return profile_of_rows(light, request);
}

constexpr double kMostOff = 0.01;  // of the open light, one cell: bands, looks, sixteen places across a cycle
constexpr double kMeanOff = 0.005;  // over a cycle

// Cells far finer than the rows find their place in the profile; the mean over a cycle is the profile's.
TEST(RowsInTheMap, FineCellsFollowTheProfile) {
  const Scene scene(flat, {}, square(0.5));
  const DomeLight light = clear_months(Dome::of(DomeQuality::standard));
  for (const double azimuth : {0.0, 90.0}) {
    const Casters casters = rows_in(scene, orchard(), azimuth, 75.0);
    const TileSolver solver(scene.terrain(), light, ReceiverPlane::level, casters);
    const TileShares shares = solver.solve(scene.terrain().tile({130, 130, 40, 40}), Angle());
    const RowProfile profile = profile_along(light, azimuth);
    const auto& caster = static_cast<const RowsCaster&>(*casters.front());
    for (const std::size_t month : {std::size_t{0}, std::size_t{5}, std::size_t{11}}) {
      double mean = 0.0, expected = 0.0;
      int cells = 0;
      // Six metres across and along: twelve cells.
      for (int row = 10; row < 22; ++row) {
        for (int column = 10; column < 22; ++column) {
          const MapPoint place = scene.terrain().frame().centre({130 + column, 130 + row});
          const double across = caster.plot().across_m(place);
          // The cell's width of the profile: eight places of 1/16 m.
          double here = 0.0, width = 0.0;
          for (std::size_t i = 0; i < profile.across_m.size(); ++i) {
            double apart = std::abs(profile.across_m[i] - across);
            apart = std::min(apart, 6.0 - apart);
            if (apart > 0.25) continue;
            here += profile.share[month][i];
            width += 1.0;
          }
          here /= width;
          const double ours = months_of(shares, light, static_cast<std::size_t>(row) * 40 + column)[month];
          EXPECT_NEAR(ours, here, 3.0 * kMostOff)
              << "azimuth " << azimuth << " month " << month + 1 << " across " << across;
          mean += ours;
          expected += here;
          ++cells;
        }
      }
      EXPECT_NEAR(mean / cells, expected / cells, kMeanOff)
          << "azimuth " << azimuth << " month " << month + 1;
      EXPECT_LT(expected / cells, 0.8);  // the rows do take light
    }
  }
}

TEST(RowsInTheMap, WideCellsHaveTheMeanOfTheCycle) {
  const Scene scene(flat, {}, square(4.0));
  const DomeLight light = clear_months(Dome::of(DomeQuality::standard));
  for (const double azimuth : {0.0, 40.0}) {
    const Casters casters = rows_in(scene, orchard(), azimuth, 500.0);
    const TileSolver solver(scene.terrain(), light, ReceiverPlane::level, casters);
    const TileShares shares = solver.solve(scene.terrain().tile({145, 145, 10, 10}), Angle());
    const RowProfile profile = profile_along(light, azimuth);
    const std::vector<double> ours = months_of(shares, light, 55);
    for (std::size_t month = 0; month < 12; ++month) {
      double mean = 0.0;
      for (const double share : profile.share[month]) mean += share / double(profile.share[month].size());
      EXPECT_NEAR(ours[month], mean, kMeanOff) << "azimuth " << azimuth << " month " << month + 1;
    }
  }
}

// Black leaves: what comes to the tops of the rows is taken or reaches the ground. Receivers on the ground,
// cells with the mean of the cycle, a hill in the south; and what is taken agrees with the study.
TEST(RowsInTheMap, TakenAndPassedAreWhatCame) {
  SceneOptions options = square(4.0);
  options.receiver_height_m = 0.0;
  const Scene scene([](double, double north) { return north < -300.0 ? 60.0 : 0.0; }, {}, options);
  const DomeLight light = clear_months(Dome::of(DomeQuality::standard));
  CropRows rows = orchard();
  rows.absorptance = 1.0;
  RowsInputs inputs;
  inputs.rings = block(scene, 250.0);
  inputs.azimuth = {Angle::degrees(30.0)};
  inputs.rows = rows;
  inputs.months.fill(1.0);
  inputs.receiver_height_m = 0.0;
  Casters casters;
  casters.push_back(std::make_unique<RowsCaster>(inputs, scene.terrain()));
  const TileSolver solver(scene.terrain(), light, ReceiverPlane::level, casters),
      bare(scene.terrain(), light, ReceiverPlane::level);
  const CellWindow window{140, 140, 20, 20};
  const TileShares under = solver.solve(scene.terrain().tile(window), Angle()),
                   open = bare.solve(scene.terrain().tile(window), Angle());
  ASSERT_EQ(under.crops.cells.size(), 400U);
  RowStudyRequest request;
  request.rows = rows;
  request.azimuths = {{Angle::degrees(30.0)}};
  request.spacings_m = {rows.spacing_m};
  request.heights_m = {rows.height_m};
  const RowCase study = study_rows(light, request).cases.front();
  for (std::size_t slot = 0; slot < 400; slot += 37) {
    const std::size_t cell = under.crops.cells[slot];
    for (int c = 0; c < 24; ++c) {
      const float* right = under.crops.taken.data() + slot * 2 * 24;
      const double taken = double(right[c]) + right[24 + c];
      const double came = under.crops.came[slot * 24 + static_cast<std::size_t>(c)];
      EXPECT_NEAR(came, open.of(cell)[c], 2e-4) << "column " << c;
      EXPECT_NEAR(taken + under.of(cell)[c], came, 1.5e-3) << "column " << c;
    }
    for (const std::size_t month : {std::size_t{5}, std::size_t{6}}) {  // the hill takes least
      const double beam = light.beam.open[month], sky = light.sky.open[month];
      const float* right = under.crops.taken.data() + slot * 2 * 24;
      const auto of_open = [&](const float* share) {
        return (share[month] * beam + share[12 + month] * sky) / (beam + sky);
      };
      EXPECT_NEAR(of_open(right) + of_open(right + 24), study.taken[month], 0.01) << month;
      EXPECT_NEAR(of_open(right), study.taken_right[month], 0.01) << month;
    }
  }
}

// Reversed rows are the same rows; what lies south of the plot at noon keeps its light, what lies north of it
// loses some, and no cell has more than in the open.
TEST(RowsInTheMap, ShadeFallsBesideThePlot) {
  const Scene scene(flat, {}, square(1.0));
  const DomeLight light = clear_months(Dome::of(DomeQuality::draft));
  const auto solve = [&](double azimuth) {
    const Casters casters = rows_in(scene, orchard(), azimuth, 60.0);
    const TileSolver solver(scene.terrain(), light, ReceiverPlane::level, casters);
    return solver.solve(scene.terrain().tile({0, 0, kSide, kSide}), Angle());
  };
  const TileShares one = solve(80.0), turned = solve(260.0);
  const auto december = [&](int column, int row) {
    return months_of(one, light, static_cast<std::size_t>(row) * kSide + column)[11];
  };
  EXPECT_LT(december(150, 150 - 63), 0.9);      // 3 m north of the outline
  EXPECT_GT(december(150, 150 + 63), 0.9);      // 3 m south
  EXPECT_NEAR(december(150, 290), 1.0, 0.002);  // 80 m south: no beam passes, and little sky
  for (std::size_t i = 0; i < one.shares.size(); ++i) {
    ASSERT_NEAR(one.shares[i], turned.shares[i], 0.002);
    ASSERT_LE(one.shares[i], 1.0F);
  }
}

}  // namespace
}  // namespace sunfall::testing

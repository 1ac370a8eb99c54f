// The sheared sweep against every ray walked through the columns on its own, and tiles against each other.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "shade/made_canopy.h"

namespace sunfall::testing {
namespace {

double hills(double e, double n) {
  return 6.0 * std::sin(e * 0.02) * std::cos(n * 0.03) +
         0.2 * noise(static_cast<int>(std::floor(e)), static_cast<int>(std::floor(n)));
}

SceneOptions map_of(int cells) {
  SceneOptions options;
  options.columns = options.rows = cells;
  options.receiver_height_m = 0.5;
  return options;
}

struct Differences {
  double bias = 0.0, mean = 0.0, p95 = 0.0;
};
Differences differences(const std::vector<double>& found, const std::vector<double>& marched) {
  Differences out;
  std::vector<double> sizes;
  for (std::size_t i = 0; i < found.size(); ++i) {
    sizes.push_back(std::abs(found[i] - marched[i]));
    out.bias += (found[i] - marched[i]) / static_cast<double>(found.size());
    out.mean += sizes.back() / static_cast<double>(found.size());
  }
  std::sort(sizes.begin(), sizes.end());
  out.p95 = sizes[sizes.size() * 95 / 100];
  return out;
}

constexpr double kShadow = 0.5 * 0.92195444572928871;  // G √α, α = 0.85
constexpr int kCells = 300;

// A line passes a cell's middle within a quarter of a cell, an eighth on average, and reads between bins of
// an eighth of a metre or more, so one direction alone may differ where a shadow's edge runs; what is
// demanded is that the light of many directions agrees: of the whole sky, and of the path of a low sun.
TEST(CanopyMarch, PassageOfSkyAndSunPath) {
  const CanopyMap map(hills, random_crown, map_of(360));
  const Canopy caster = map.canopy();
  const CellWindow window{130, 120, 96, 96};
  const TerrainTile terrain = map.scene.terrain().tile(window);
  const auto tile = caster.tile(terrain);
  std::vector<double> sky(kCells), sky_marched(kCells), sun(kCells), sun_marched(kCells);
  double bias = 0.0, sky_weight = 0.0, sun_weight = 0.0;
  int directions = 0;
  for (int band = 0; band < 20; ++band) {
    const double sine = (band + 0.5) / 20, tangent = sine / std::sqrt(1.0 - sine * sine);
    for (double azimuth = 3.7; azimuth < 360.0; azimuth += 10.0) {
      const bool low_sun = azimuth > 120.0 && azimuth < 240.0 && sine > 0.2 && sine < 0.5;
      std::vector<Depth> depth(terrain.usable.size());
      tile->add_depth({Angle::degrees(azimuth)}, static_cast<float>(tangent), depth);
      sky_weight += sine;
      if (low_sun) sun_weight += sine;
      ++directions;
      for (int i = 0; i < kCells; ++i) {
        const int column = i * 7919 % 96, row = i * 6151 % 96;
        const double passes =
            std::exp(-depth[static_cast<std::size_t>(row) * 96 + column] / double(kDepthUnits));
        const double marched =
            std::exp(-kShadow * map.leaf_along(window.column + column, window.row + row, azimuth, tangent));
        bias += passes - marched;
        sky[i] += sine * passes, sky_marched[i] += sine * marched;
        if (low_sun) sun[i] += sine * passes, sun_marched[i] += sine * marched;
      }
    }
  }
  for (int i = 0; i < kCells; ++i) {
    sky[i] /= sky_weight, sky_marched[i] /= sky_weight, sun[i] /= sun_weight, sun_marched[i] /= sun_weight;
  }
  EXPECT_LT(std::abs(bias / directions / kCells), 0.002);
  const Differences of_sky = differences(sky, sky_marched), of_sun = differences(sun, sun_marched);
  EXPECT_LT(of_sky.mean, 0.005);
  EXPECT_LT(of_sky.p95, 0.02);
  EXPECT_LT(of_sun.mean, 0.005) << of_sun.bias;
  EXPECT_LT(of_sun.p95, 0.02);
}

// Straight along rows and columns the lines pass the cells' middles, and only the bins are left: what is read
// is a mean of the depths of rays that start at most a bin and a half higher or lower (half a bin of the
// slopes, one between the bins that are read). So it lies between the least and the greatest of these.
TEST(CanopyMarch, WholeLinesLieBetweenNeighbouringRays) {
  const CanopyMap map(hills, random_crown, map_of(240));
  const Canopy caster = map.canopy();
  const CellWindow window{70, 60, 96, 96};
  int compared = 0;
  for (const double azimuth : {0.0, 90.0, 180.0, 270.0}) {
    for (const double tangent : {0.03, 0.2, 0.7, 2.0}) {
      const auto found = map.depths(caster, window, azimuth, tangent);
      const double smear = 1.5 * std::max(caster.bin_m(), tangent / 8.0);
      for (int i = 0; i < kCells; ++i) {
        const int column = window.column + i * 7919 % 96, row = window.row + i * 6151 % 96;
        // Its own column is added for the receiver's own height.
        if (map.source->at(column, row).density > 0.0) continue;
        double least = 1e9, greatest = 0.0;
        for (double up = -smear; up <= smear * 1.0001; up += smear / 12.0) {
          const double depth =
              kShadow * map.leaf_along(column, row, map.eye_m(column, row) + up, azimuth, tangent);
          least = std::min(least, depth), greatest = std::max(greatest, depth);
        }
        const double depth = found[static_cast<std::size_t>(row - window.row) * 96 + column - window.column];
        // Depths change evenly between the starts, by a twelfth of the whole at most; rounding of bins and
        // slopes.
        const double slack = (greatest - least) / 12.0 + 0.002 + 0.002 * greatest;
        ASSERT_GE(depth, std::min(least, 65535 / 4096.0) - slack) << azimuth << ", " << tangent << ", " << i;
        ASSERT_LE(depth, greatest + slack) << azimuth << ", " << tangent << ", " << i;
        compared += greatest > 0.0 ? 1 : 0;
      }
    }
  }
  EXPECT_GT(compared, 500);
}

// Every tile gives the bits that the whole map gives: near light and far, within and beyond the reach, and
// on hills so high that leaves go out of reach.
TEST(CanopyMarch, TilesAgreeToTheBit) {
  const auto mountain = [](double e, double n) { return hills(e, n) + 0.2 * e + 0.1 * n; };
  SceneOptions options = map_of(260);
  options.cell_m = 4.0;
  const auto wide_crown = [](double e, double n) { return random_crown(e / 4.0, n / 4.0); };
  const CanopyMap map(mountain, wide_crown, options);
  for (const double azimuth : {0.0, 28.0, 77.0, 135.0, 199.0, 250.0, 333.0}) {
    for (const double tangent : {0.005, 0.05, 0.4, 2.0, 9.0}) {
      const Canopy caster = map.canopy();
      const auto whole = map.depths(caster, map.whole(), azimuth, tangent);
      for (const CellWindow& window :
           {CellWindow{0, 0, 64, 64}, CellWindow{64, 128, 64, 40}, CellWindow{131, 77, 33, 90},
            CellWindow{200, 180, 60, 80}, CellWindow{259, 100, 1, 1}}) {
        auto part = map.depths(caster, window, azimuth, tangent);
        if (part.empty()) part.resize(static_cast<std::size_t>(window.columns) * window.rows);
        for (int row = 0; row < window.rows; ++row) {
          for (int column = 0; column < window.columns; ++column) {
            const double want =
                whole.empty()
                    ? 0.0
                    : whole[static_cast<std::size_t>(window.row + row) * 260 + window.column + column];
            ASSERT_EQ(part[static_cast<std::size_t>(row) * window.columns + column], want)
                << azimuth << ", " << tangent << ", tile at " << window.column << ", " << window.row;
          }
        }
      }
    }
  }
}

// Leaves count up to the reach, and not beyond; a shorter map would have been read whole.
TEST(CanopyMarch, ReachEnds) {
  SceneOptions options;
  options.columns = 9;
  options.rows = 1300;
  const auto hedge = [](double, double north) {
    return north > 640.0 && north < 644.0 ? Column{0.0, 40.0, 1.0} : Column{};
  };
  const CanopyMap map([](double, double) { return 0.0; }, hedge, options);
  const Canopy caster = map.canopy();
  ASSERT_EQ(caster.reach(), kCanopyReach);
  // The hedge's cells are rows 6 to 9 of the map.
  const auto found = map.depths(caster, map.whole(), 0.0, 0.001);
  const auto at = [&](int row) { return found[static_cast<std::size_t>(row) * 9 + 4]; };
  EXPECT_GT(at(6 + kCanopyReach), 1.0);
  EXPECT_LT(at(8 + kCanopyReach), at(6 + kCanopyReach) - 0.8);
  EXPECT_EQ(at(10 + kCanopyReach), 0.0);
  EXPECT_EQ(at(1299), 0.0);
}

}  // namespace
}  // namespace sunfall::testing

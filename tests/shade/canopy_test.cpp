// Canopy against closed forms and what must hold of any leaves.

#include <gtest/gtest.h>

#include <cmath>

#include "shade/made_canopy.h"

namespace sunfall::testing {
namespace {

// Spherical leaves throw half their area as shadow from everywhere (Campbell 1986); α = 1: black.
constexpr double kG = 0.5;
CanopyOptions black() {
  CanopyOptions options;
  options.leaves.absorptance = 1.0;
  return options;
}

SceneOptions map_of(int cells, double cell_m = 1.0, double receiver_height_m = 0.0) {
  SceneOptions options;
  options.columns = options.rows = cells;
  options.cell_m = cell_m;
  options.receiver_height_m = receiver_height_m;
  return options;
}
double flat(double, double) { return 10.0; }

// The middle cell of the map's middle tile.
double depth_at_middle(const CanopyMap& map, const Canopy& caster, double azimuth_deg, double tangent) {
  const int middle = map.heights.columns() / 2;
  const std::vector<double> found =
      map.depths(caster, {middle - 8, middle - 8, 16, 16}, azimuth_deg, tangent);
  return found.empty() ? 0.0 : found[8 * 16 + 8];
}

// G·L / sin e below a closed canopy (Beer-Lambert); half of it for receivers halfway up. What the map gives
// is rounded to 1/4096, and each row's part to an eighth of that.
TEST(Canopy, ClosedCanopyOnLevelGround) {
  const auto leaves = [](double, double) { return Column{2.0, 6.0, 0.5}; };
  for (const double height : {0.0, 2.0, 4.0, 5.0, 6.0, 7.0}) {
    const CanopyMap map(flat, leaves, map_of(300, 1.0, height));
    const Canopy caster = map.canopy(black());
    const double leaf = 0.5 * std::clamp(6.0 - height, 0.0, 4.0);
    for (const double tangent : {0.15, 0.4, 1.0, 3.0, 20.0, 500.0}) {
      for (const double azimuth : {0.0, 33.0, 45.0, 90.0, 171.0, 262.0}) {
        const double want = kG * leaf / sine_of(tangent);
        // Steep rays rise some bins per row; reading between bins errs by a bin and a half of the row they
        // lie in where the canopy's top is met, and by nothing inside.
        const double row = kG * 0.5 * std::sqrt(2.0) * std::hypot(1.0, tangent);
        const double slack = 0.001 + 0.002 * want + (tangent < 10 ? row / 16.0 : 0.0);
        EXPECT_NEAR(depth_at_middle(map, caster, azimuth, tangent), std::min(want, 65535 / 4096.0), slack)
            << height << " m, tangent " << tangent << ", azimuth " << azimuth;
      }
    }
  }
}

TEST(Canopy, ZenithIsTheLeafAreaAbove) {
  const CanopyMap map(
      flat,
      [](double, double) {
        return Column{1.0, 5.0, 0.7};
      },
      map_of(64, 1.0, 2.0));
  const double infinite = std::numeric_limits<double>::infinity();
  EXPECT_NEAR(depth_at_middle(map, map.canopy(black()), 10.0, infinite), kG * 0.7 * 3.0, 0.001);
}

// Chords of an ellipsoid of leaves burned in as columns, along rays through its middle: 2 / |d / radii|.
TEST(Canopy, ChordsOfOneCrown) {
  constexpr double kRadius = 6.0, kHalf = 5.0, kMiddle = 9.0, kDensity = 0.3, kCell = 0.5;
  const auto crown = [&](double east, double north) {
    const double part = 1.0 - (east * east + north * north) / (kRadius * kRadius);
    if (part <= 0.0) return Column{};
    return Column{kMiddle - kHalf * std::sqrt(part), kMiddle + kHalf * std::sqrt(part), kDensity};
  };
  SceneOptions options = map_of(241, kCell, 0.0);
  const CanopyMap map(flat, crown, options);
  const Canopy caster = map.canopy(black());
  for (const double azimuth : {0.0, 25.0, 117.0, 200.0, 290.0}) {
    for (const double tangent : {0.3, 0.6, 1.2}) {
      // The receiver that the crown's middle shades, to the nearest cell: its own ray passes the middle at an
      // offset.
      const double a = azimuth * std::numbers::pi / 180.0, reach = kMiddle / tangent / kCell;
      const int column = static_cast<int>(std::lround(120 - std::sin(a) * reach));
      const int row = static_cast<int>(std::lround(120 + std::cos(a) * reach));
      const std::vector<double> found = map.depths(caster, map.whole(), azimuth, tangent);
      // Chord of the ray p + t d with the ellipsoid, in space scaled to a unit sphere.
      const double dx = std::sin(a) / kRadius, dy = std::cos(a) / kRadius, dz = tangent / kHalf;
      const double px = (column - 120) * kCell / kRadius, py = (120 - row) * kCell / kRadius,
                   pz = -kMiddle / kHalf;
      const double dd = dx * dx + dy * dy + dz * dz, pd = px * dx + py * dy + pz * dz;
      const double discriminant = pd * pd - dd * (px * px + py * py + pz * pz - 1.0);
      ASSERT_GT(discriminant, 0.0);
      const double chord = 2.0 * std::sqrt(discriminant) / dd * std::hypot(1.0, tangent);
      // Both ends of a chord lie within a cell of the true surface.
      const double ends = kCell / std::min(1.0, tangent) * std::hypot(1.0, tangent);
      EXPECT_NEAR(found[static_cast<std::size_t>(row) * 241 + column], kG * kDensity * chord,
                  kG * kDensity * ends)
          << azimuth << ", " << tangent;
    }
  }
}

TEST(Canopy, NothingWithoutLeaves) {
  const CanopyMap map(
      flat,
      [](double, double) {
        return Column{0.0, 5.0, 0.0};
      },
      map_of(64));
  EXPECT_EQ(map.canopy().tile(map.scene.terrain().tile(map.whole())), nullptr);
}

TEST(Canopy, DenserNeverPassesMore) {
  const auto hills = [](double e, double n) { return 4.0 * std::sin(e * 0.05) + 3.0 * std::cos(n * 0.04); };
  const CanopyMap thin(hills, random_crown, map_of(150, 1.0, 0.5));
  const auto twice = [](double e, double n) {
    Column out = random_crown(e, n);
    out.density *= 1.0 + noise(static_cast<int>(e), static_cast<int>(n));
    return out;
  };
  const CanopyMap dense(hills, twice, map_of(150, 1.0, 0.5));
  for (const double azimuth : {12.0, 131.0, 222.0, 301.0}) {
    for (const double tangent : {0.02, 0.2, 0.9, 4.0}) {
      const auto less = thin.depths(thin.canopy(), thin.whole(), azimuth, tangent);
      const auto more = dense.depths(dense.canopy(), dense.whole(), azimuth, tangent);
      ASSERT_EQ(less.size(), more.size());
      for (std::size_t i = 0; i < less.size(); ++i) ASSERT_GE(more[i], less[i]);
    }
  }
}

// A windbreak 4 m deep and 8 m high without end: a ray that passes below its top and above its foot crosses 4
// m, whatever the cells. The light comes at an angle, at 20 m, where the hedge stands at 12° to 18° of
// elevation.
TEST(Canopy, WindbreakDoesNotKnowTheCells) {
  for (const double cell_m : {0.5, 1.0, 2.0}) {
    const auto hedge = [](double, double north) {
      return north > 20.0 && north < 24.0 ? Column{1.0, 8.0, 0.6} : Column{};
    };
    const CanopyMap map(flat, hedge, map_of(static_cast<int>(160 / cell_m), cell_m));
    const Canopy caster = map.canopy(black());
    for (const double azimuth : {0.0, 20.0, -35.0}) {
      const double along = std::cos(azimuth * std::numbers::pi / 180.0);
      const double tangent = 0.2 * along;  // 4 to 5 m high within the hedge
      const double want = kG * 0.6 * 4.0 / along * std::hypot(1.0, tangent);
      EXPECT_NEAR(depth_at_middle(map, caster, azimuth, tangent), want, 0.02 * want)
          << cell_m << ", " << azimuth;
    }
  }
}

// Beside the hedge, on the side of the light, nothing is in the way; nor for light along it.
TEST(Canopy, SunnySideIsUntouched) {
  const auto hedge = [](double, double north) {
    return north > -6.0 && north < -1.0 ? Column{0.0, 5.0, 1.0} : Column{};
  };
  const CanopyMap map(flat, hedge, map_of(120));
  const Canopy caster = map.canopy();
  for (const double tangent : {0.02, 0.3, 1.0, 10.0}) {
    for (const double azimuth : {0.0, 40.0, -60.0, 89.0}) {
      EXPECT_EQ(depth_at_middle(map, caster, azimuth, tangent), 0.0) << azimuth << ", " << tangent;
    }
  }
  EXPECT_GT(depth_at_middle(map, caster, 180.0, 0.3), 0.5);
}

// Turned by quarters and mirrored, a scene gives the same depths: to rounding, as bins lie elsewhere.
TEST(Canopy, TurnedAndMirrored) {
  constexpr int kSize = 128;
  const auto ground = [](double e, double n) {
    return 3.0 * std::sin(e * 0.07) + 2.0 * std::cos(n * 0.05 + 1.0);
  };
  const auto turned_ground = [&](double e, double n) { return ground(-n, e); };
  const auto turned_leaves = [](double e, double n) { return random_crown(-n, e); };
  const auto mirrored_ground = [&](double e, double n) { return ground(-e, n); };
  const auto mirrored_leaves = [](double e, double n) { return random_crown(-e, n); };
  const CanopyMap map(ground, random_crown, map_of(kSize, 1.0, 0.5));
  const CanopyMap turned(turned_ground, turned_leaves, map_of(kSize, 1.0, 0.5));
  const CanopyMap mirrored(mirrored_ground, mirrored_leaves, map_of(kSize, 1.0, 0.5));
  for (const double azimuth : {8.0, 71.0, 149.0, 284.0}) {
    for (const double tangent : {0.1, 0.8}) {
      const auto plain = map.depths(map.canopy(), map.whole(), azimuth, tangent);
      const auto by_quarter = turned.depths(turned.canopy(), turned.whole(), azimuth + 90.0, tangent);
      const auto other_side = mirrored.depths(mirrored.canopy(), mirrored.whole(), -azimuth, tangent);
      double turned_worst = 0.0, mirrored_worst = 0.0;
      for (int row = 0; row < kSize; ++row) {
        for (int column = 0; column < kSize; ++column) {
          const double here = plain[static_cast<std::size_t>(row) * kSize + column];
          // (e, n) of the turned scene shows what the plain one has at (-n, e).
          const auto quarter = by_quarter[static_cast<std::size_t>(column) * kSize + (kSize - 1 - row)];
          const auto side = other_side[static_cast<std::size_t>(row) * kSize + (kSize - 1 - column)];
          turned_worst = std::max(turned_worst, std::abs(here - quarter));
          mirrored_worst = std::max(mirrored_worst, std::abs(here - side));
        }
      }
      EXPECT_LT(turned_worst, 0.01) << azimuth << ", " << tangent;
      EXPECT_LT(mirrored_worst, 0.01) << azimuth << ", " << tangent;
    }
  }
}

// Leaves where no ground is known do not stand anywhere, and disturb nobody.
TEST(Canopy, UnknownGround) {
  const auto ground = [](double e, double n) {
    return std::hypot(e - 10.0, n) < 9.0 ? double(kMissing) : 10.0;
  };
  const auto crown = [](double e, double n) {
    return std::hypot(e - 10.0, n) < 5.0 ? Column{0.0, 8.0, 1.0} : Column{};
  };
  const CanopyMap map(ground, crown, map_of(100));
  EXPECT_EQ(map.canopy().tile(map.scene.terrain().tile(map.whole())), nullptr);
}

// Nothing above the tangent that the tile names is touched.
TEST(Canopy, HighestTangentIsABound) {
  const auto hills = [](double e, double n) { return 6.0 * std::sin(e * 0.05) + 3.0 * std::cos(n * 0.04); };
  const auto crown = [](double e, double n) { return e < -60.0 ? random_crown(e, n) : Column{}; };
  const CanopyMap map(hills, crown, map_of(256, 1.0, 0.5));
  const Canopy caster = map.canopy();
  const TerrainTile terrain = map.scene.terrain().tile({120, 96, 64, 64});
  const auto tile = caster.tile(terrain);
  ASSERT_TRUE(tile);
  for (int azimuth = 0; azimuth < 360; azimuth += 15) {
    const GridAzimuth towards{Angle::degrees(azimuth)};
    const float highest = tile->highest_tangent(towards);
    ASSERT_LT(highest, 10.0F);
    std::vector<Depth> depth(terrain.usable.size());
    EXPECT_FALSE(tile->add_depth(towards, highest * 1.001F + 1e-6F, depth)) << azimuth;
    for (const Depth d : depth) ASSERT_EQ(d, 0) << azimuth;
  }
  EXPECT_GT(tile->highest_tangent({Angle::degrees(270)}), 0.2F);
  EXPECT_EQ(tile->highest_tangent({Angle::degrees(90)}), 0.0F);
}

// √α, leaf angles and clumping all scale the depth.
TEST(Canopy, KindsOfLeaves) {
  const CanopyMap map(
      flat,
      [](double, double) {
        return Column{2.0, 6.0, 0.5};
      },
      map_of(300));
  CanopyOptions options;
  options.leaves = {2.0, 0.8, 0.64};
  // Campbell (1986): x = 2, e = √3/2, Λ = 2 + ln((1 + e)/(1 − e)) / (2 e · 2).
  const double e = std::sqrt(3.0) / 2.0, normal = 2.0 + std::log((1.0 + e) / (1.0 - e)) / (4.0 * e);
  const double sine = sine_of(0.6);
  const double g = std::sqrt(4.0 * sine * sine + 1.0 - sine * sine) / normal;
  const double want = 0.8 * g * 0.8 * 2.0 / sine;  // √0.64 G Ω L / sin e
  // As for the closed canopy above: rounding, and a sixteenth of what a row takes.
  const double row = 0.8 * g * 0.8 * 0.5 * std::hypot(1.0, 0.6) / std::sin(77.0 * std::numbers::pi / 180.0);
  EXPECT_NEAR(depth_at_middle(map, map.canopy(options), 77.0, 0.6), want, 0.001 + 0.002 * want + row / 16.0);
}

}  // namespace
}  // namespace sunfall::testing

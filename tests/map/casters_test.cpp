// Casters that let light through, in the map's sums. Their own geometry is tested in tests/shade.

#include <gtest/gtest.h>

#include <cmath>

#include "map/scene.h"
#include "map/tile_solver.h"
#include "shade/caster.h"
#include "sunfall/rows.h"

namespace sunfall::testing {
namespace {

// A cloth or a closed canopy above everything, so many leaves deep along the plumb line; a cloth is as
// deep along every ray.
class Roof : public Caster, public CasterTile {
 public:
  enum class Kind { cloth, canopy };
  Roof(Kind kind, double depth, std::array<double, 12> leafing = full_leaf())
      : kind_(kind), depth_(depth), leafing_(leafing) {}
  static std::array<double, 12> full_leaf() {
    std::array<double, 12> out;
    out.fill(1.0);
    return out;
  }

  const std::array<double, 12>& leafing() const override { return leafing_; }
  std::unique_ptr<CasterTile> tile(const TerrainTile&) const override {
    return std::make_unique<Roof>(*this);
  }
  float highest_tangent(GridAzimuth) override { return 1.0e9F; }
  bool add_depth(GridAzimuth, float tangent, std::span<Depth> depth) override {
    const double sine = tangent / std::sqrt(1.0 + double(tangent) * tangent);
    const double along = kind_ == Kind::cloth ? depth_ : depth_ / sine;
    for (Depth& d : depth)
      d = static_cast<Depth>(std::min(65535.0, d + std::round(along * double(kDepthUnits))));
    return true;
  }

 private:
  Kind kind_;
  double depth_;
  std::array<double, 12> leafing_;
};

Casters casters_of(std::initializer_list<Roof> roofs) {
  Casters out;
  for (const Roof& roof : roofs) out.push_back(std::make_unique<Roof>(roof));
  return out;
}

// Exponential integral of order 3, by quadrature over the sine: E3(x) = ∫ s e^(-x/s) ds.
double e3(double x) {
  double sum = 0.0;
  constexpr int kSteps = 200000;
  for (int i = 0; i < kSteps; ++i) {
    const double s = (i + 0.5) / kSteps;
    sum += s * std::exp(-x / s);
  }
  return sum / kSteps;
}

SceneOptions square() {
  SceneOptions options;
  options.columns = options.rows = 40;
  return options;
}
double flat(double, double) { return 0.0; }
constexpr std::size_t kMiddle = 20 * 40 + 20;

TileShares solve(const Scene& scene, const DomeLight& light, ReceiverPlane plane, const Casters& casters) {
  const TileSolver solver(scene.terrain(), light, plane, casters);
  return solver.solve(scene.terrain().tile({0, 0, 40, 40}), Angle());
}

DomeLight clear_months(const Dome& dome) {
  const Place place{Angle::degrees(52.0), Angle::degrees(5.0)};
  const LightSeries series = make_light(ClearSource{}, place, Clock::parse("+01:00", "test"), {}, "test");
  return make_dome_light(series, dome, SkyModel::isotropic, month_periods());
}

class Planes : public ::testing::TestWithParam<ReceiverPlane> {};

// Depths are rounded to 1/4096 and read to 4/4096, what they take to 1/32768: half of each, together.
constexpr double kCut = 0.5 * (1.0 + 4.0) / 4096.0 + 0.5 / 32768.0;

TEST_P(Planes, ClothTakesItsPartOfEverything) {
  const Scene scene(flat, {}, square());
  const DomeLight light = even_sky(Dome::of(DomeQuality::standard));
  for (const double depth : {0.1, 0.7, 3.0}) {
    const TileShares shares = solve(scene, light, GetParam(), casters_of({{Roof::Kind::cloth, depth}}));
    EXPECT_NEAR(shares.of(kMiddle)[kSkyColumn], std::exp(-depth), kCut) << depth;
  }
}

// 2·E3(L/2) of an even sky passes an unbroken canopy of spherical leaves (G = 1/2), L the leaf area over
// the ground: Ross 1981, and every text on canopies since. One ray stands for each of twenty bands.
TEST_P(Planes, UnbrokenCanopyPassesItsExponentialIntegral) {
  const Scene scene(flat, {}, square());
  const DomeLight light = even_sky(Dome::of(DomeQuality::standard));
  for (const double leaf_area : {0.2, 1.0, 3.0, 6.0}) {
    const TileShares shares =
        solve(scene, light, GetParam(), casters_of({{Roof::Kind::canopy, 0.5 * leaf_area}}));
    EXPECT_NEAR(shares.of(kMiddle)[kSkyColumn], 2.0 * e3(0.5 * leaf_area), 0.002) << leaf_area;
  }
}

// What a horizon leaves is what the cloth takes its part of.
TEST_P(Planes, ClothAndHorizonMultiply) {
  const Scene scene([](double east, double) { return east > 5.0 ? 8.0 : 0.0; }, {}, square());
  const DomeLight light = even_sky(Dome::of(DomeQuality::standard));
  const TileShares open = solve(scene, light, GetParam(), {});
  const TileShares under = solve(scene, light, GetParam(), casters_of({{Roof::Kind::cloth, 0.5}}));
  for (std::size_t cell = 0; cell < open.usable.size(); ++cell) {
    ASSERT_NEAR(under.of(cell)[kSkyColumn], open.of(cell)[kSkyColumn] * std::exp(-0.5), kCut) << cell;
  }
}

TEST_P(Planes, LeavesFollowTheirMonths) {
  std::array<double, 12> summer{};
  for (int m = 4; m < 9; ++m) summer[m] = 1.0;
  summer[9] = 0.5;
  const Scene scene(flat, {}, square());
  const DomeLight light = clear_months(Dome::of(DomeQuality::draft));
  const TileShares shares = solve(
      scene, light, GetParam(),
      casters_of(
          {{Roof::Kind::cloth, 0.8, summer}, {Roof::Kind::cloth, 0.3}, {Roof::Kind::cloth, 0.2, summer}}));
  for (int m = 0; m < 12; ++m) {
    EXPECT_NEAR(shares.of(kMiddle)[m], std::exp(-0.3 - summer[m]), kCut) << "beam of month " << m + 1;
    EXPECT_NEAR(shares.of(kMiddle)[12 + m], std::exp(-0.3 - summer[m]), kCut) << "sky of month " << m + 1;
  }
}

// As many states of leaf as a plan has ranges of days: no number of them is too many.
TEST_P(Planes, EveryRangeHasItsOwnLeaves) {
  std::array<double, 12> growing{};
  for (std::size_t m = 0; m < 12; ++m) growing[m] = double(m) / 11.0;
  std::vector<Period> periods = month_periods();
  for (unsigned i = 0; i < 80; ++i) {
    const std::chrono::sys_days from{std::chrono::year{2025} / 1 / 1};
    const std::chrono::year_month_day first{from + std::chrono::days{i}},
        last{from + std::chrono::days{160 + 2 * i}};
    periods.push_back({"r" + std::to_string(i), first.month() / first.day(), last.month() / last.day()});
  }
  const Place place{Angle::degrees(52.0), Angle::degrees(5.0)};
  const LightSeries series = make_light(ClearSource{}, place, Clock::parse("+01:00", "test"), {}, "test");
  const DomeLight light = make_dome_light(series, Dome::of(DomeQuality::draft), SkyModel::isotropic, periods);
  const Scene scene(flat, {}, square());
  const TileShares shares = solve(scene, light, GetParam(), casters_of({{Roof::Kind::cloth, 0.8, growing}}));
  for (std::size_t p = 0; p < periods.size(); ++p) {
    // Leafing is kept in 1/256.
    EXPECT_NEAR(shares.of(kMiddle)[p], std::exp(-0.8 * leafing_of(periods[p], growing)),
                kCut + 0.8 * 0.5 / 256)
        << periods[p].name;
  }
}

INSTANTIATE_TEST_SUITE_P(Casters, Planes, ::testing::Values(ReceiverPlane::level, ReceiverPlane::ground));

}  // namespace
}  // namespace sunfall::testing

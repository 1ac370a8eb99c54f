// Flat open ground gets what the open field gets, anywhere and in any dome.

#include <gtest/gtest.h>

#include <fmt/format.h>

#include "map/layers.h"
#include "map/map_run.h"

namespace sunfall::testing {
namespace {

// Mean daily photons of each month, straight from the series' steps.
std::vector<double> monthly_dli(const LightSeries& series) {
  std::vector<double> sums(12, 0.0);
  const double mol_per_umol_s = 1e-6 * static_cast<double>(series.sun.step.count());
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    sums[static_cast<std::size_t>(month_of_step(series, i))] +=
        (double(series.steps[i].beam_umol) + series.steps[i].sky_umol) * mol_per_umol_s;
  }
  const auto days = days_of_months(series);
  for (std::size_t month = 0; month < 12; ++month) sums[month] /= days[month];
  return sums;
}

struct PlaceOnEarth {
  const char* name;
  int epsg;
  double longitude_deg;
  double latitude_deg;
};
constexpr PlaceOnEarth kPlaces[] = {{"52 N", 32631, 5.0, 52.0},
                                    {"34 S", 32734, 20.0, -34.0},
                                    {"equator", 32631, 2.0, 0.0},
                                    {"69 N", 32633, 16.0, 69.0}};

// The year's plan for flat ground at a place, 2024: a leap year.
struct FlatPlace {
  explicit FlatPlace(const PlaceOnEarth& place)
      : options(centred(small(), place.epsg, place.longitude_deg, place.latitude_deg)),
        scene([](double, double) { return 7.0; }, {}, options),
        plan(clear_plan(scene, options, 2024)) {}
  static SceneOptions small() {
    SceneOptions options;
    options.columns = 19;
    options.rows = 11;
    options.receiver_height_m = 0.5;
    return options;
  }
  SceneOptions options;
  Scene scene;
  Plan plan;
};

void expect_the_open_field(const FlatPlace& flat, const PlanLight& light) {
  const std::vector<double> expected = monthly_dli(light.site.series);
  const TileShares shares = whole_shares(flat.scene, light.dome);
  for (const float share : shares.shares) ASSERT_EQ(share, 1.0F);
  const TileLight cells = light_of(shares, open_field(light.dome));
  for (std::size_t month = 0; month < 12; ++month) {
    for (const float dli : cells.dli[month])
      ASSERT_NEAR(dli, expected[month], kFloatRounding * expected[month]) << "month " << month + 1;
  }
}

TEST(OpenGround, GetsTheOpenFieldInTheDraftAndStandardDome) {
  for (const PlaceOnEarth& place : kPlaces) {
    FlatPlace flat(place);
    for (const DomeQuality quality : {DomeQuality::draft, DomeQuality::standard}) {
      SCOPED_TRACE(fmt::format("{}, quality {}", place.name, static_cast<int>(quality)));
      flat.plan.dome.quality = quality;
      expect_the_open_field(flat, light_of_plan(flat.plan));
    }
  }
}

// An even sky: the fine dome with the all-weather sky would take the test's time several times over,
// and its shape is not what is asked here.
TEST(OpenGround, GetsTheOpenFieldInTheFineDome) {
  for (const PlaceOnEarth& place : kPlaces) {
    SCOPED_TRACE(place.name);
    FlatPlace flat(place);
    flat.plan.dome = {DomeQuality::fine, SkyModel::isotropic};
    expect_the_open_field(flat, light_of_plan(flat.plan));
  }
}

// The same through the files: layers hold the open field, but for their rounding.
TEST(OpenGround, LayersHoldTheOpenField) {
  FlatPlace flat(kPlaces[1]);
  flat.plan.output.shares = true;
  const PlanLight light = light_of_plan(flat.plan);
  const MapRun run(flat.plan, light);
  const std::vector<double> expected = monthly_dli(light.site.series);
  for (std::size_t month = 0; month < 12; ++month) {
    const std::string name = light.dome.periods[month].name;
    for (const float dli : run.dli(name).values())
      ASSERT_NEAR(dli, expected[month], kDliRounding + kFloatRounding * expected[month]) << name;
    for (const char* kind : {"beam", "sky"}) {
      for (const float share : run.layer(fmt::format("share-{}-{}.tif", kind, name)).values())
        ASSERT_EQ(share, 1.0F) << name;
    }
  }
}

// 69° N in December: the sun stays down (declination below -21.7°), also among hills.
TEST(OpenGround, MonthsWithoutLightHaveWholeSharesAndNoLight) {
  const PlaceOnEarth place = kPlaces[3];
  SceneOptions options = centred(FlatPlace::small(), place.epsg, place.longitude_deg, place.latitude_deg);
  Scene scene([](double east, double north) { return 0.5 * std::abs(east) + 0.2 * north; }, {}, options);
  for (const ReceiverPlane plane : {ReceiverPlane::level, ReceiverPlane::ground}) {
    Plan plan = clear_plan(scene, options, 2024);
    plan.site.receiver_plane = plane;
    plan.output.shares = true;
    const PlanLight light = light_of_plan(plan);
    ASSERT_EQ(light.dome.beam.open[11], 0.0);
    const MapRun run(plan, light);
    for (const float share : run.layer("share-beam-12.tif").values()) ASSERT_EQ(share, 1.0F);
    for (const float share : run.layer("share-sky-12.tif").values()) ASSERT_EQ(share, 1.0F);
    for (const float dli : run.dli("12").values()) ASSERT_EQ(dli, 0.0F);
    for (const float month : run.layer("dli-lowest-month.tif").values()) ASSERT_EQ(month, 12.0F);
    EXPECT_NE(run.layer("share-beam-03.tif").at(9, 5), 1.0F);  // where there is sun, the ground counts
  }
}

}  // namespace
}  // namespace sunfall::testing

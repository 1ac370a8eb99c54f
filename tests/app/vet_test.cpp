// sunfall vet on the demo farm: what will run, how large, how long.

#include <gmock/gmock.h>

#include <cmath>
#include <nlohmann/json.hpp>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

const std::string kDemo = SUNFALL_FIELDS "/alder-reach/alder-reach.toml";

TEST(Vet, TellsWhatWillRun) {
  const Outcome outcome = sunfall_run({"vet", kDemo, "--dome", "draft"});
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  for (const char* part :
       {"Alder Reach\n", "Grid       720 × 600 cells of 1 m, EPSG:25831", "Place      5.", "° E, 51.",
        "grid north is 2.19° east of true north", "Shade      ground, surface, far ground",
        "Receiver   0.5 m above the ground, level", "Light      monthly means", "per J of global radiation",
        "Open field ", "mol m-2 d-1, January to December", "Dome       36 sectors × 15 bands",
        "Plots      10", "tiles, about ", " s, about ", " MiB of memory",
        "Left open in the plan:", "light.year = 2025", "Notes:"}) {
    EXPECT_THAT(outcome.out, HasSubstr(part));
  }
}

// Convergence from the closed form atan(tan(longitude - central meridian) sin latitude), good to the
// eccentricity's square (0.7 %) of itself this near the meridian.
TEST(Vet, JsonHoldsTheSame) {
  const Outcome outcome = sunfall_run({"vet", kDemo, "--dome", "draft", "--json"});
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_EQ(std::count(outcome.out.begin(), outcome.out.end(), '\n'), 1);
  const auto json = nlohmann::json::parse(outcome.out);
  EXPECT_EQ(json["grid"]["columns"], 720);
  EXPECT_EQ(json["grid"]["rows"], 600);
  EXPECT_EQ(json["grid"]["cell_m"], 1.0);
  const double radian = 3.14159265358979 / 180.0;
  const double longitude = json["place"]["longitude"], latitude = json["place"]["latitude"];
  const double convergence =
      std::atan(std::tan((longitude - 3.0) * radian) * std::sin(latitude * radian)) / radian;
  EXPECT_NEAR(json["place"]["convergence_deg"].get<double>(), convergence, 0.007 * convergence);
  EXPECT_EQ(json["open_field_dli_month"].size(), 12U);
  EXPECT_EQ(json["plots"], 10);
  EXPECT_EQ(json["tiles"], 4);
  EXPECT_GT(json["expected_s"].get<double>(), 0.0);
  EXPECT_GT(json["expected_memory_mib"].get<double>(), 0.0);
  EXPECT_FALSE(json["defaults"].empty());
  EXPECT_FALSE(json["notes"].empty());
  EXPECT_EQ(outcome.err, "");
}

TEST(Vet, QuietIsSilent) {
  const Outcome outcome = sunfall_run({"vet", kDemo, "--dome", "draft", "--quiet"});
  EXPECT_EQ(outcome.status, 0);
  EXPECT_EQ(outcome.out, "");
  EXPECT_EQ(outcome.err, "");
}

// Heights above the ground taken for a surface, and a clock from the other side of the ocean: both run, as
// both may be meant, and both are said aloud.
TEST(Vet, SaysWhatLooksOdd) {
  const SmallFarm farm;
  RasterOrder above_ground = farm_ground();
  above_ground.values.assign(above_ground.values.size(), 0.0);
  make_raster(farm / "surface.tif", above_ground);
  write_text(farm / "odd.toml",
             "[site]\nground = 'ground.tif'\nsurface = 'surface.tif'\nclock = '-05:00'\n" + kMonthlyLight);
  for (const std::vector<std::string>& command :
       {std::vector<std::string>{"vet", "odd.toml"}, {"map", "odd.toml", "-o", "run"}}) {
    const Outcome outcome = farm.run(command);
    EXPECT_EQ(outcome.status, 0) << outcome.err;
    EXPECT_THAT(outcome.out, HasSubstr("surface lies more than 2 m below ground in 100 % of the cells"));
    // 5.8° E is 0.4 h ahead of Greenwich.
    EXPECT_THAT(outcome.out, HasSubstr("the clock (UTC-5) stands 5.4 h behind the sun"));
  }
}

TEST(Vet, RealGroundToo) {
  const Outcome outcome = sunfall_run({"vet", SUNFALL_FIELDS "/olinda/olinda.toml", "--dome", "draft"});
  EXPECT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_THAT(outcome.out, HasSubstr("° S"));
}

}  // namespace
}  // namespace sunfall::test

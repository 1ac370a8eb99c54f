// Plans that are right: every value arrives, every gap is filled and told.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "plan/plan_folder.h"

namespace sunfall::testing {
namespace {

using std::chrono::day;
using std::chrono::month;
using ::testing::ElementsAre;
using ::testing::HasSubstr;

constexpr const char* kWhole = R"(
[plan]
name = "Alder Reach"
[site]
ground = "ground.tif"
surface = "surface.tif"
far_ground = "county.tif"
receiver_height = 1
receiver_plane = "ground"
clock = "+05:45"
[light]
monthly_global = [2, 4.1, 8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 1.8]
year = 2024
days = "mean"
day_split = "collares-pereira"
[periods]
zenith = { from = "06-01", to = "07-31" }
autumn = { from = "09-01", to = "11-30" }
[plots]
file = "plots.gpkg"
layer = "beds"
id = "bed"
crop = "planted"
[dome]
quality = "fine"
sky = "overcast"
[output]
shares = true
percentiles = true
)";

TEST(ReadPlan, CarriesEveryValue) {
  const PlanFolder folder;
  const Plan plan = folder.read(kWhole);
  EXPECT_EQ(plan.file, folder.plan_file());
  EXPECT_EQ(plan.name, "Alder Reach");
  EXPECT_EQ(plan.site.ground, folder.path() / "ground.tif");
  EXPECT_EQ(plan.site.surface, folder.path() / "surface.tif");
  EXPECT_EQ(plan.site.far_ground, folder.path() / "county.tif");
  EXPECT_EQ(plan.site.receiver_height_m, 1.0);
  EXPECT_EQ(plan.site.receiver_plane, ReceiverPlane::ground);
  EXPECT_EQ(plan.site.clock.name(), "+05:45");
  const auto& light = std::get<MonthlyGlobalSource>(plan.light);
  EXPECT_EQ(light.split, DaySplit::collares_pereira);
  EXPECT_THAT(light.global_mj_m2_d,
              ElementsAre(2, 4.1, 8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 1.8));
  EXPECT_EQ(plan.light_where, folder.plan_file().string() + ":12 light.monthly_global");
  EXPECT_EQ(plan.light_options.year, 2024);
  ASSERT_TRUE(plan.plots.has_value());
  EXPECT_EQ(plan.plots->file, folder.path() / "plots.gpkg");
  EXPECT_EQ(plan.plots->layer, "beds");
  EXPECT_EQ(plan.plots->id, "bed");
  EXPECT_EQ(plan.plots->crop, "planted");
  EXPECT_EQ(plan.dome.quality, DomeQuality::fine);
  EXPECT_EQ(plan.dome.sky, SkyModel::overcast);
  EXPECT_TRUE(plan.output.shares);
  EXPECT_TRUE(plan.output.percentiles);
  EXPECT_EQ(plan.output.percentiles_where, folder.plan_file().string() + ":29 output.percentiles");
  EXPECT_THAT(plan.defaults, ElementsAre("periods.months = true"));
}

TEST(ReadPlan, PutsMonthsBeforeSeasonsInThePlansOrder) {
  const PlanFolder folder;
  const std::vector<Period> periods = folder.read(kWhole).periods;
  ASSERT_EQ(periods.size(), 14U);
  EXPECT_EQ(periods[0].name, "01");
  EXPECT_EQ(periods[11].name, "12");
  EXPECT_EQ(periods[12].name, "zenith");  // before autumn: the plan's order, not the alphabet's
  EXPECT_EQ(periods[13].name, "autumn");
  EXPECT_EQ(periods[13].from, month{9} / day{1});
  EXPECT_EQ(periods[13].to, month{11} / day{30});
}

TEST(ReadPlan, TellsWhatTheShortestPlanLeavesOpen) {
  const PlanFolder folder;
  const Plan plan = folder.read(plan_with(""));
  EXPECT_EQ(plan.name, "farm");
  EXPECT_FALSE(plan.site.surface.has_value());
  EXPECT_FALSE(plan.site.far_ground.has_value());
  EXPECT_FALSE(plan.plots.has_value());
  EXPECT_EQ(plan.periods.size(), 12U);
  EXPECT_EQ(plan.light_where, folder.plan_file().string() + ":5 light.clear");
  EXPECT_THAT(
      plan.defaults,
      ElementsAre("plan.name = the file's name", "site.surface = none (nothing solid stands on the ground)",
                  "site.far_ground = none (the horizon beyond the ground's edge is not known)",
                  "site.receiver_height = 0.5 m", "site.receiver_plane = \"level\"", "light.year = 2025",
                  "light.turbidity = 3 in every month", "periods.months = true",
                  "plots.file = none (no table of plots is made)", "dome.quality = \"standard\"",
                  "dome.sky = \"clearness\"", "output.shares = false", "output.percentiles = false"));
}

// What the defaults say in words must be what the plan then holds.
TEST(ReadPlan, HoldsTheDefaultsThatItTells) {
  const PlanFolder folder;
  const Plan plan = folder.read(plan_with("[plots]\nfile = 'plots.gpkg'\n"));
  EXPECT_EQ(plan.site.receiver_height_m, 0.5);
  EXPECT_EQ(plan.site.receiver_plane, ReceiverPlane::level);
  EXPECT_EQ(plan.light_options.year, 2025);
  EXPECT_THAT(std::get<ClearSource>(plan.light).linke_turbidity, ::testing::Each(3.0));
  EXPECT_EQ(plan.dome.quality, DomeQuality::standard);
  EXPECT_EQ(plan.dome.sky, SkyModel::clearness);
  EXPECT_FALSE(plan.output.shares);
  EXPECT_FALSE(plan.output.percentiles);
  ASSERT_TRUE(plan.plots.has_value());
  EXPECT_EQ(plan.plots->layer, "");
  EXPECT_EQ(plan.plots->id, "id");
  EXPECT_FALSE(plan.plots->crop.has_value());
  EXPECT_THAT(plan.defaults,
              ::testing::IsSupersetOf({"plots.layer = the file's only layer", "plots.id = \"id\"",
                                       "plots.crop = none (no crop is named)"}));
}

TEST(ReadPlan, TakesDottedKeysAndWindowsLineEnds) {
  const PlanFolder folder;
  const Plan plan = folder.read(
      "\xEF\xBB\xBFsite.ground = 'ground.tif'\r\nsite.clock = 'UTC'\r\nlight = { clear = true }\r\n");
  EXPECT_EQ(plan.site.clock.name(), "UTC");
  EXPECT_EQ(plan.light_where, folder.plan_file().string() + ":3 light.clear");
}

TEST(ReadPlan, ResolvesPathsFromThePlansOwnFolder) {
  const PlanFolder folder;
  std::filesystem::create_directory(folder.path() / "plans");
  folder.write("plans/farm.toml", "[site]\nground = '../ground.tif'\nclock = 'UTC'\n[light]\nclear = true\n");
  const Plan plan = read_plan(folder.path() / "plans" / "farm.toml");
  EXPECT_EQ(plan.site.ground, folder.path() / "plans" / "../ground.tif");
  const std::string absolute = (folder.path() / "surface.tif").string();
  EXPECT_EQ(folder.read(plan_with_site("ground = '" + absolute + "'\nclock = 'UTC'")).site.ground, absolute);
}

}  // namespace
}  // namespace sunfall::testing

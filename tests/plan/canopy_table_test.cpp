// [[canopy]]: what is read and what is refused.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <string>

#include "plan/plan_folder.h"

namespace sunfall::testing {
namespace {

using ::testing::AllOf;
using ::testing::Contains;
using ::testing::HasSubstr;

// [[canopy]] stands in line 6.
std::string canopy(const std::string& lines) { return plan_with("[[canopy]]\n" + lines); }

std::string trees(const std::string& keys, const std::string& more = "") {
  return canopy("trees = { file = 'trees.gpkg', " + keys + " }\n" + more);
}

TEST(CanopyTable, ReadsNumbersRastersAndFields) {
  const PlanFolder folder;
  const Plan plan = folder.read(
      canopy("top = 'tree_top.tif'\nbase = 1.5\nleaf_density = 0.9\nclumping = 0.8\n[[canopy]]\n"
             "leafing = [0, 0, 0, 0.5, 1, 1, 1, 1, 1, 0.5, 0, 0]\nname = 'lane'\n"
             "[canopy.trees]\nfile = 'trees.gpkg'\nlayer = 'lane'\nwhere = 'h > 2'\nheight = 'h'\n"
             "crown_width = 6\nleaf_density = 'lad'\nspecies = 'kind'\n"));
  ASSERT_EQ(plan.canopy.size(), 2U);
  const CanopyPlan& wood = plan.canopy[0];
  EXPECT_EQ(wood.top_m.file->filename(), "tree_top.tif");
  EXPECT_EQ(wood.base_m.number, 1.5);
  EXPECT_FALSE(wood.base_m.file);
  EXPECT_EQ(wood.leaf_density->number, 0.9);
  EXPECT_EQ(wood.clumping, 0.8);
  EXPECT_EQ(wood.leafing[0], 1.0);
  EXPECT_THAT(wood.where, HasSubstr("farm.toml:6 canopy"));
  const CanopyPlan& lane = plan.canopy[1];
  ASSERT_TRUE(lane.trees);
  EXPECT_EQ(lane.name, "lane");
  EXPECT_EQ(lane.leafing[3], 0.5);
  EXPECT_EQ(lane.trees->layer.layer, "lane");
  EXPECT_EQ(lane.trees->layer.where, "h > 2");
  EXPECT_EQ(lane.trees->height_m.field, "h");
  EXPECT_EQ(lane.trees->crown_base_m.number, 0.0);
  EXPECT_EQ(lane.trees->crown_width_m->number, 6.0);
  EXPECT_EQ(lane.trees->leaf_density->field, "lad");
  EXPECT_EQ(lane.trees->species, "kind");
  EXPECT_THAT(plan.defaults,
              AllOf(Contains("canopy.leaf_angle = 1"), Contains("canopy.trees.crown_base = 0 m"),
                    Contains("canopy.leafing = 1 all year")));
}

TEST(CanopyTable, ReadsAWindbreak) {
  const PlanFolder folder;
  const Plan plan = folder.read(canopy("top = 8\noptical_porosity = 0.4\nwidth = 3\n"));
  ASSERT_TRUE(plan.canopy.at(0).windbreak);
  EXPECT_EQ(plan.canopy[0].windbreak->optical_porosity, 0.4);
  EXPECT_EQ(plan.canopy[0].windbreak->width_m, 3.0);
  EXPECT_THAT(plan.canopy[0].windbreak->where, HasSubstr("farm.toml:8 canopy.optical_porosity"));
  EXPECT_TRUE(folder.read(trees("height = 5", "optical_porosity = 0.4\nwidth = 3\n")).canopy[0].windbreak);
}

TEST(CanopyTable, RefusesNumbersThatCannotBe) {
  const PlanFolder folder;
  folder.expect_fault(canopy("top = 2\nbase = 2.5\nleaf_density = 1\n"), "farm.toml:8 canopy.base",
                      "the leaves begin at or above the height where they end", "base 2.5 m, top 2 m",
                      "Both count from the ground");
  EXPECT_EQ(folder.fault(trees("height = 2, crown_base = 2, leaf_density = 1")).where,
            "farm.toml:7 canopy.trees.crown_base");
  for (const char* density : {"-0.1", "20.5"}) {
    EXPECT_EQ(folder.fault(canopy(std::string("top = 2\nleaf_density = ") + density + "\n")).what,
              "must lie between 0 and 20 m2 m-3");
    EXPECT_EQ(folder.fault(trees(std::string("height = 2, leaf_density = ") + density)).what,
              "must lie between 0 and 20 m2 m-3");
  }
  EXPECT_THAT(folder.fault(canopy("top = 250\nleaf_density = 1\n")).remedy, HasSubstr("not from the sea"));
  EXPECT_EQ(folder.fault(canopy("top = 2\nwidth = 1\noptical_porosity = 0\n")).what,
            "must lie between 0.01 and 1");
}

TEST(CanopyTable, RefusesLeafingOutsideAYear) {
  const PlanFolder folder;
  const std::string good = "top = 2\nleaf_density = 1\n";
  EXPECT_THAT(folder.fault(canopy(good + "leafing = [1, 1, 1]\n")).message, HasSubstr("found: 3 numbers"));
  EXPECT_EQ(folder.fault(canopy(good + "leafing = [1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1.1]\n")).what,
            "the value for December must lie between 0 and 1");
  EXPECT_EQ(folder.fault(canopy(good + "leafing = [-0.1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1]\n")).what,
            "the value for January must lie between 0 and 1");
  EXPECT_THAT(folder.fault(canopy(good + "leafing = 0.5\n")).what, HasSubstr("twelve numbers"));
}

TEST(CanopyTable, RefusesWhatIsMissingOrSaidTwice) {
  const PlanFolder folder;
  EXPECT_EQ(folder.fault(canopy("leaf_density = 1\n")).what, "neither top nor trees is given");
  EXPECT_EQ(folder.fault(canopy("top = 2\n")).what, "no leaf density is given");
  EXPECT_EQ(folder.fault(trees("height = 2")).where, "farm.toml:7 canopy.trees");
  EXPECT_EQ(folder.fault(trees("leaf_density = 2")).where, "farm.toml:7 canopy.trees.height");
  EXPECT_EQ(folder.fault(trees("height = 2, leaf_density = 2", "top = 3\n")).remedy,
            "Write it as trees.height");
  EXPECT_THAT(folder.fault(canopy("top = 2\nleaf_density = 1\nwidth = 2\noptical_porosity = 0.5\n")).what,
              HasSubstr("given twice"));
  EXPECT_THAT(folder.fault(canopy("top = 2\nwidth = 2\n")).what,
              HasSubstr("optical_porosity, which is missing"));
  EXPECT_THAT(folder.fault(canopy("top = 2\noptical_porosity = 0.5\n")).what,
              HasSubstr("width, which is missing"));
}

TEST(CanopyTable, RefusesTextsThatAreNoPathOrField) {
  const PlanFolder folder;
  folder.expect_fault(canopy("top = '3.5'\nleaf_density = 1\n"), "farm.toml:7 canopy.top",
                      "must be a number or a raster's path", "a string: \"3.5\"",
                      "Write the number without quotes");
  EXPECT_EQ(folder.fault(trees("height = '3.5', leaf_density = 1")).what,
            "must be a number or a field's name");
  EXPECT_THAT(folder.fault(canopy("top = true\nleaf_density = 1\n")).what,
              HasSubstr("a number, or the path"));
  EXPECT_THAT(folder.fault(trees("height = [1], leaf_density = 1")).what, HasSubstr("a number, or the name"));
  folder.expect_fault(canopy("top = 'tree_tip.tif'\nleaf_density = 1\n"), "farm.toml:7 canopy.top",
                      "the file does not exist", "\"tree_tip.tif\"", "Perhaps \"tree_top.tif\" is meant",
                      ErrorKind::data);
  EXPECT_THAT(folder.fault(canopy("top = '/vsicurl/x'\nleaf_density = 1\n")).what, HasSubstr("virtual path"));
  EXPECT_THAT(folder.fault(trees("heigth = 3, leaf_density = 1")).remedy, HasSubstr("\"height\""));
  EXPECT_THAT(folder.fault(plan_with("[canopy]\ntop = 2\nleaf_density = 1\n")).remedy,
              HasSubstr("Write [[canopy]]"));
}

}  // namespace
}  // namespace sunfall::testing

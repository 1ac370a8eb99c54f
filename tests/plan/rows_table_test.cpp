// [[rows]]: what is read and what is refused.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <fstream>
#include <string>

#include "plan/plan_folder.h"
#include "sunfall/error.h"
#include "sunfall/plan.h"

namespace sunfall::testing {
namespace {

std::string rows_with(const std::string& more) {
  return plan_with("[[rows]]\narea = { file = 'ground.tif' }\n" + more);
}

const std::string kGood =
    "azimuth = 12\nspacing = 3.5\nheight = 3.2\nwidth = 1.4\nbase = 0.6\nleaf_density = 1.6\n";

// The message where the rest of the table stands in for the fault.
std::string fault(const std::string& text) {
  const PlanFolder folder;
  try {
    folder.read(text);
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::plan);
    return error.what();
  }
  return "";
}

std::string changed(const std::string& from, const std::string& to) {
  std::string text = kGood;
  return rows_with(text.replace(text.find(from), from.size(), to));
}

TEST(RowsTable, ReadsEachOfTheArray) {
  const PlanFolder folder;
  const Plan plan =
      folder.read(rows_with(kGood + "section = 'wedge'\n[[rows]]\narea = { file = 'ground.tif' }\n" + kGood +
                            "leafing = [0, 0, 0, 0.5, 1, 1, 1, 1, 1, 0.5, 0, 0]\n"));
  ASSERT_EQ(plan.rows.size(), 2U);
  EXPECT_EQ(plan.rows[0].rows.section, RowSection::wedge);
  EXPECT_EQ(plan.rows[1].rows.section, RowSection::box);
  EXPECT_EQ(plan.rows[0].rows.spacing_m, 3.5);
  EXPECT_EQ(plan.rows[0].leafing[0], 1.0);
  EXPECT_EQ(plan.rows[1].leafing[3], 0.5);
  EXPECT_NEAR(plan.rows[0].azimuth.from_true_north.degrees(), 12.0, 1e-12);
  EXPECT_TRUE(folder.read(plan_with("")).rows.empty());
}

TEST(RowsTable, RefusesWhatCannotBe) {
  using ::testing::HasSubstr;
  EXPECT_THAT(fault(changed("width = 1.4", "width = 3.6")), HasSubstr("wider than their spacing"));
  EXPECT_THAT(fault(changed("base = 0.6", "base = 3.2")), HasSubstr("at or above the height"));
  EXPECT_THAT(fault(changed("leaf_density = 1.6", "leaf_density = -1")), HasSubstr("between 0 and 20"));
  EXPECT_THAT(fault(changed("leaf_density = 1.6", "leaf_density = 20.5")), HasSubstr("between 0 and 20"));
  EXPECT_THAT(fault(changed("azimuth = 12", "azimuth = 370")), HasSubstr("between 0 and 360"));
  EXPECT_THAT(fault(changed("azimuth = 12", "")), HasSubstr("azimuth"));
  EXPECT_THAT(fault(rows_with(kGood + "section = 'elipse'\n")), HasSubstr("ellipse"));
  EXPECT_THAT(fault(rows_with(kGood + "leafing = [1, 1, 1]\n")), HasSubstr("leafing"));
  EXPECT_THAT(fault(rows_with(kGood + "leafing = [1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1.1]\n")),
              HasSubstr("December must lie between 0 and 1"));
  EXPECT_THAT(fault(rows_with(kGood + "spaceing = 3\n")), HasSubstr("spacing"));
  EXPECT_THAT(fault(plan_with("[[rows]]\n" + kGood)), HasSubstr("rows.area"));
  EXPECT_THAT(fault(plan_with("[rows]\n" + kGood)), HasSubstr("Write [[rows]]"));
}

}  // namespace
}  // namespace sunfall::testing

// docs/plan.md and the code say the same: the same tables, keys, types, units, defaults and ranges,
// compared both ways, and the page's example plans are plans.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "plan/plan_document.h"
#include "plan/plan_folder.h"
#include "plan/table_rules.h"

namespace sunfall::testing {
namespace {

std::vector<std::string> lines_of(const std::vector<TableShape>& tables) {
  std::vector<std::string> lines;
  for (const TableShape& table : tables) {
    lines.push_back("[" + table.name + "]");
    for (const KeyNote& key : table.keys) {
      lines.push_back(table.name + "." + key.name + " | " + key.type + " | " + key.unit + " | " +
                      key.fallback + " | " + key.range);
    }
    for (const std::string& line : lines_of(table.named)) lines.push_back(line);
    for (const std::string& line : lines_of(table.inner)) lines.push_back(line);
  }
  return lines;
}

std::vector<TableShape> known_tables() {
  std::vector<TableShape> tables;
  for (const TableRule& rule : table_rules()) tables.push_back(rule.shape);
  return tables;
}

TEST(PlanDocument, ListsExactlyTheKeysThatTheCodeKnows) {
  EXPECT_THAT(lines_of(documented_tables(plan_page())),
              ::testing::UnorderedElementsAreArray(lines_of(known_tables())));
}

// The comparison is worth something only while it reads the page: one key is enough to tell.
TEST(PlanDocument, ReadsThePagesTables) {
  const std::vector<std::string> lines = lines_of(documented_tables(
      "## `[house]`\n\n| key | x |\n|---|---|\n| `eave` | number | m | 4 | 1 to 9 | High. |\n"));
  EXPECT_THAT(lines, ::testing::ElementsAre("[house]", "house.eave | number | m | 4 | 1 to 9"));
}

TEST(PlanDocument, NamesEveryTableThatIsNotBuiltYet) {
  const std::string page = plan_page();
  for (const std::string& name : tables_not_built_yet()) {
    EXPECT_NE(page.find("`" + name + "`"), std::string::npos) << name;
  }
  for (const TableRule& rule : table_rules()) {
    for (const auto& [name, remedy] : rule.shape.later) {
      EXPECT_NE(page.find("`" + name + "`"), std::string::npos) << name;
    }
  }
}

TEST(PlanDocument, HoldsPlansThatCanBeRead) {
  const PlanFolder folder;
  const std::vector<std::string> plans = example_plans(plan_page());
  ASSERT_EQ(plans.size(), 7U);
  const Plan whole = folder.read(plans[0]);
  EXPECT_EQ(whole.name, "Alder Reach");
  EXPECT_THAT(whole.defaults, ::testing::ElementsAre("light.year = 2025", "periods.months = true"));
  const Plan shortest = folder.read(plans[1]);
  EXPECT_EQ(shortest.site.clock.name(), "+01:00");
  const Plan station = folder.read(plans[2]);
  EXPECT_EQ(std::get<SeriesSource>(station.light).global, "GHI");
  const Plan grid = folder.read(plans[3]);
  EXPECT_EQ(std::get<GridSource>(grid.light).beam, "fdir");
  EXPECT_EQ(std::get<SunshineSource>(folder.read(plans[4]).light).hours, "sunshine_hours");
  EXPECT_EQ(std::get<MonthlyGlobalSource>(folder.read(plans[5]).light).years, 10);
  const Plan leaves = folder.read(plans[6]);
  ASSERT_EQ(leaves.canopy.size(), 2U);
  EXPECT_EQ(leaves.canopy[0].trees->height_m.field, "height");
  EXPECT_EQ(leaves.rows.at(0).area.where, "id = 'P3'");
}

}  // namespace
}  // namespace sunfall::testing

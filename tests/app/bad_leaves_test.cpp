// Leaves of a plan that cannot be, met through the program.

#include <gmock/gmock.h>

#include <fmt/format.h>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

// [[canopy]] or [[rows]] stands in line 6.
void expect_leaves_refused(const std::string& table, int status, const std::vector<std::string>& parts) {
  SCOPED_TRACE(table);
  const SmallFarm farm;
  farm.write_plots();
  farm.write_plan("", table);
  expect_all_refuse(farm, status, parts);
}

std::string rows_with(const std::string& change) {
  return "[[rows]]\narea = { file = 'plots.geojson' }\nazimuth = 12\nspacing = 3.5\nheight = "
         "3.2\nleaf_density = 1.6\n" +
         change;
}

TEST(BadLeaves, TopUnderBase) {
  expect_leaves_refused("[[canopy]]\ntop = 2\nbase = 3\nleaf_density = 1\n", 2,
                        {"farm.toml:8 canopy.base: the leaves begin at or above", "base 3 m, top 2 m"});
}

TEST(BadLeaves, DensityThatCannotBe) {
  for (const char* density : {"-0.5", "25"}) {
    expect_leaves_refused(fmt::format("[[canopy]]\ntop = 2\nleaf_density = {}\n", density), 2,
                          {"farm.toml:8 canopy.leaf_density: must lie between 0 and 20 m2 m-3", density});
  }
}

TEST(BadLeaves, LeafingThatIsNoYear) {
  const std::string table = "[[canopy]]\ntop = 2\nleaf_density = 1\nleafing = ";
  expect_leaves_refused(table + "[1, 1, 1]\n", 2,
                        {"farm.toml:9 canopy.leafing", "twelve numbers", "3 numbers"});
  expect_leaves_refused(table + "[0, 0, 0, 0, 0, 1.5, 0, 0, 0, 0, 0, 0]\n", 2,
                        {"canopy.leafing: the value for June must lie between 0 and 1", "1.5"});
}

TEST(BadLeaves, RowsWiderThanTheirSpacing) {
  expect_leaves_refused(rows_with("width = 4\n"), 2,
                        {"rows.width: rows are wider than their spacing", "width 4 m, spacing 3.5 m"});
}

TEST(BadLeaves, NoDensityOrTwo) {
  expect_leaves_refused("[[canopy]]\ntop = 2\n", 2, {"canopy.leaf_density: no leaf density is given"});
  expect_leaves_refused("[[canopy]]\ntop = 2\nleaf_density = 1\noptical_porosity = 0.5\nwidth = 3\n", 2,
                        {"farm.toml:9 canopy.optical_porosity: leaf density is given twice"});
}

}  // namespace
}  // namespace sunfall::test

// The demo farm in leaf, through the program.

#include <gmock/gmock.h>

#include <fstream>
#include <sstream>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

const std::string kInLeaf = SUNFALL_FIELDS "/alder-reach/alder-reach-in-leaf.toml";

TEST(Leaves, VetTellsThem) {
  const Outcome outcome = sunfall_run({"vet", kInLeaf, "--dome", "draft"});
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  for (const char* part : {"canopy (3), crop rows (2)", "0.305 m2 of leaf per m3", "1 poplar", "3 trees"}) {
    EXPECT_THAT(outcome.out, HasSubstr(part));
  }
}

// What rows take lies between nothing, where they have no leaves, and what comes to them.
TEST(Leaves, MapTellsWhatRowsTake) {
  const SmallFarm farm;
  const Outcome outcome =
      sunfall_run({"map", kInLeaf, "--dome", "draft", "-o", (farm / "out").string(), "--quiet"});
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_TRUE(std::filesystem::exists(farm / "out" / "taken-06.tif"));
  std::ifstream table(farm / "out" / "rows.csv");
  std::string line;
  std::getline(table, line);
  EXPECT_THAT(line, HasSubstr("rows,period,area_m2,came_mol_m2_d,taken_mol_m2_d"));
  int lines = 0;
  while (std::getline(table, line)) {
    std::istringstream fields(line);
    std::string name, period, area, came, taken;
    std::getline(fields, name, ','), std::getline(fields, period, ','), std::getline(fields, area, ',');
    std::getline(fields, came, ','), std::getline(fields, taken, ',');
    if (period == "01") {
      EXPECT_EQ(std::stod(taken), 0.0) << line;
    }
    if (period == "06") {
      EXPECT_GT(std::stod(taken), 5.0) << line;
    }
    EXPECT_LE(std::stod(taken), std::stod(came)) << line;
    ++lines;
  }
  EXPECT_EQ(lines, 24);  // two plots of rows, twelve months
}

}  // namespace
}  // namespace sunfall::test

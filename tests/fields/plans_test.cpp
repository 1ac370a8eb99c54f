// Every plan that we hand out can be read, and the files that it names are there.

#include <gtest/gtest.h>

#include <filesystem>
#include <string>
#include <vector>

#include "sunfall/error.h"
#include "sunfall/plan.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;

TEST(Plans, AreReadAndComplete) {
  int plans = 0;
  for (const fs::directory_entry& folder : fs::directory_iterator(SUNFALL_FIELDS)) {
    if (!folder.is_directory()) continue;
    for (const fs::directory_entry& file : fs::directory_iterator(folder)) {
      if (file.path().extension() != ".toml") continue;
      ++plans;
      const Plan plan = read_plan(file.path());
      std::vector<fs::path> inputs = {plan.site.ground};
      if (plan.site.surface) inputs.push_back(*plan.site.surface);
      if (plan.site.far_ground) inputs.push_back(*plan.site.far_ground);
      if (plan.plots) inputs.push_back(plan.plots->file);
      for (const fs::path& input : inputs) EXPECT_TRUE(fs::exists(input)) << input;
    }
  }
  EXPECT_GE(plans, 2);
}

}  // namespace
}  // namespace sunfall

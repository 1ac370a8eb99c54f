// The same plan gives the same bytes: run after run, with one worker or more.

#include <gmock/gmock.h>

#include <nlohmann/json.hpp>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

namespace fs = std::filesystem;

std::vector<std::string> names_in(const fs::path& folder) {
  std::vector<std::string> names;
  for (const auto& entry : fs::directory_iterator(folder)) names.push_back(entry.path().filename().string());
  std::sort(names.begin(), names.end());
  return names;
}

nlohmann::json summary_without_times(const fs::path& folder) {
  auto summary = nlohmann::json::parse(content_of(folder / "summary.json"));
  EXPECT_EQ(summary.erase("timings_s"), 1U);
  return summary;
}

// Every file, pictures and tables too; only the time that the stages took may differ.
void expect_same_runs(const fs::path& one, const fs::path& other) {
  ASSERT_EQ(names_in(one), names_in(other));
  for (const std::string& name : names_in(one)) {
    if (name == "summary.json") continue;
    EXPECT_TRUE(content_of(one / name) == content_of(other / name)) << name;
  }
  EXPECT_EQ(summary_without_times(one), summary_without_times(other));
}

TEST(SameBytes, RunAfterRunAndForAnyNumberOfJobs) {
  const SmallFarm farm;
  farm.write_plots();
  // Three tiles, so that there is work to share.
  RasterOrder order = farm_ground();
  order.columns = 1100;
  order.values.clear();
  for (int i = 0; i < 1100 * kFarmSide; ++i) order.values.push_back(10.0 + (i % 1100 % 83 == 0 ? 4.0 : 0.0));
  make_raster(farm / "ground.tif", order);
  farm.write_plan("", kPlotsTable);
  const std::vector<std::vector<std::string>> runs{
      {"--jobs", "1"}, {"--jobs", "1"}, {"--jobs", "2"}, {"--jobs", "7"}};
  for (std::size_t i = 0; i < runs.size(); ++i) {
    std::vector<std::string> words{
        "map", "farm.toml", "--dome", "draft", "--quiet", "-o", "run" + std::to_string(i)};
    words.insert(words.end(), runs[i].begin(), runs[i].end());
    const Outcome outcome = farm.run(words);
    ASSERT_EQ(outcome.status, 0);
    EXPECT_EQ(outcome.out + outcome.err, "");  // quiet is silent
    expect_whole_run(farm / ("run" + std::to_string(i)));
    expect_same_runs(farm / "run0", farm / ("run" + std::to_string(i)));
  }
}

TEST(SameBytes, WhereverThePlanIsStartedFrom) {
  const SmallFarm farm;
  ASSERT_EQ(farm.map({"--quiet"}).status, 0);
  ASSERT_EQ(sunfall_run({"map", (farm / "farm.toml").string(), "--dome", "draft", "--quiet", "-o",
                         (farm / "other").string()})
                .status,
            0);
  expect_same_runs(farm / "run", farm / "other");
}

TEST(SameBytes, JsonNamesTheRun) {
  const SmallFarm farm;
  const Outcome outcome = farm.map({"--json"});
  ASSERT_EQ(outcome.status, 0);
  const auto json = nlohmann::json::parse(outcome.out);
  EXPECT_EQ(json["folder"], "run");
  EXPECT_EQ(json["layers"], 16);
  EXPECT_TRUE(fs::exists(farm / json["summary"].get<std::string>()));
}

}  // namespace
}  // namespace sunfall::test

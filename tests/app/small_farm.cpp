#include "app/small_farm.h"

#include <gmock/gmock.h>

#include <fstream>
#include <nlohmann/json.hpp>
#include <regex>
#include <sstream>

#include <fmt/format.h>

#include "core/fingerprint.h"

namespace sunfall::test {

namespace fs = std::filesystem;

namespace {

constexpr double kCell_m = 2.0;
constexpr double kWest = 690000.0;
constexpr double kNorth = 5759000.0;
constexpr double kWall_m = 6.0;

// The lines that are no progress.
std::vector<std::string> message_lines(const std::string& text) {
  static const std::regex progress("[a-z ]+: (25|50|75|100) %");
  std::vector<std::string> lines;
  std::istringstream stream(text);
  for (std::string line; std::getline(stream, line);) {
    if (!std::regex_match(line, progress)) lines.push_back(line);
  }
  return lines;
}

std::string square(const std::string& id, double west, double south) {
  const double east = west + 20.0, north = south + 20.0;
  return fmt::format(
      R"({{"type":"Feature","properties":{{"id":"{}"}},"geometry":{{"type":"Polygon","coordinates":)"
      R"([[[{},{}],[{},{}],[{},{}],[{},{}],[{},{}]]]}}}})",
      id, west, south, east, south, east, north, west, north, west, south);
}

}  // namespace

const std::string kMonthlyLight =
    "[light]\nmonthly_global = [2.2, 4.1, 8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 1.8]\n";

RasterOrder farm_ground() {
  RasterOrder order;
  order.columns = kFarmSide;
  order.rows = kFarmSide;
  order.crs = "EPSG:25831";
  order.transform = {kWest, kCell_m, 0.0, kNorth, 0.0, -kCell_m};
  for (int row = 0; row < kFarmSide; ++row) {
    for (int column = 0; column < kFarmSide; ++column) {
      order.values.push_back(10.0 + 0.05 * kCell_m * (2 * kFarmSide - row - column));
    }
  }
  return order;
}

RasterOrder farm_surface() {
  RasterOrder order = farm_ground();
  for (int row = 0; row < kFarmSide; ++row) order.values[row * kFarmSide + kFarmSide / 2] += kWall_m;
  return order;
}

SmallFarm::SmallFarm() {
  make_raster(folder_ / "ground.tif", farm_ground());
  make_raster(folder_ / "surface.tif", farm_surface());
  write_plan();
}

void SmallFarm::write_plan(const std::string& site, const std::string& more) const {
  write_text(folder_ / "farm.toml",
             "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdam'\n" + site + kMonthlyLight + more);
}

void SmallFarm::write_plots(const std::string& feature) const {
  std::string features =
      square("A", kWest + 10.0, kNorth - 60.0) + "," + square("B", kWest + 80.0, kNorth - 90.0);
  if (!feature.empty()) features += "," + feature;
  write_text(folder_ / "plots.geojson",
             R"({"type":"FeatureCollection","crs":{"type":"name","properties":{"name":"EPSG:25831"}},)"
             R"("features":[)" +
                 features + "]}");
}

Outcome SmallFarm::run(const std::vector<std::string>& arguments, RunOptions options) const {
  options.folder = path();
  return sunfall_run(arguments, options);
}

Outcome SmallFarm::map(const std::vector<std::string>& more, RunOptions options) const {
  std::vector<std::string> arguments{"map", "farm.toml", "--dome", "draft", "-o", "run"};
  arguments.insert(arguments.end(), more.begin(), more.end());
  return run(arguments, options);
}

void expect_refused(const Outcome& outcome, int status, const std::vector<std::string>& parts) {
  EXPECT_EQ(outcome.status, status) << outcome.err;
  EXPECT_EQ(outcome.signal, 0);
  EXPECT_EQ(outcome.out, "");
  const std::vector<std::string> lines = message_lines(outcome.err);
  ASSERT_EQ(lines.size(), 1U) << outcome.err;
  EXPECT_EQ(outcome.err.back(), '\n');
  EXPECT_THAT(lines[0], testing::StartsWith("sunfall: "));
  EXPECT_EQ(lines[0].back(), '.');
  for (const std::string& part : parts) EXPECT_THAT(lines[0], testing::HasSubstr(part));
}

void expect_all_refuse(const SmallFarm& farm, int status, const std::vector<std::string>& parts) {
  const std::vector<std::string> before = farm.names();
  const std::vector<std::vector<std::string>> commands{
      {"vet", "farm.toml"},
      {"map", "farm.toml", "-o", "run"},
      {"spot", "farm.toml", "--at", "690021,5758979", "-o", "run"},
  };
  for (std::vector<std::string> command : commands) {
    SCOPED_TRACE(command.front());
    command.insert(command.end(), {"--dome", "draft"});
    expect_refused(farm.run(command), status, parts);
    EXPECT_EQ(farm.names(), before);
  }
}

void expect_whole_run(const fs::path& folder) {
  for (const fs::directory_entry& entry : fs::directory_iterator(folder)) {
    EXPECT_NE(entry.path().filename().string().front(), '.') << entry.path();
  }
  const auto summary = nlohmann::json::parse(content_of(folder / "summary.json"), nullptr, false);
  ASSERT_TRUE(summary.is_object()) << folder;
  ASSERT_GE(summary["layers"].size(), 16U);
  for (const auto& layer : summary["layers"]) {
    const fs::path file = folder / layer["file"].get<std::string>();
    ASSERT_TRUE(fs::exists(file)) << file;
    EXPECT_EQ(fingerprint(file).sha256, layer["sha256"].get<std::string>()) << file;
  }
}

}  // namespace sunfall::test

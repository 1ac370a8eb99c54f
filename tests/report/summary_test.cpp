// summary.json is what programs expect: these keys, in this order, null where missing.

#include "report/summary.h"

#include <cmath>
#include <nlohmann/json.hpp>

#include "report_support.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using SummaryTest = FolderTest;
using Json = nlohmann::ordered_json;

Summary example() {
  Summary summary;
  summary.plan = "Alder Reach";
  summary.version = "0.1.0";
  summary.inputs = {{"ground.tif", {1234, std::string(64, 'a')}}};
  summary.place = {5.6654, 51.9692, 2.1};
  summary.light = {"twelve monthly means of global radiation", false, 2.03};
  summary.dome = {72, 30};
  for (int i = 0; i < 12; ++i) {
    summary.open_field.dli_month[i] = 3.0 + i;
    summary.open_field.beam_part_month[i] = 0.03 * i;
  }
  summary.open_field.dli_year = 19.8;
  summary.grid = {600, 500, 1.0, 0.973};
  Summary::PlotLight plot{"P1", 2500.0, summary.open_field.dli_month, summary.open_field.dli_month, 1};
  plot.dli_month_p10[11] = std::nan("");
  summary.plots = {plot};
  summary.layers = {
      {"dli-01.tif", "Daily light integral, January", "mol m-2 d-1", {99, std::string(64, 'b')}}};
  summary.timings_s = {{"read", 0.5}, {"geometry", 2.25}};
  summary.notes = {"albedo is not counted"};
  return summary;
}

std::vector<std::string> keys_of(const Json& json) {
  std::vector<std::string> keys;
  for (const auto& item : json.items()) keys.push_back(item.key());
  return keys;
}

TEST_F(SummaryTest, HasItsKeysInOrder) {
  write_summary(folder_ / "summary.json", example());
  const Json json = Json::parse(content(folder_ / "summary.json"));
  using Keys = std::vector<std::string>;
  EXPECT_EQ(keys_of(json), (Keys{"plan", "version", "inputs", "geometry", "place", "light", "dome",
                                 "open_field", "grid", "plots", "layers", "timings_s", "notes"}));
  EXPECT_EQ(keys_of(json["inputs"][0]), (Keys{"path", "size", "sha256"}));
  EXPECT_EQ(keys_of(json["place"]), (Keys{"longitude", "latitude", "convergence_deg"}));
  EXPECT_EQ(keys_of(json["light"]), (Keys{"description", "is_ceiling", "umol_per_joule"}));
  EXPECT_EQ(keys_of(json["dome"]), (Keys{"sectors", "bands"}));
  EXPECT_EQ(keys_of(json["open_field"]), (Keys{"dli_month", "dli_year", "beam_part_month", "periods"}));
  EXPECT_EQ(keys_of(json["grid"]), (Keys{"columns", "rows", "cell_m", "valid_fraction"}));
  EXPECT_EQ(keys_of(json["plots"][0]),
            (Keys{"id", "area_m2", "dli_month_mean", "dli_month_p10", "lowest_month"}));
  EXPECT_EQ(keys_of(json["layers"][0]), (Keys{"file", "description", "unit", "size", "sha256"}));
  EXPECT_EQ(keys_of(json["timings_s"]), (Keys{"read", "geometry"}));
}

TEST_F(SummaryTest, KeepsEveryValue) {
  const Summary summary = example();
  const Json json = Json::parse(summary_json(summary));
  EXPECT_EQ(json["plan"], "Alder Reach");
  EXPECT_EQ(json["inputs"][0]["size"], 1234);
  EXPECT_EQ(json["inputs"][0]["sha256"], std::string(64, 'a'));
  EXPECT_EQ(json["place"]["longitude"], 5.6654);
  EXPECT_EQ(json["light"]["is_ceiling"], false);
  EXPECT_EQ(json["dome"]["bands"], 30);
  EXPECT_EQ(json["open_field"]["dli_month"].size(), 12U);
  EXPECT_EQ(json["open_field"]["dli_month"][11], 14.0);
  EXPECT_EQ(json["grid"]["valid_fraction"], 0.973);
  EXPECT_EQ(json["plots"][0]["dli_month_mean"][11], 14.0);
  EXPECT_TRUE(json["plots"][0]["dli_month_p10"][11].is_null());
  EXPECT_EQ(json["plots"][0]["lowest_month"], 1);
  EXPECT_EQ(json["timings_s"]["geometry"], 2.25);
  EXPECT_EQ(json["notes"][0], "albedo is not counted");
}

TEST_F(SummaryTest, AnEmptySummaryIsStillJson) {
  const Json json = Json::parse(summary_json({}));
  EXPECT_TRUE(json["inputs"].is_array());
  EXPECT_TRUE(json["plots"].is_array());
  EXPECT_TRUE(json["notes"].is_array());
  EXPECT_TRUE(json["timings_s"].is_object());
  EXPECT_TRUE(json["place"]["latitude"].is_null());
}

TEST_F(SummaryTest, TakesAnyName) {
  Summary summary = example();
  summary.plan = "quote \" backslash \\ newline \n";
  summary.plots[0].id = "broken \xFF";
  summary.plots[0].lowest_month = 0;
  const Json json = Json::parse(summary_json(summary));
  EXPECT_EQ(json["plan"], summary.plan);
  EXPECT_EQ(json["plots"][0]["id"], "broken \xEF\xBF\xBD");
  EXPECT_TRUE(json["plots"][0]["lowest_month"].is_null());
}

TEST_F(SummaryTest, TheLowestMonthIsTheMiddleOfTheLowest) {
  std::array<double, 12> months{};
  months.fill(5.0);
  EXPECT_EQ(lowest_month(months), 6);
  months[0] = std::nan("");
  months[7] = 2.0;
  EXPECT_EQ(lowest_month(months), 8);
  months[11] = 2.0;  // two rows of one month: the first
  EXPECT_EQ(lowest_month(months), 8);
  for (const std::size_t polar_night : {10U, 11U, 0U}) months[polar_night] = 0.0;
  EXPECT_EQ(lowest_month(months), 12);
  months[1] = 0.0;  // November to February
  EXPECT_EQ(lowest_month(months), 12);
  months[9] = 0.0;  // October to February
  EXPECT_EQ(lowest_month(months), 12);
  months.fill(std::nan(""));
  EXPECT_EQ(lowest_month(months), 0);
}

TEST_F(SummaryTest, IsNotWrittenByHalves) {
  EXPECT_THROW(write_summary(folder_ / "none" / "summary.json", example()), Error);
  EXPECT_EQ(entries(), 0);
}

}  // namespace
}  // namespace sunfall

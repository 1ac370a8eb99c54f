// The demo farm from plan to finished folder, held against tools that know nothing of Sunfall: gdalinfo,
// gdal_translate and gdal_rasterize.

#include <gmock/gmock.h>

#include <array>
#include <cmath>
#include <cstring>
#include <fstream>
#include <map>
#include <nlohmann/json.hpp>
#include <sstream>

#include <fmt/format.h>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

namespace fs = std::filesystem;
using nlohmann::json;

constexpr int kColumns = 720;
constexpr int kRows = 600;
constexpr std::size_t kPlots = 10;
constexpr double kHalfStep = 0.5 / 128.0;  // layers are rounded to 1/128 mol m-2 d-1
constexpr double kHair = 1e-4;             // of float arithmetic
const std::array<double, 12> kDays{31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31};
// alder-reach.toml, MJ m-2 d-1.
const std::array<double, 12> kGlobal{2.2, 4.1, 8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 1.8};

std::string month_layer(int month) { return fmt::format("dli-{:02}.tif", month); }

// One run serves the checks of a test.
class DemoRun : public testing::Test {
 protected:
  static const fs::path& folder() {
    static const TempFolder temporary;
    static const fs::path run = [] {
      const Outcome outcome = sunfall_run({"map", SUNFALL_FIELDS "/alder-reach/alder-reach.toml", "--dome",
                                           "draft", "-o", (temporary / "run").string()});
      EXPECT_EQ(outcome.status, 0) << outcome.err;
      EXPECT_THAT(outcome.out, testing::HasSubstr("17 layers, tables and pictures are in "));
      EXPECT_THAT(outcome.out, testing::HasSubstr("99.4 % of the cells have a value; "));
      for (const char* stage :
           {"reading the ground", "following the light", "finishing the layers", "tables and pictures"})
        EXPECT_THAT(outcome.err, testing::HasSubstr(std::string(stage) + ": 100 %"));
      return temporary / "run";
    }();
    return run;
  }

  static void check_summary();
  static void check_open_field();
  static void check_layers_together();
  static void check_plot_tables();

  static json summary() { return json::parse(content_of(folder() / "summary.json")); }

  // The layer's cells row by row as GDAL's own program reads them; -9999 where missing.
  static std::vector<float> cells(const std::string& layer) {
    const std::string raw = (folder().parent_path() / (layer + ".bin")).string();
    tool_output({"gdal_translate", "-q", "-of", "ENVI", "-ot", "Float32", (folder() / layer).string(), raw});
    const std::string bytes = content_of(raw);
    std::vector<float> values(bytes.size() / sizeof(float));
    std::memcpy(values.data(), bytes.data(), bytes.size());
    EXPECT_EQ(values.size(), std::size_t{kColumns} * kRows);
    return values;
  }
};

void check_files(const fs::path& folder) {
  std::vector<std::string> expected{
      "dli-year.tif", "dli-season.tif", "dli-lowest.tif", "dli-lowest-month.tif", "sight.tif", "plots.csv",
      "plots.gpkg",   "summary.json",   "style-dli.sld",  "months.png",           "year.png"};
  for (int month = 1; month <= 12; ++month) expected.push_back(month_layer(month));
  std::vector<std::string> found;
  for (const auto& entry : fs::directory_iterator(folder)) found.push_back(entry.path().filename().string());
  EXPECT_THAT(found, testing::UnorderedElementsAreArray(expected));
}

// Design: every layer says what it is, to any reader.
void check_layer(const fs::path& file) {
  SCOPED_TRACE(file.filename().string());
  const json info = json::parse(tool_output({"gdalinfo", "-json", file.string()}));
  EXPECT_EQ(info["size"], json({kColumns, kRows}));
  EXPECT_EQ(info["geoTransform"], json({690900.0, 1.0, 0.0, 5759600.0, 0.0, -1.0}));
  EXPECT_THAT(info["coordinateSystem"]["wkt"].get<std::string>(), testing::HasSubstr(R"(ID["EPSG",25831])"));
  EXPECT_EQ(info["files"].size(), 1U);
  const json& metadata = info["metadata"];
  EXPECT_EQ(metadata["IMAGE_STRUCTURE"]["LAYOUT"], "COG");
  EXPECT_EQ(metadata["IMAGE_STRUCTURE"]["COMPRESSION"], "DEFLATE");
  EXPECT_EQ(metadata[""]["AREA_OR_POINT"], "Area");
  for (const char* key :
       {"SUNFALL_VERSION", "SUNFALL_PLAN", "SUNFALL_LIGHT", "SUNFALL_PHOTONS", "SUNFALL_SKY"})
    EXPECT_TRUE(metadata[""].contains(key)) << key;
  ASSERT_EQ(info["bands"].size(), 1U);
  const json& band = info["bands"][0];
  EXPECT_EQ(band["type"], "Float32");
  EXPECT_EQ(band["noDataValue"], -9999.0);
  EXPECT_FALSE(band.value("description", "").empty());
  EXPECT_EQ(band["overviews"].size(), 1U);  // 360 x 300 fits into one tile
  const std::string name = file.filename().string();
  const std::string unit = name == "sight.tif"              ? "1"
                           : name == "dli-lowest-month.tif" ? "month"
                                                            : "mol m-2 d-1";
  EXPECT_EQ(band["unit"], unit);
  for (const char* key : {"MINIMUM", "MAXIMUM", "MEAN", "STDDEV", "VALID_PERCENT"})
    EXPECT_TRUE(band["metadata"][""].contains(std::string("STATISTICS_") + key)) << key;
}

// The statistics that a layer claims, against its cells.
void check_statistics(const fs::path& file, const std::vector<float>& cells) {
  SCOPED_TRACE(file.filename().string());
  const json info = json::parse(tool_output({"gdalinfo", "-json", file.string()}));
  const json& claimed = info["bands"][0]["metadata"][""];
  double least = HUGE_VAL, most = -HUGE_VAL, sum = 0.0, count = 0.0;
  for (const float value : cells) {
    if (value == -9999.0F) continue;
    least = std::min<double>(least, value);
    most = std::max<double>(most, value);
    sum += value;
    ++count;
  }
  const auto number = [&](const char* key) { return std::stod(claimed[key].get<std::string>()); };
  EXPECT_EQ(number("STATISTICS_MINIMUM"), least);
  EXPECT_EQ(number("STATISTICS_MAXIMUM"), most);
  EXPECT_NEAR(number("STATISTICS_MEAN"), sum / count, 1e-9 * std::abs(sum));
  EXPECT_NEAR(number("STATISTICS_VALID_PERCENT"), 100.0 * count / static_cast<double>(cells.size()), 1e-9);
}

void DemoRun::check_summary() {
  const json run = summary();
  for (const char* key :
       {"plan", "version", "inputs", "place", "dome", "open_field", "grid", "plots", "timings_s", "notes"})
    EXPECT_TRUE(run.contains(key)) << key;
  EXPECT_EQ(run["plan"], "Alder Reach");
  ASSERT_EQ(run["inputs"].size(), 5U);
  for (const json& input : run["inputs"]) {
    const fs::path file = fs::path(SUNFALL_FIELDS) / "alder-reach" / input["path"].get<std::string>();
    EXPECT_EQ(input["size"], fs::file_size(file));
    EXPECT_EQ(tool_output({"sha256sum", file.string()}).substr(0, 64), input["sha256"].get<std::string>());
  }
  for (const char* key : {"longitude", "latitude", "convergence_deg"})
    EXPECT_TRUE(run["place"][key].is_number());
  EXPECT_EQ(run["dome"], json({{"sectors", 36}, {"bands", 15}}));
  EXPECT_EQ(run["grid"]["columns"], kColumns);
  EXPECT_EQ(run["grid"]["rows"], kRows);
  EXPECT_EQ(run["grid"]["cell_m"], 1.0);
  ASSERT_EQ(run["plots"].size(), kPlots);
  for (const json& plot : run["plots"]) {
    EXPECT_GT(plot["area_m2"].get<double>(), 0.0);
    EXPECT_EQ(plot["dli_month_mean"].size(), 12U);
    EXPECT_EQ(plot["dli_month_p10"].size(), 12U);
    EXPECT_EQ(plot["lowest_month"], 12);  // December has the least sun at 52 degrees north
  }
  EXPECT_FALSE(run["notes"].empty());
}

// 1.97 ± 0.03 mol per MJ of global under a clear sky and 2.10 ± 0.03 under a closed one (Jacovides and
// others 2007): every month lies between.
void DemoRun::check_open_field() {
  const json open = summary()["open_field"];
  double year = 0.0;
  for (std::size_t m = 0; m < 12; ++m) {
    const double dli = open["dli_month"][m];
    EXPECT_GT(dli / kGlobal[m], 1.94) << m;
    EXPECT_LT(dli / kGlobal[m], 2.13) << m;
    EXPECT_GT(open["beam_part_month"][m].get<double>(), 0.0);
    EXPECT_LT(open["beam_part_month"][m].get<double>(), 1.0);
    year += dli * kDays[m] / 365.0;
  }
  EXPECT_NEAR(open["dli_year"].get<double>(), year, 1e-9 * year);
}

// Cell by cell: nothing brighter than the open field, the year the mean of its days, the darkest month
// the least of the twelve, and the same cells missing everywhere.
void DemoRun::check_layers_together() {
  const json open = summary()["open_field"];
  std::vector<std::vector<float>> months;
  for (int month = 1; month <= 12; ++month) months.push_back(cells(month_layer(month)));
  const std::vector<float> year = cells("dli-year.tif"), lowest = cells("dli-lowest.tif"),
                           which = cells("dli-lowest-month.tif"), sight = cells("sight.tif");
  std::size_t wrong = 0, valid = 0;
  double most = 0.0;
  for (std::size_t cell = 0; cell < year.size(); ++cell) {
    const bool missing = year[cell] == -9999.0F;
    if (!missing) ++valid;
    double mean = 0.0;
    float least = HUGE_VALF;
    for (std::size_t m = 0; m < 12; ++m) {
      const float dli = months[m][cell];
      mean += dli * kDays[m] / 365.0;
      least = std::min(least, dli);
      const double ceiling = open["dli_month"][m].get<double>() + kHalfStep + kHair;
      if ((dli == -9999.0F) != missing || (!missing && (dli < 0.0F || dli > ceiling))) ++wrong;
    }
    if (missing) {
      if (lowest[cell] != -9999.0F || which[cell] != -9999.0F) ++wrong;
      continue;
    }
    most = std::max<double>(most, year[cell]);
    if (std::abs(year[cell] - mean) > 2.0 * kHalfStep + kHair) ++wrong;
    if (lowest[cell] != least || !(which[cell] >= 1.0F && which[cell] <= 12.0F)) ++wrong;
    if (months[static_cast<std::size_t>(which[cell]) - 1][cell] != least) ++wrong;
    if (!(sight[cell] >= 0.0F && sight[cell] <= 1.0F)) ++wrong;
  }
  EXPECT_EQ(wrong, 0U);
  EXPECT_NEAR(summary()["grid"]["valid_fraction"].get<double>(), double(valid) / double(year.size()), 1e-12);
  // Somewhere on the farm the horizon is low.
  EXPECT_GT(most, 0.98 * open["dli_year"].get<double>());
}

std::vector<std::map<std::string, std::string>> csv_of(const fs::path& file) {
  std::ifstream in(file);
  std::vector<std::string> header;
  std::vector<std::map<std::string, std::string>> rows;
  for (std::string line; std::getline(in, line);) {
    std::istringstream stream(line);
    std::vector<std::string> fields;
    for (std::string field; std::getline(stream, field, ',');) fields.push_back(field);
    if (header.empty()) {
      header = fields;
      continue;
    }
    rows.emplace_back();
    for (std::size_t i = 0; i < header.size(); ++i) rows.back()[header[i]] = fields.at(i);
  }
  return rows;
}

// The number of each plot in the cells whose centres it holds, by GDAL's own rule; 0 elsewhere.
std::string plot_numbers(const fs::path& folder) {
  const std::string raw = (folder / "plots.bin").string();
  tool_output({"gdal_rasterize",
               "-q",
               "-dialect",
               "sqlite",
               "-sql",
               "select geom, cast(substr(id, 2) as integer) as number from plots",
               "-a",
               "number",
               "-te",
               "690900",
               "5759000",
               "691620",
               "5759600",
               "-ts",
               "720",
               "600",
               "-ot",
               "Byte",
               "-of",
               "ENVI",
               SUNFALL_FIELDS "/alder-reach/plots.gpkg",
               raw});
  return content_of(raw);
}

// A centre that lies on a border may fall to either side: that many cells of a plot may differ.
constexpr std::size_t kOnBorder = 3;

void check_plot_row(const std::map<std::string, std::string>& row, std::vector<float> values) {
  SCOPED_TRACE(row.at("plot") + " " + row.at("period"));
  const auto number = [&](const char* name) { return std::stod(row.at(name)); };
  std::sort(values.begin(), values.end());
  const auto count = static_cast<double>(values.size());
  ASSERT_GT(values.size(), 4 * kOnBorder);
  EXPECT_NEAR(number("area (m2)"), count, 0.03 * count + kOnBorder);  // cells of 1 m2
  double sum = 0.0, squares = 0.0;
  for (const float value : values) sum += value;
  const double mean = sum / count;
  for (const float value : values) squares += (value - mean) * (value - mean);
  const double range = values.back() - values.front();
  const double few = kOnBorder / count;
  EXPECT_NEAR(number("mean DLI (mol m-2 d-1)"), mean, few * range + 0.0005 + kHair);
  EXPECT_NEAR(number("CV (1)"), std::sqrt(squares / count) / mean,
              std::sqrt(few) * range / mean + 0.00005 + kHair);
  const auto tenth = static_cast<std::size_t>(0.1 * (count - 1.0));
  const std::size_t below = tenth > kOnBorder ? tenth - kOnBorder : 0;
  EXPECT_GE(number("P10 DLI (mol m-2 d-1)"), values[below] - 0.0005 - kHair);
  EXPECT_LE(number("P10 DLI (mol m-2 d-1)"), values[tenth + 1 + kOnBorder] + 0.0005 + kHair);
  EXPECT_LE(number("min DLI (mol m-2 d-1)"), values[kOnBorder] + 0.0005 + kHair);
  EXPECT_GE(number("max DLI (mol m-2 d-1)"), values[values.size() - 1 - kOnBorder] - 0.0005 - kHair);
}

void DemoRun::check_plot_tables() {
  const std::string numbers = plot_numbers(folder().parent_path());
  ASSERT_EQ(numbers.size(), std::size_t{kColumns} * kRows);
  const auto rows = csv_of(folder() / "plots.csv");
  ASSERT_EQ(rows.size(), kPlots * 14);  // twelve months, the season and the year
  const json run = summary();
  std::map<std::string, std::vector<float>> layers;
  for (const auto& row : rows) {
    const std::string& period = row.at("period");
    if (layers.count(period) == 0) layers[period] = cells("dli-" + period + ".tif");
    const int plot = std::stoi(row.at("plot").substr(1));
    std::vector<float> values;
    for (std::size_t cell = 0; cell < numbers.size(); ++cell) {
      if (numbers[cell] == plot && layers[period][cell] != -9999.0F) values.push_back(layers[period][cell]);
    }
    check_plot_row(row, std::move(values));
    if (period == "season" || period == "year") continue;
    const json& told = run["plots"][static_cast<std::size_t>(plot) - 1];
    EXPECT_EQ(told["id"], row.at("plot"));
    const double mean = told["dli_month_mean"][static_cast<std::size_t>(std::stoi(period)) - 1];
    EXPECT_NEAR(mean, std::stod(row.at("mean DLI (mol m-2 d-1)")), 0.00051);
  }
  const std::string listed = tool_output({"ogrinfo", "-al", "-so", (folder() / "plots.gpkg").string()});
  for (const char* part : {"Layer name: plots", "Feature Count: 10", "dli_06_mean: Real",
                           "dli_season_p10: Real", "dli_year_mean: Real", "crop: String"})
    EXPECT_THAT(listed, testing::HasSubstr(part));
}

TEST_F(DemoRun, EveryFileIsThereAndSaysWhatItIs) {
  check_summary();
  check_open_field();
  expect_whole_run(folder());
  check_files(folder());
  for (const auto& layer : summary()["layers"]) check_layer(folder() / layer["file"].get<std::string>());
  check_statistics(folder() / "dli-06.tif", cells("dli-06.tif"));
  check_statistics(folder() / "sight.tif", cells("sight.tif"));
  EXPECT_EQ(content_of(folder() / "months.png").substr(0, 8), "\x89PNG\r\n\x1a\n");
  EXPECT_THAT(content_of(folder() / "style-dli.sld"), testing::HasSubstr("StyledLayerDescriptor"));
}

TEST_F(DemoRun, NumbersAgree) {
  check_layers_together();
  check_plot_tables();
}

}  // namespace
}  // namespace sunfall::test

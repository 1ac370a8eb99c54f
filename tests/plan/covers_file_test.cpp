// The table of covers: what it reads, and what it says about faults.

#include "plan/covers_file.h"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <fstream>
#include <sstream>

#include "plan/plan_folder.h"
#include "sunfall/covers.h"

namespace sunfall::testing {
namespace {

// Writes covers.toml and reads it.
CoverTable read(const PlanFolder& folder, const std::string& text) {
  folder.write("covers.toml", text);
  return read_covers(folder.path() / "covers.toml");
}

PlanFolder::Fault fault(const PlanFolder& folder, const std::string& text) {
  try {
    read(folder, text);
  } catch (const Error& error) {
    const Error::Parts& parts = error.parts();
    std::string where = parts.where;
    const std::string start = folder.path().string() + "/";
    if (where.rfind(start, 0) == 0) where.erase(0, start.size());
    return {error.kind(), parts.what, where, parts.found, parts.remedy, error.what()};
  }
  ADD_FAILURE() << "read without an error: " << text;
  return {ErrorKind::internal, "", "", "", "", ""};
}

// The lines of a cover, from line 2 on.
std::string cover(const std::string& lines) { return "[covers.\"my glass\"]\n" + lines; }
const std::string kGlass =
    "source = 's'\nindex = 1.526\nthickness_mm = 4\nabsorption = 10\n";  // lines 2 to 5

TEST(CoversFile, HoldsSheets) {
  const PlanFolder folder;
  const CoverTable table = read(
      folder, cover(kGlass + "sheets = 2\nhaze = 0.2\nopaque = 0.1\ncoating_index = 1.3\ncoating_nm = 500\n"
                             "coated = 'outer'\n[factors.dirt]\nvalue = 0.95\nsource = 't'\n"));
  const Cover& glass = table.cover("my glass", "here");
  EXPECT_EQ(glass.source, "s");
  const auto& sheets = std::get<CoverSheets>(glass.made_of);
  ASSERT_EQ(sheets.size(), 2u);
  for (const CoverSheet& sheet : sheets) {
    EXPECT_EQ(sheet.index, 1.526);
    EXPECT_EQ(sheet.thickness_m, 0.004);
    EXPECT_EQ(sheet.absorption_per_m, 10);
    EXPECT_EQ(sheet.haze, 0.2);
    EXPECT_EQ(sheet.opaque, 0.1);
    ASSERT_TRUE(sheet.outer_coating);
    EXPECT_EQ(sheet.outer_coating->index, 1.3);
    EXPECT_EQ(sheet.outer_coating->quarter_wave_nm, 500);
    EXPECT_FALSE(sheet.inner_coating);
  }
  EXPECT_EQ(table.factor("dirt", "here").value, 0.95);
  EXPECT_EQ(table.factor("dirt", "here").source, "t");
}

TEST(CoversFile, TakesAbsorptionFromWhatASheetPassesWithin) {
  const PlanFolder folder;
  const CoverTable table =
      read(folder, cover("source = 's'\nindex = 1.5\nthickness_mm = 2\ninternal = 0.9\n"));
  const CoverSheet& sheet = std::get<CoverSheets>(table.covers[0].made_of)[0];
  EXPECT_NEAR(std::exp(-sheet.absorption_per_m * 0.002), 0.9, 1e-15);
  EXPECT_FALSE(sheet.outer_coating || sheet.inner_coating);
}

TEST(CoversFile, HangsCoversBelowOthers) {
  const PlanFolder folder;
  const CoverTable table =
      read(folder, cover(kGlass + "[covers.both]\nsource = 's'\nindex = 1.4\nthickness_mm = 1\n"
                                  "absorption = 0\ninner = 'my glass'\n"));
  const auto& sheets = std::get<CoverSheets>(table.cover("both", "").made_of);
  ASSERT_EQ(sheets.size(), 2u);
  EXPECT_EQ(sheets[0].index, 1.4);
  EXPECT_EQ(sheets[1].index, 1.526);
}

TEST(CoversFile, ReadsMeasuredAngles) {
  const PlanFolder folder;
  const std::string text = cover("source = 'laboratory'\nmeasured = 'net.csv'\n");
  for (const char* csv : {"angle,regular,scattered\n0,0.5,0.1\n40,0.4,0.15\n70,0.2,0.1\n",
                          "angle,total,scattered,regular\n0,0.6,0.1,0.5\n40,0.55,0.15,0.4\n70,.3,0.1,0.2\n",
                          "angle;regular;scattered\n0;0,5;0,1\n40;0,4;0,15\n70;0,2;0,1\n"}) {
    folder.write("net.csv", csv);
    const auto readings = std::get<CoverReadings>(read(folder, text).covers[0].made_of);
    ASSERT_EQ(readings.size(), 3u) << csv;
    EXPECT_EQ(readings[1].angle_deg, 40);
    EXPECT_EQ(readings[1].regular, 0.4);
    EXPECT_EQ(readings[1].scattered, 0.15);
  }
}

struct Bad {
  std::string text;
  const char* where;
  const char* what;
  const char* found;
  const char* remedy;
};

TEST(CoversFile, SaysWhatIsWrong) {
  const PlanFolder folder;
  folder.write("net.csv", "angle,regular,scattered\n0,.5,0\n40,.4,0\n70,.2,0\n");
  const std::string net = cover("source = 's'\nmeasured = 'net.csv'\n");
  const std::string missing = "missing; a cover is made of sheets or measured";
  const char* sheets_or_measured = "Give index, thickness_mm and absorption, or measured = \"<file>.csv\"";
  const char* either = "Give either absorption, per metre, or internal, what one sheet passes within";
  const Bad cases[] = {
      {"[cover.a]\n", "covers.toml:1 cover", "unknown table or key", "", "Perhaps \"covers\" is meant"},
      {"covers = 3\n", "covers.toml:1 covers", "must be a table", "a whole number: 3",
       "Write [covers.\"<name>\"]"},
      {"[covers]\nglass = 1.5\n", "covers.toml:2 covers.glass", "must be a table", "a number: 1.5",
       "Write [covers.\"<name>\"]"},
      {cover(kGlass + "hase = 0.3\n"), "covers.toml:6 covers.\"my glass\".hase", "unknown key", "",
       "Perhaps \"haze\" is meant"},
      {cover("index = 1.5\nthickness_mm = 4\nabsorption = 1\n"), "covers.toml:1 covers.\"my glass\".source",
       "missing; the covers file must give it", "", "Add it to [covers.\"my glass\"] (type: text)"},
      {cover("source = 's'\nthickness_mm = 4\n"), "covers.toml:1 covers.\"my glass\".index", missing.c_str(),
       "", sheets_or_measured},
      {cover("source = 's'\nindex = 1.5\n"), "covers.toml:1 covers.\"my glass\".thickness_mm",
       missing.c_str(), "", sheets_or_measured},
      {cover("source = 's'\nindex = 1.5\nthickness_mm = 4\n"), "covers.toml:1 covers.\"my glass\".absorption",
       "missing; how much the sheet absorbs must be said", "", either},
      {cover(kGlass + "internal = 0.9\n"), "covers.toml:6 covers.\"my glass\".internal",
       "absorption is said twice", "", either},
      {cover("source = 's'\nindex = 1.5\nthickness_mm = 4\ninternal = 0\n"),
       "covers.toml:5 covers.\"my glass\".internal", "must be above 0", "0",
       "What a sheet passes within, perpendicular; 0.98 and not 98"},
      {cover("source = 's'\nindex = 0.9\nthickness_mm = 4\n"), "covers.toml:3 covers.\"my glass\".index",
       "must lie between 1 and 3", "0.9", "The refractive index; glass has 1.526"},
      {cover("source = 's'\nindex = 1.5\nthickness_mm = 0\n"),
       "covers.toml:4 covers.\"my glass\".thickness_mm", "must be above 0", "0", ""},
      {cover("source = 's'\nindex = 'x'\n"), "covers.toml:3 covers.\"my glass\".index", "must be a number",
       "a string: \"x\"", ""},
      {cover(kGlass + "haze = 70\n"), "covers.toml:6 covers.\"my glass\".haze", "must lie between 0 and 1",
       "70", "A share, 0.7 and not 70"},
      {cover(kGlass + "opaque = 1\n"), "covers.toml:6 covers.\"my glass\".opaque",
       "must be at least 0 and below 1", "1", "A share, 0.05 and not 5"},
      {cover(kGlass + "coated = 'both'\n"), "covers.toml:6 covers.\"my glass\".coated",
       "stands without a coating", "", "Give coating_index, 1.28 for porous silica, or remove it"},
      {cover(kGlass + "sheets = 9\n"), "covers.toml:6 covers.\"my glass\".sheets", "must lie between 1 and 8",
       "9", ""},
      {cover(kGlass + "inner = 'my glass'\n"), "covers.toml:6 covers.\"my glass\".inner",
       "no cover of that name stands above in the file", "\"my glass\"", "Write the inner cover first"},
      {cover(kGlass) + "[covers.b]\n" + kGlass + "inner = 'my glas'\n", "covers.toml:11 covers.b.inner",
       "no cover of that name stands above in the file", "\"my glas\"", "Perhaps \"my glass\" is meant"},
      {cover(kGlass + "sheets = 8\n") + "[covers.b]\n" + kGlass + "inner = 'my glass'\n",
       "covers.toml:7 covers.b.sheets", "a cover has 1 to 8 sheets", "9", ""},
      {net + "[covers.b]\n" + kGlass + "inner = 'my glass'\n", "covers.toml:9 covers.b.inner",
       "a measured cover cannot hang below another, since what it reflects is not known", "\"my glass\"",
       "Describe its sheets, or measure both together"},
      {net + "haze = 0.1\n", "covers.toml:4 covers.\"my glass\".haze",
       "stands beside measured angles, which say all", "", "Remove it, or measured"},
      {"[factors.dirt]\nsource = 's'\n", "covers.toml:1 factors.dirt.value", "missing", "",
       "The share that is left, 0.95 and not 95"},
      {"[factors.dirt]\nsource = 's'\nvalue = 0\n", "covers.toml:3 factors.dirt.value", "must be above 0",
       "0", "The share that is left, 0.95 and not 95"},
      {"[factors.dirt]\nsource = 's'\nvalue = 95\n", "covers.toml:3 factors.dirt.value",
       "must lie between 0 and 1", "95", "The share that is left, 0.95 and not 95"},
  };
  for (const Bad& bad : cases) {
    const PlanFolder::Fault met = fault(folder, bad.text);
    EXPECT_EQ(met.where, bad.where) << bad.text;
    EXPECT_EQ(met.what, bad.what) << bad.text;
    EXPECT_EQ(met.found, bad.found) << bad.text;
    EXPECT_EQ(met.remedy, bad.remedy) << bad.text;
    EXPECT_EQ(exit_status(met.kind), 2) << bad.text;
  }
}

TEST(CoversFile, SpeaksOfItselfAndNotOfThePlan) {
  const PlanFolder folder;
  EXPECT_EQ(fault(folder, "covers = [").what, "the covers file is not valid TOML");
  EXPECT_EQ(fault(folder, "\xFF").what, "the covers file is not UTF-8 text");
  EXPECT_EQ(fault(folder, "a = [[[[[[[[[[[[[[[[[[1]]]]]]]]]]]]]]]]]]").remedy,
            "Write tables as docs/covers.md shows them");
  EXPECT_EQ(fault(folder, cover("source = 's'\nmeasured = 'http://a/b.csv'\n")).remedy,
            "Name a file on disk, relative to the covers file's folder");
  const PlanFolder::Fault absent = fault(folder, cover("source = 's'\nmeasured = 'nt.csv'\n"));
  EXPECT_EQ(absent.where, "covers.toml:3 covers.\"my glass\".measured");
  EXPECT_EQ(absent.what, "the file does not exist");
  EXPECT_EQ(exit_status(absent.kind), 3);
  try {
    read_covers(folder.path() / "cover.toml");
    ADD_FAILURE();
  } catch (const Error& error) {
    EXPECT_EQ(error.parts().what, "the covers file does not exist");
  }
}

TEST(CoversFile, SaysWhatIsWrongWithMeasuredAngles) {
  const PlanFolder folder;
  const std::string head = "angle,regular,scattered\n";
  const char* share = "Shares of the light that falls on the cover, 0.83 and not 83";
  const char* less = "Regular light is the total less the scattered";
  const Bad cases[] = {
      {head + "0,90,0\n40,80,0\n70,60,0\n", "net.csv:2 regular", "must be at least 0 and at most 1", "90",
       share},
      {head + "0,.9,0\n40,.8,-.1\n70,.6,0\n", "net.csv:3 scattered", "must be at least 0 and at most 1",
       "-0.1", share},
      {head + "0,.9,0\n40,.8,nan\n70,.6,0\n", "net.csv:3 scattered", "must be at least 0 and at most 1",
       "nan", share},
      {head + "0,.9,0.2\n40,.8,0\n70,.6,0\n", "net.csv:2 scattered",
       "more light passes than falls on the cover", "regular 0.9 + scattered 0.2 = 1.1", less},
      {"angle,regular,scattered,total\n0,.9,0,.9\n40,.8,0.1,.8\n70,.6,0,.6\n", "net.csv:3 total",
       "regular and scattered light are more than the total", "0.8 + 0.1, total 0.8", less},
      {"angle,regular,scattered,total\n0,.9,0,.9\n40,.6,0.1,.8\n70,.6,0,.6\n", "net.csv:3 total",
       "regular and scattered light are less than the total", "0.6 + 0.1, total 0.8", less},
      {head + "0,.9,0\n70,.8,0\n40,.6,0\n", "net.csv:4 angle", "the angles must rise", "40 after 70",
       "Sort the lines by angle, each angle once"},
      {head + "10,.9,0\n40,.8,0\n70,.6,0\n", "net.csv:2 angle",
       "the first angle must be 0, the perpendicular", "10", "Add the value at 0 degrees"},
      {head, "net.csv angle", "the first angle must be 0, the perpendicular", "no angles",
       "Add the value at 0 degrees"},
      {head + "0,.9,0\n20,.8,0\n50,.8,0\n", "net.csv:4 angle",
       "needs three angles or more, up to 60 degrees at least", "3 up to 50",
       "Much of a winter's light comes in at flat angles; measure there, or describe the sheets"},
      {head + "0,.9,0\n40,.8,0\n100,.6,0\n", "net.csv:4 angle", "must be at least 0 and at most 90", "100",
       "Degrees from the perpendicular to the cover"},
      {head + "0,.9,0\n40,.8,0\n90,.1,0\n", "net.csv:4 angle", "light passes at 90 degrees, along the cover",
       "0.1", "Give 0 there, or end at a lower angle"},
      {head + "0,.9,0\n40,82 %,0\n", "net.csv:3 regular", "is not a number", "\"82 %\"",
       "Write shares such as 0.83 and angles in degrees, without a unit"},
      {"angle,regular\n0,.9\n", "net.csv", "the file has no column of that name", "\"scattered\"",
       "its columns are \"angle\", \"regular\""},
      {"angl,regular,scattered\n0,.9,0\n", "net.csv", "the file has no column of that name", "\"angle\"",
       "perhaps \"angl\" is meant"},
  };
  for (const Bad& bad : cases) {
    folder.write("net.csv", bad.text);
    const PlanFolder::Fault met = fault(folder, cover("source = 's'\nmeasured = 'net.csv'\n"));
    EXPECT_EQ(met.where, bad.where) << bad.text;
    EXPECT_EQ(met.what, bad.what) << bad.text;
    EXPECT_EQ(met.found, bad.found) << bad.text;
    EXPECT_EQ(met.remedy, bad.remedy) << bad.text;
    EXPECT_EQ(exit_status(met.kind), 3) << bad.text;
  }
}

TEST(CoversFile, SuggestsTheNearestName) {
  const PlanFolder folder;
  const CoverTable table = read(folder, cover(kGlass) + "[factors.dirt]\nvalue = 1\nsource = 's'\n");
  try {
    table.cover("my glas", "farm.toml:30 house.north.cover");
    ADD_FAILURE();
  } catch (const Error& error) {
    EXPECT_STREQ(
        error.what(),
        "farm.toml:30 house.north.cover: unknown cover (found: \"my glas\"). Perhaps \"my glass\" is meant.");
    EXPECT_EQ(exit_status(error.kind()), 2);
  }
  EXPECT_THROW(table.factor("dart", "x"), Error);
}

// docs/covers.md has a row for every key, and no row for anything else.
TEST(CoversFile, PageListsItsKeys) {
  std::ifstream file(SUNFALL_COVERS_PAGE);
  std::stringstream text;
  text << file.rdbuf();
  std::vector<std::string> rows;
  for (std::string line; std::getline(text, line);) {
    if (line.rfind("| `", 0) == 0) rows.push_back(line.substr(3, line.find('`', 3) - 3));
  }
  std::vector<std::string> keys;
  for (const TableShape& shape : {cover_shape(), cover_factor_shape()}) {
    for (const KeyNote& key : shape.keys) keys.push_back(key.name);
  }
  std::sort(rows.begin(), rows.end());
  std::sort(keys.begin(), keys.end());
  EXPECT_EQ(rows, keys);
}

}  // namespace
}  // namespace sunfall::testing

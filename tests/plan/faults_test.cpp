// Faults of any table: unknown names, wrong types, things that are not built yet, bad TOML. Every
// message is checked whole: where with its line, what, found, remedy.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "plan/plan_folder.h"
#include "plan/table_reader.h"
#include "plan/table_rules.h"

namespace sunfall::testing {
namespace {

using ::testing::HasSubstr;

TEST(PlanFaults, ReadOnOneLine) {
  const PlanFolder folder;
  EXPECT_EQ(folder.fault(plan_with("[dome]\nqualty = 'fine'\n")).message,
            folder.plan_file().string() + ":7 dome.qualty: unknown key. Perhaps \"quality\" is meant.");
}

TEST(PlanFaults, UnknownKeysNameTheNearest) {
  const PlanFolder folder;
  folder.expect_fault(plan_with_site("grund = 'ground.tif'\nclock = 'UTC'"), "farm.toml:2 site.grund",
                      "unknown key", "", "Perhaps \"ground\" is meant");
  folder.expect_fault(plan_with("[output]\n\n\nshare = true\n"), "farm.toml:9 output.share", "unknown key",
                      "", "Perhaps \"shares\" is meant");
  folder.expect_fault(plan_with("[plots]\nfile = 'plots.gpkg'\nxyzzyxyzzy = 1\n"),
                      "farm.toml:8 plots.xyzzyxyzzy", "unknown key", "",
                      "Known here: file, layer, id or crop");
}

TEST(PlanFaults, TheFirstOfSeveralUnknownKeysIsTold) {
  const PlanFolder folder;
  EXPECT_EQ(folder.fault(plan_with("[dome]\nzone = 1\nangle = 1\n")).where, "farm.toml:7 dome.zone");
}

TEST(PlanFaults, KeysInTheWrongPlaceAreSentHome) {
  const PlanFolder folder;
  folder.expect_fault(plan_with("[plan]\nclock = 'UTC'\n"), "farm.toml:7 plan.clock", "unknown key", "",
                      "It belongs in [site]");
  folder.expect_fault("ground = 'ground.tif'\n" + plan_with(""), "farm.toml:1 ground",
                      "the key stands outside its table", "", "It belongs in [site]");
  folder.expect_fault("qqqqqqqqqq = 1\n" + plan_with(""), "farm.toml:1 qqqqqqqqqq",
                      "unknown key outside of any table", "",
                      "Known here: plan, site, light, periods, plots, canopy, rows, dome or output");
}

TEST(PlanFaults, UnknownTablesNameTheNearest) {
  const PlanFolder folder;
  folder.expect_fault(plan_with("[plot]\nfile = 'plots.gpkg'\n"), "farm.toml:6 plot", "unknown table", "",
                      "Perhaps \"plots\" is meant");
  folder.expect_fault(plan_with("[ \"so\\nme\" ]\n"), "farm.toml:6 \"so\\x0Ame\"", "unknown table", "",
                      "Perhaps \"dome\" is meant");
}

TEST(PlanFaults, TablesNotBuiltYetAreRefused) {
  const PlanFolder folder;
  EXPECT_THAT(tables_not_built_yet(), ::testing::UnorderedElementsAre("house", "panels",
                                                                      "choice", "lamps", "screens"));
  for (const std::string& name : tables_not_built_yet()) {
    for (const std::string& line : {"[[" + name + "]]", "[" + name + "]"}) {
      folder.expect_fault(plan_with("\n" + line + "\n"), "farm.toml:7 " + name,
                          "this version does not know the table yet", "",
                          "Remove it to run without, or use a later version");
    }
  }
}

TEST(PlanFaults, KnownTablesMustBeTables) {
  const PlanFolder folder;
  folder.expect_fault(plan_with("[[dome]]\nsky = 'overcast'\n"), "farm.toml:6 dome", "must be one table",
                      "a list of 1", "Write [dome]");
  folder.expect_fault("dome = 'fine'\n" + plan_with(""), "farm.toml:1 dome", "must be one table",
                      "a string: \"fine\"", "Write [dome]");
}

TEST(PlanFaults, WrongTypesTellTheTypeFound) {
  const PlanFolder folder;
  const std::string number = "must be a number, in m";
  const auto height = [](const std::string& value) {
    return plan_with_site("ground = 'ground.tif'\nclock = 'UTC'\nreceiver_height = " + value);
  };
  const std::string at = "farm.toml:4 site.receiver_height";
  folder.expect_fault(height("'0.5'"), at, number, "a string: \"0.5\"", "Write it without quotes");
  folder.expect_fault(height("'low'"), at, number, "a string: \"low\"", "");
  folder.expect_fault(height("true"), at, number, "true", "");
  folder.expect_fault(height("[0.5]"), at, number, "a list of 1", "");
  folder.expect_fault(height("{ m = 1 }"), at, number, "a table", "");
  folder.expect_fault(height("2025-04-15"), at, number, "a date without quotes", "");
  folder.expect_fault(height("10:30:00"), at, number, "a time without quotes", "");
  folder.expect_fault(height("2025-04-15T10:30:00"), at, number, "a date and time without quotes", "");
}

TEST(PlanFaults, FlagsTextsAndChoicesHaveTheirTypes) {
  const PlanFolder folder;
  folder.expect_fault(plan_with("[output]\nshares = 'yes'\n"), "farm.toml:7 output.shares",
                      "must be true or false", "a string: \"yes\"", "");
  folder.expect_fault(plan_with("[plan]\nname = 7\n"), "farm.toml:7 plan.name", "must be a text in quotes",
                      "a whole number: 7", "");
  folder.expect_fault(plan_with("[plan]\nname = ''\n"), "farm.toml:7 plan.name", "the text is empty", "",
                      "Write something, or remove the key");
  folder.expect_fault(plan_with("[plan]\nname = \"a\\u001Bb\"\n"), "farm.toml:7 plan.name",
                      "the text holds a control character", "\"a\\x1Bb\"", "Remove it");
  folder.expect_fault(plan_with("[plan]\nname = '" + std::string(201, 'x') + "'\n"), "farm.toml:7 plan.name",
                      "the text is longer than 200 bytes", "\"" + std::string(60, 'x') + "…\"", "Shorten it");
  folder.expect_fault(plan_with("[dome]\nquality = 'fien'\n"), "farm.toml:7 dome.quality",
                      "must be \"draft\", \"standard\" or \"fine\"", "\"fien\"", "Perhaps \"fine\" is meant");
  folder.expect_fault(plan_with("[dome]\nsky = 1.5\n"), "farm.toml:7 dome.sky",
                      "must be \"clearness\", \"isotropic\" or \"overcast\"", "a number: 1.5", "");
}

TEST(PlanFaults, RequiredKeysAreMissed) {
  const PlanFolder folder;
  folder.expect_fault("", "farm.toml site.ground", "missing; the plan must give it", "",
                      "Add it to [site] (type: path)");
  folder.expect_fault("\n[site]\nclock = 'UTC'\n", "farm.toml:2 site.ground",
                      "missing; the plan must give it", "", "Add it to [site] (type: path)");
  folder.expect_fault(plan_with("[plots]\nlayer = 'beds'\n"), "farm.toml:6 plots.file",
                      "missing; the plan must give it", "", "Add it to [plots] (type: path)");
}

TEST(PlanFaults, BadTomlTellsLineAndColumn) {
  const PlanFolder folder;
  const PlanFolder::Fault open_list = folder.fault("[site]\nground = 'ground.tif'\nclock = \n");
  EXPECT_EQ(open_list.kind, ErrorKind::plan);
  EXPECT_EQ(open_list.where, "farm.toml:3:9");
  EXPECT_EQ(open_list.what, "the plan is not valid TOML");
  EXPECT_NE(open_list.found, "");
  EXPECT_THAT(open_list.remedy, HasSubstr("Mend the line"));
}

TEST(PlanFaults, RepeatedKeysAndTablesAreRefused) {
  const PlanFolder folder;
  const PlanFolder::Fault key = folder.fault(plan_with("clear = false\n"));
  EXPECT_EQ(key.kind, ErrorKind::plan);
  EXPECT_THAT(key.where, HasSubstr("farm.toml:6:"));
  EXPECT_THAT(key.found, HasSubstr("clear"));
  EXPECT_EQ(key.remedy, "A key or table may stand only once");
  const PlanFolder::Fault table = folder.fault(plan_with("[site]\nreceiver_height = 1\n"));
  EXPECT_THAT(table.where, HasSubstr("farm.toml:6:"));
  EXPECT_EQ(table.remedy, "A key or table may stand only once");
}

// The reader's own guards against a table file that declares one thing and reads another.
TEST(TableReader, AKeyThatIsNotDeclaredOrNotReadIsAFaultOfOurs) {
  Reading reading{{"farm.toml"}, {}, {}};
  const toml::table values = toml::parse("eave = 4.5");
  const NumberKey eave{"eave", {1, 9, "m", ""}, 4.0};
  TableReader reader(reading, {"house", {eave}}, &values, 1);
  const auto kind_of = [](auto&& action) {
    try {
      action();
    } catch (const Error& error) {
      return error.kind();
    }
    return ErrorKind::interrupted;  // nothing was thrown
  };
  EXPECT_EQ(kind_of([&] { reader.finish(); }), ErrorKind::internal);
  EXPECT_EQ(reader.number(eave), 4.5);
  EXPECT_EQ(kind_of([&] { reader.finish(); }), ErrorKind::interrupted);
  EXPECT_EQ(kind_of([&] { reader.flag({"open", true, ""}); }), ErrorKind::internal);
}

}  // namespace
}  // namespace sunfall::testing

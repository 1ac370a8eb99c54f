// Paths of inputs, and the plan's own file.

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <sys/stat.h>

#include "plan/plan_folder.h"
#include "plan/plan_text.h"
#include "plan/words.h"

namespace sunfall::testing {
namespace {

using ::testing::HasSubstr;
namespace fs = std::filesystem;

std::string with_ground(const std::string& path) {
  return plan_with_site("ground = " + path + "\nclock = 'UTC'");
}

constexpr const char* kAt = "farm.toml:2 site.ground";

TEST(InputPath, MissingFilesNameTheNearest) {
  const PlanFolder folder;
  const std::string what = "the file does not exist";
  folder.expect_fault(with_ground("'grond.tif'"), kAt, what, "\"grond.tif\"",
                      "Perhaps \"ground.tif\" is meant", ErrorKind::data);
  folder.expect_fault(with_ground("'GROUND.TIF'"), kAt, what, "\"GROUND.TIF\"",
                      "Perhaps \"ground.tif\" is meant", ErrorKind::data);
  folder.expect_fault(with_ground("'qqqqqqqqqqqq'"), kAt, what, "\"qqqqqqqqqqqq\"",
                      "No file in \"" + folder.path().string() + "\" has a similar name", ErrorKind::data);
  folder.expect_fault(with_ground("'maps/ground.tif'"), kAt, what, "\"maps/ground.tif\"",
                      "There is no folder \"" + folder.path().string() + "/maps\"", ErrorKind::data);
  folder.expect_fault(with_ground("'maps\\ground.tif'"), kAt, what, "\"maps\\ground.tif\"",
                      "Write / between folders", ErrorKind::data);
}

TEST(InputPath, EveryInputIsChecked) {
  const PlanFolder folder;
  const std::string site = "ground = 'ground.tif'\nclock = 'UTC'\n";
  EXPECT_EQ(folder.fault(plan_with_site(site + "surface = 'surfac.tif'")).where, "farm.toml:4 site.surface");
  EXPECT_EQ(folder.fault(plan_with_site(site + "far_ground = 'count.tif'")).where,
            "farm.toml:4 site.far_ground");
  const PlanFolder::Fault plots = folder.fault(plan_with("[plots]\nfile = 'plot.gpkg'\n"));
  EXPECT_EQ(plots.where, "farm.toml:7 plots.file");
  EXPECT_EQ(plots.kind, ErrorKind::data);
}

TEST(InputPath, RefusesWhatIsNoFile) {
  const PlanFolder folder;
  fs::create_directory(folder.path() / "tiles");
  folder.expect_fault(with_ground("'tiles'"), kAt, "a folder stands where a file is needed", "\"tiles\"",
                      "Name a file, relative to the plan's folder", ErrorKind::data);
  folder.expect_fault(with_ground("'.'"), kAt, "a folder stands where a file is needed", "\".\"",
                      "Name a file, relative to the plan's folder", ErrorKind::data);
  folder.expect_fault(with_ground("'/dev/zero'"), kAt, "a device or pipe stands where a file is needed",
                      "\"/dev/zero\"", "Name a file, relative to the plan's folder", ErrorKind::data);
  const std::string name(300, 'x');
  const PlanFolder::Fault fault = folder.fault(with_ground("'" + name + "'"));
  EXPECT_EQ(fault.kind, ErrorKind::data);
  EXPECT_EQ(fault.what, "the file cannot be reached");
  EXPECT_THAT(fault.found, HasSubstr("too long"));
}

TEST(InputPath, RefusesVirtualAndNetworkPaths) {
  const PlanFolder folder;
  const std::string remedy = "Name a file on disk, relative to the plan's folder";
  for (const std::string path :
       {"/vsizip/maps.zip/ground.tif", "/vsicurl/ground.tif", "/VSIMEM/x", "/./vsimem/x", "//vsimem/x"}) {
    folder.expect_fault(with_ground("'" + path + "'"), kAt, "a virtual path is not read", in_quotes(path),
                        remedy);
  }
  for (const std::string path : {"https://example.org/ground.tif", "file:///ground.tif", "s3://bucket/key"}) {
    folder.expect_fault(with_ground("'" + path + "'"), kAt, "a network address is not read", in_quotes(path),
                        remedy);
  }
  folder.expect_fault(with_ground("''"), kAt, "the path is empty", "\"\"", remedy);
  folder.expect_fault(with_ground("\"ground.tif\\u0000x\""), kAt, "the path holds a control character",
                      "\"ground.tif\\x00x\"", remedy);
  folder.expect_fault(with_ground("7"), kAt, "must be a path in quotes", "a whole number: 7", "");
}

TEST(PlanFile, MissingNamesTheNearest) {
  const PlanFolder folder;
  folder.write("farm.toml", "");
  const PlanFolder::Fault fault = folder.fault_of_file(folder.path() / "farn.toml");
  EXPECT_EQ(fault.kind, ErrorKind::plan);
  EXPECT_EQ(fault.where, "farn.toml");
  EXPECT_EQ(fault.what, "the plan does not exist");
  EXPECT_EQ(fault.remedy, "Perhaps \"farm.toml\" is meant");
  // The ending left off, beside files that are nearer in letters.
  folder.write("longfarm.toml", "");
  folder.write("longfarm.tif", "");
  EXPECT_EQ(folder.fault_of_file(folder.path() / "longfarm").remedy, "Perhaps \"longfarm.toml\" is meant");
}

TEST(PlanFile, MustBeAPlainFile) {
  const PlanFolder folder;
  const PlanFolder::Fault place = folder.fault_of_file(folder.path());
  EXPECT_EQ(place.kind, ErrorKind::plan);
  EXPECT_EQ(place.what, "the plan is a folder");
  ASSERT_EQ(mkfifo((folder.path() / "pipe.toml").c_str(), 0600), 0);
  const PlanFolder::Fault pipe = folder.fault_of_file(folder.path() / "pipe.toml");
  EXPECT_EQ(pipe.kind, ErrorKind::plan);
  EXPECT_EQ(pipe.what, "the plan is not a plain file");
}

TEST(PlanFile, MayHoldOneMegabyteAndNotOneByteMore) {
  const PlanFolder folder;
  std::string plan = plan_with("# ");
  plan.resize(kLargestPlan_bytes, '.');
  EXPECT_EQ(folder.read(plan).name, "farm");
  folder.expect_fault(plan + ".", "farm.toml", "the plan is larger than 1 MB", "",
                      "Give the plan, not one of its inputs");
}

TEST(PlanFile, MustBeUtf8) {
  const PlanFolder folder;
  const std::string what = "the plan is not UTF-8 text";
  folder.expect_fault(plan_with("[plan]\nname = 'M\xFChle'\n"), "farm.toml:7", what, "byte 0xFC",
                      "Save it as UTF-8");
  folder.expect_fault(std::string("\xFF\xFE[\0s\0", 6), "farm.toml:1", what, "byte 0xFF", "Save it as UTF-8");
  EXPECT_EQ(folder.read(plan_with("[plan]\nname = 'Mühle 水'\n")).name, "Mühle 水");
}

}  // namespace
}  // namespace sunfall::testing

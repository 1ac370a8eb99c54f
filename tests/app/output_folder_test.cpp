// Where a run writes: folders that cannot be written, disks that fill up, two runs at once, and what an
// earlier run left. In every case: either a whole run, or what stood there before.

#include <gmock/gmock.h>
#include <sys/file.h>
#include <unistd.h>

#include <fcntl.h>

#include <nlohmann/json.hpp>

#include <fmt/format.h>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

namespace fs = std::filesystem;
using testing::Contains;
using testing::HasSubstr;
using testing::Not;

// Permissions do not bind root, but nobody can make a folder in a file.
TEST(OutputFolder, CannotBeMade) {
  const SmallFarm farm;
  write_text(farm / "file", "keep me\n");
  const std::vector<std::string> before = farm.names();
  for (const char* command : {"map", "spot"}) {
    for (const char* folder : {"file", "file/run", "/proc/sunfall/run"}) {
      std::vector<std::string> words{command, "farm.toml", "--dome", "draft", "-o", folder};
      if (words[0] == "spot") words.insert(words.end(), {"--at", "690021,5758979"});
      expect_refused(farm.run(words), 4, {std::string(folder) + ": the run's folder cannot be made", "-o"});
    }
  }
  EXPECT_EQ(farm.names(), before);
  EXPECT_EQ(content_of(farm / "file"), "keep me\n");
}

TEST(OutputFolder, MayNotBeWritten) {
  if (geteuid() == 0) GTEST_SKIP() << "permissions do not bind root; ReadOnly covers the case";
  const SmallFarm farm;
  fs::create_directory(farm / "locked");
  fs::permissions(farm / "locked", fs::perms::owner_read | fs::perms::owner_exec);
  for (const char* folder : {"locked", "locked/run"}) {
    expect_refused(farm.map({"-o", folder}), 4, {"the run's folder cannot be", "Permission denied", "-o"});
  }
  fs::permissions(farm / "locked", fs::perms::owner_all);
  EXPECT_TRUE(fs::is_empty(farm / "locked"));
}

// A new folder, and those on the way to it, go again where the run fails.
TEST(OutputFolder, FoldersMadeForAFailedRunGoAgain) {
  const SmallFarm farm;
  RasterOrder order = farm_ground();
  order.values[0] = 1e38;
  make_raster(farm / "ground.tif", order);
  fs::create_directory(farm / "runs");
  for (const char* folder : {"runs/new/one", "runs/new/one/", "runs", "./other"}) {
    expect_refused(farm.run({"map", "farm.toml", "--dome", "draft", "-o", folder}), 3,
                   {"a height cannot be"});
    EXPECT_TRUE(fs::is_empty(farm / "runs")) << folder;
  }
  EXPECT_THAT(farm.names(), Not(Contains("other")));
}

// The programs of a private mount namespace: `setup` mounts on ./disk, sunfall runs, and what it left is
// copied to ./left, since the mount goes with the namespace.
class PrivateMount {
 public:
  explicit PrivateMount(const SmallFarm& farm) : farm_(farm) { fs::create_directory(farm / "disk"); }

  static bool possible() { return RunningProgram(words_of("mount -t tmpfs none /mnt")).wait().status == 0; }

  Outcome run(const std::string& setup) const {
    fs::remove_all(farm_ / "left");
    RunOptions options;
    options.folder = farm_.path();
    const std::string sunfall = fmt::format("{} map farm.toml --dome draft -o disk/run", SUNFALL_PROGRAM);
    return RunningProgram(
               words_of(setup + " && { " + sunfall + "; status=$?; cp -a disk left; exit $status; }"),
               options)
        .wait();
  }

  std::vector<std::string> left() const {
    std::vector<std::string> names;
    for (const auto& entry : fs::recursive_directory_iterator(farm_ / "left"))
      names.push_back(fs::relative(entry.path(), farm_ / "left").string());
    return names;
  }

 private:
  static std::vector<std::string> words_of(const std::string& script) {
    return {"unshare", geteuid() == 0 ? "-m" : "-rm", "sh", "-c", script};
  }
  const SmallFarm& farm_;
};

constexpr const char* kNoMounts = "no private mounts here: neither root nor user namespaces";

TEST(OutputFolder, ReadOnly) {
  if (!PrivateMount::possible()) GTEST_SKIP() << kNoMounts;
  const SmallFarm farm;
  const PrivateMount disk(farm);
  expect_refused(disk.run("mount -t tmpfs -o ro none disk"), 4,
                 {"disk/run: the run's folder cannot be made", "Read-only file system", "-o"});
  expect_refused(disk.run("mount -t tmpfs none disk && mkdir disk/run && mount -o remount,ro disk"), 4,
                 {"disk/run: the run's folder cannot be written", "Read-only file system", "-o"});
  EXPECT_THAT(disk.left(), testing::ElementsAre("run"));
}

// What the files of a folder take on a tmpfs, which deals in pages.
std::uintmax_t pages_of(const fs::path& folder) {
  std::uintmax_t pages = 0;
  for (const auto& entry : fs::directory_iterator(folder)) pages += (entry.file_size() + 4095) / 4096;
  return pages;
}

std::string disk_of(std::uintmax_t pages) {
  return fmt::format("mount -t tmpfs -o size={} none disk", pages * 4096);
}

// From no room for the lock to a page too little for the summary.
TEST(OutputFolder, FullDiskLeavesNothing) {
  if (!PrivateMount::possible()) GTEST_SKIP() << kNoMounts;
  const SmallFarm farm;
  ASSERT_EQ(farm.map({"--quiet"}).status, 0);
  const std::uintmax_t pages = pages_of(farm / "run");
  const PrivateMount disk(farm);
  std::vector<std::string> disks;
  for (const int files : {2, 3, 12})
    disks.push_back(fmt::format("mount -t tmpfs -o nr_inodes={} none disk", files));
  for (const std::uintmax_t part : {pages / 8, pages / 2, pages * 7 / 8, pages - 1})
    disks.push_back(disk_of(part));
  for (const std::string& small : disks) {
    SCOPED_TRACE(small);
    expect_refused(disk.run(small), 4, {"disk/run", "No space left on device"});
    EXPECT_THAT(disk.left(), testing::IsEmpty());
  }
}

TEST(OutputFolder, FullDiskLeavesTheFormerRun) {
  if (!PrivateMount::possible()) GTEST_SKIP() << kNoMounts;
  const SmallFarm farm;
  ASSERT_EQ(farm.map({"--quiet"}).status, 0);
  const std::string former = content_of(farm / "run" / "summary.json");
  const PrivateMount disk(farm);
  for (const double rooms : {1.05, 1.5, 1.9}) {
    const auto pages = static_cast<std::uintmax_t>(rooms * static_cast<double>(pages_of(farm / "run")));
    expect_refused(disk.run(disk_of(pages) + " && cp -a run disk/run"), 4,
                   {"disk/run", "No space left on device"});
    expect_whole_run(farm / "left" / "run");
    EXPECT_EQ(content_of(farm / "left" / "run" / "summary.json"), former);
  }
}

// A limit on the size of files, as a batch queue may set, is a failed write too.
TEST(OutputFolder, FileSizeLimitLeavesNothing) {
  const SmallFarm farm;
  const std::vector<std::string> before = farm.names();
  for (const std::uint64_t bytes : {0U, 9000U, 20000U, 60000U}) {
    SCOPED_TRACE(bytes);
    RunOptions options;
    options.largest_file_bytes = bytes;
    // The messages go to a nameless file, which the limit binds too: at 0 bytes there are none.
    const Outcome outcome = farm.map({"--quiet"}, options);
    if (bytes > 0) expect_refused(outcome, 4, {"run/.sunfall-making/", "File too large"});
    EXPECT_EQ(outcome.status, 4);
    EXPECT_EQ(outcome.signal, 0);
    EXPECT_EQ(farm.names(), before);
  }
}

TEST(OutputFolder, TwoRunsAtOnce) {
  const SmallFarm farm;
  fs::create_directory(farm / "run");
  const int lock = open((farm / "run" / ".sunfall-lock").c_str(), O_CREAT | O_RDWR, 0644);
  ASSERT_EQ(flock(lock, LOCK_EX | LOCK_NB), 0);
  fs::create_directory(farm / "run" / ".sunfall-making");
  write_text(farm / "run" / ".sunfall-making" / "dli-01.tif", "of the other run");
  expect_refused(farm.map(), 4, {"run: another run is writing into this folder", "Wait for it", "-o"});
  EXPECT_EQ(content_of(farm / "run" / ".sunfall-making" / "dli-01.tif"), "of the other run");
  close(lock);  // the other run is killed
  EXPECT_EQ(farm.map({"--quiet"}).status, 0);
  expect_whole_run(farm / "run");
}

// Started together, some runs may find the folder taken; those that succeed leave one whole run.
TEST(OutputFolder, ManyRunsAtOnce) {
  const SmallFarm farm;
  RunOptions options;
  options.folder = farm.path();
  std::vector<std::unique_ptr<RunningProgram>> runs;
  for (int i = 0; i < 4; ++i) {
    runs.push_back(std::make_unique<RunningProgram>(
        sunfall_words({"map", "farm.toml", "--dome", "draft", "--quiet", "-o", "new/run"}), options));
  }
  int succeeded = 0;
  for (const auto& run : runs) {
    const Outcome outcome = run->wait();
    if (outcome.status == 0) ++succeeded;
    if (outcome.status != 0) expect_refused(outcome, 4, {"another run is writing into this folder"});
  }
  EXPECT_GE(succeeded, 1);
  expect_whole_run(farm / "new" / "run");
}

// A run of another plan does not leave the former one's layers and tables beside its own.
TEST(OutputFolder, ARunReplacesTheFormerOne) {
  const SmallFarm farm;
  farm.write_plots();
  farm.write_plan(
      "", kPlotsTable + "[output]\nshares = true\n[periods]\nseason = { from = '04-15', to = '09-30' }\n");
  ASSERT_EQ(farm.map({"--quiet"}).status, 0);
  expect_whole_run(farm / "run");
  const std::vector<std::string> own{"dli-season.tif", "share-beam-01.tif", "plots.csv", "plots.gpkg"};
  for (const std::string& name : own) EXPECT_TRUE(fs::exists(farm / "run" / name)) << name;
  write_text(farm / "run" / "my-notes.txt", "mine");
  farm.write_plan();
  ASSERT_EQ(farm.map({"--quiet"}).status, 0);
  expect_whole_run(farm / "run");
  for (const std::string& name : own) EXPECT_FALSE(fs::exists(farm / "run" / name)) << name;
  EXPECT_EQ(content_of(farm / "run" / "my-notes.txt"), "mine");
}

// What a summary from elsewhere lists as layers is not removed where it lies outside the folder.
TEST(OutputFolder, AStrangersSummaryRemovesNothingElsewhere) {
  const SmallFarm farm;
  fs::create_directory(farm / "run");
  write_text(farm / "mine.tif", "mine");
  const std::string outside = (farm / "mine.tif").string();
  write_text(farm / "run" / "summary.json",
             R"({"layers":[{"file":"../mine.tif"},{"file":")" + outside + R"("},{"file":7},{},3]})");
  ASSERT_EQ(farm.map({"--quiet"}).status, 0);
  EXPECT_EQ(content_of(farm / "mine.tif"), "mine");
  expect_whole_run(farm / "run");
  write_text(farm / "run" / "summary.json", "[[[{{{ not JSON");
  ASSERT_EQ(farm.map({"--quiet"}).status, 0);
  expect_whole_run(farm / "run");
}

// Results are called plots.gpkg, plots.csv, …, as a user's inputs may be.
TEST(OutputFolder, InputsAreNotReplaced) {
  const SmallFarm farm;
  const std::string ground = content_of(farm / "ground.tif");
  const std::vector<std::string> before = farm.names();
  for (const std::string& folder :
       {std::string("."), farm.path().string(), std::string("../") + farm.path().filename().string()}) {
    expect_refused(farm.run({"map", "farm.toml", "--dome", "draft", "-o", folder}), 2,
                   {"the run's folder holds an input of the plan", "ground.tif", "-o"});
  }
  fs::create_directory(farm / "data");
  fs::rename(farm / "ground.tif", farm / "data" / "dli-01.tif");
  fs::create_symlink("data/dli-01.tif", farm / "ground.tif");
  expect_refused(farm.run({"map", "farm.toml", "--dome", "draft", "-o", "data"}), 2,
                 {"holds an input of the plan"});
  EXPECT_EQ(content_of(farm / "data" / "dli-01.tif"), ground);
}

// Without -o, a run goes to outputs/NAME below the folder where it is started.
TEST(OutputFolder, HasADefault) {
  const SmallFarm farm;
  ASSERT_EQ(farm.run({"map", "farm.toml", "--dome", "draft", "--quiet"}).status, 0);
  expect_whole_run(farm / "outputs" / "farm");
  ASSERT_EQ(farm.run({"spot", "farm.toml", "--at", "690021,5758979", "--dome", "draft", "--quiet"}).status,
            0);
  EXPECT_TRUE(fs::exists(farm / "outputs" / "farm-spot" / "sun-path.png"));
}

}  // namespace
}  // namespace sunfall::test

// A run that is stopped: by Ctrl-C, by a scheduler, or by force. No file lies afterwards, and the same
// command runs again.

#include <gmock/gmock.h>

#include <csignal>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

namespace fs = std::filesystem;

constexpr int kLargeSide = 1600;  // cells: 16 tiles, several seconds on one core
// Long enough for the tiles at work to be finished, on a machine that is busy elsewhere.
constexpr double kSoon_s = 20.0;

// A farm with a second plan, large.toml, whose map takes a while.
class Interrupts : public testing::Test {
 protected:
  Interrupts() {
    RasterOrder order = farm_ground();
    order.columns = order.rows = kLargeSide;
    order.values.resize(static_cast<std::size_t>(kLargeSide) * kLargeSide);
    for (std::size_t i = 0; i < order.values.size(); ++i)
      order.values[i] = 20.0 + static_cast<double>(i % kLargeSide % 97) * 0.05;
    make_raster(farm_ / "large.tif", order);
    write_text(farm_ / "large.toml", "[site]\nground = 'large.tif'\nclock = '+01:00'\n" + kMonthlyLight);
    options_.folder = farm_.path();
  }

  // The large map, on its way into ./run.
  std::unique_ptr<RunningProgram> large_run(const std::string& stage) {
    auto run = std::make_unique<RunningProgram>(
        sunfall_words({"map", "large.toml", "--dome", "draft", "--jobs", "1", "-o", "run"}), options_);
    EXPECT_TRUE(run->tells(stage)) << stage;
    return run;
  }

  void expect_stops_soon(RunningProgram& run, int signal) {
    const auto begin = std::chrono::steady_clock::now();
    run.send(signal);
    const Outcome outcome = run.wait();
    expect_refused(outcome, 5, {"stopped", "Run the same command again"});
    EXPECT_LT(std::chrono::duration<double>(std::chrono::steady_clock::now() - begin).count(), kSoon_s);
  }

  SmallFarm farm_;
  RunOptions options_;
};

TEST_F(Interrupts, CtrlCLeavesNothing) {
  const std::vector<std::string> before = farm_.names();
  expect_stops_soon(*large_run("following the light: 25 %"), SIGINT);
  EXPECT_EQ(farm_.names(), before);
}

TEST_F(Interrupts, CtrlCWhileReadingLeavesNothing) {
  const std::vector<std::string> before = farm_.names();
  expect_stops_soon(*large_run("reading the ground: 25 %"), SIGINT);
  EXPECT_EQ(farm_.names(), before);
}

// As batch queues and closed terminals do.
TEST_F(Interrupts, TerminationAndHangUpAreTheSame) {
  const std::vector<std::string> before = farm_.names();
  for (const int signal : {SIGTERM, SIGHUP}) {
    expect_stops_soon(*large_run("reading the ground: 100 %"), signal);
    EXPECT_EQ(farm_.names(), before);
  }
}

TEST_F(Interrupts, ASecondCtrlCDoesNoHarm) {
  const auto run = large_run("following the light: 25 %");
  run->send(SIGINT);
  run->send(SIGINT);
  EXPECT_EQ(run->wait().status, 5);
  ASSERT_EQ(farm_.map({"--quiet"}).status, 0);
  expect_whole_run(farm_ / "run");
}

// nohup and scripts in the background ignore the signal for their children.
TEST_F(Interrupts, ASignalThatIsIgnoredStaysIgnored) {
  std::signal(SIGHUP, SIG_IGN);
  RunOptions options;
  options.folder = farm_.path();
  RunningProgram run(sunfall_words({"map", "farm.toml", "--dome", "draft", "-o", "run"}), options);
  std::signal(SIGHUP, SIG_DFL);
  EXPECT_TRUE(run.tells("reading the ground"));
  run.send(SIGHUP);
  EXPECT_EQ(run.wait().status, 0);
}

TEST_F(Interrupts, AKilledRunIsRunAgain) {
  {
    const auto run = large_run("following the light: 25 %");
    run->send(SIGKILL);
    EXPECT_EQ(run->wait().signal, SIGKILL);
  }
  for (const auto& entry : fs::directory_iterator(farm_ / "run")) {
    EXPECT_EQ(entry.path().filename().string().front(), '.') << "a layer of a killed run: " << entry.path();
  }
  EXPECT_TRUE(fs::exists(farm_ / "run" / ".sunfall-making"));
  ASSERT_EQ(farm_.map({"--quiet"}).status, 0);
  expect_whole_run(farm_ / "run");
}

// Until a new run is whole, the former one stands, to the byte.
TEST_F(Interrupts, TheFormerRunStandsUntilTheNextIsWhole) {
  ASSERT_EQ(farm_.map({"--quiet"}).status, 0);
  const std::string former = content_of(farm_ / "run" / "summary.json");
  expect_stops_soon(*large_run("reading the ground: 100 %"), SIGINT);
  expect_whole_run(farm_ / "run");
  EXPECT_EQ(content_of(farm_ / "run" / "summary.json"), former);
  large_run("following the light: 25 %")->send(SIGKILL);
  EXPECT_EQ(content_of(farm_ / "run" / "summary.json"), former);
  fs::remove_all(farm_ / "run" / ".sunfall-making");  // the only other thing that the killed run left
  fs::remove(farm_ / "run" / ".sunfall-lock");
  expect_whole_run(farm_ / "run");
  ASSERT_EQ(farm_.map({"--quiet"}).status, 0);
  expect_whole_run(farm_ / "run");
}

}  // namespace
}  // namespace sunfall::test

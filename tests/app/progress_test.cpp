// How a run tells where it is: a bar with the time left on a terminal, a few plain lines elsewhere, always
// on standard error.

#include <gmock/gmock.h>

#include <algorithm>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;
using testing::Not;

TEST(Progress, PlainLinesWhereNobodyWatches) {
  const SmallFarm farm;
  const Outcome outcome = farm.map();
  ASSERT_EQ(outcome.status, 0);
  EXPECT_THAT(outcome.err, HasSubstr("finishing the layers: 25 %\nfinishing the layers: 50 %\n"));
  EXPECT_THAT(outcome.err, Not(HasSubstr("\r")));
  EXPECT_THAT(outcome.out, HasSubstr("Open field, mol m-2 d-1: 4."));
  EXPECT_THAT(outcome.out, HasSubstr("\n16 layers, tables and pictures are in run\nNotes:\n  "));
  EXPECT_THAT(outcome.out, Not(HasSubstr("finishing the layers")));
}

// `script` gives the program a terminal of its own. Of the sixteen layers, some are done while others wait.
TEST(Progress, ABarWithTheTimeLeftOnATerminal) {
  const SmallFarm farm;
  RunOptions options;
  options.folder = farm.path();
  const std::string command = std::string(SUNFALL_PROGRAM) + " map farm.toml --dome draft -o run";
  const Outcome outcome = RunningProgram({"script", "-qec", command, "/dev/null"}, options).wait();
  ASSERT_EQ(outcome.status, 0) << outcome.out;
  for (const char* part : {"\rfinishing the layers   [######", " s left",
                           "\rtables and pictures    [#########################] 100 %"})
    EXPECT_THAT(outcome.out, HasSubstr(part));
  // The results begin on a line of their own.
  EXPECT_THAT(outcome.out, HasSubstr("\nOpen field, "));
  expect_whole_run(farm / "run");
}

}  // namespace
}  // namespace sunfall::test

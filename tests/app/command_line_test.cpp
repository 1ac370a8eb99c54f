// The command line: what is missing, unknown or impossible, and what can be asked for.

#include <gmock/gmock.h>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

void expect_command_refused(const std::vector<std::string>& arguments,
                            const std::vector<std::string>& parts) {
  SCOPED_TRACE(arguments.empty() ? "no arguments" : arguments.back());
  expect_refused(sunfall_run(arguments), 2, parts);
}

TEST(CommandLine, TellsWhatIsMissing) {
  expect_command_refused({}, {"command line: A subcommand is required", "Try: sunfall --help"});
  for (const char* command : {"vet", "map", "spot"}) {
    expect_command_refused({command},
                           {"PLAN is required", std::string("Try: sunfall ") + command + " --help"});
  }
  expect_command_refused({"spot", "farm.toml"}, {"--at is required", "Try: sunfall spot --help"});
}

TEST(CommandLine, NamesWhatIsUnknown) {
  expect_command_refused({"mpa", "farm.toml"}, {R"(no such command (found: "mpa"))", R"("map" is meant)"});
  expect_command_refused({"vet", "farm.toml", "--speed"}, {"--speed", "Try: sunfall vet --help"});
  expect_command_refused({"vet", "farm.toml", "other.toml"}, {"other.toml", "Try: sunfall vet --help"});
  expect_command_refused({"map", "farm.toml", "--at", "1,2"}, {"--at", "Try: sunfall map --help"});
}

TEST(CommandLine, RefusesImpossibleOptions) {
  for (const char* jobs : {"-1", "1025", "many", "1.5", ""}) {
    expect_command_refused({"vet", "farm.toml", "--jobs", jobs}, {"--jobs", "Try: sunfall vet --help"});
  }
  expect_command_refused({"vet", "farm.toml", "--dome", "coarse"},
                         {"--dome", "coarse", "draft,standard,fine"});
}

TEST(CommandLine, RefusesPlacesAndDaysThatCannotBe) {
  const SmallFarm farm;
  for (const char* at :
       {"691240", "691240;5759310", "east,north", "691240,", "1,2,3", "nan,5759310", "1e999,0"}) {
    SCOPED_TRACE(at);
    expect_refused(farm.run({"spot", "farm.toml", "--at", at}), 2, {"--at: ", at, "such as 691240,5759310"});
  }
  for (const char* day : {"0621", "13-01", "02-30", "6.5-01", "06-", "june-21", "-06-21", "99999999999-1"}) {
    SCOPED_TRACE(day);
    expect_refused(farm.run({"spot", "farm.toml", "--at", "690021,5758979", std::string("--day=") + day}), 2,
                   {"--day: ", day, "such as 12-21"});
  }
  // The plan's year is 2025.
  expect_refused(farm.run({"spot", "farm.toml", "--at", "690021,5758979", "--day", "02-29"}), 2,
                 {"--day: there is no such day in 2025", "02-29", "leap year"});
}

TEST(CommandLine, ASpotMustStandInTheOpenOnTheMap) {
  const SmallFarm farm;
  farm.write_plan("surface = 'surface.tif'\n");
  const auto spot = [&](const char* at) {
    return farm.run({"spot", "farm.toml", "--at", at, "--dome", "draft", "-o", "run"});
  };
  expect_refused(spot("690129,5758900"), 2,
                 {"--at: the point lies off the map (found: 690129.00,5758900.00)",
                  "easting 690000 to 690128 and northing 5758872 to 5759000"});
  // The wall fills the column of cells from 690064 to 690066.
  expect_refused(spot("690065,5758900"), 2,
                 {"--at: the place is under something solid", "690065.00", "Choose"});
  EXPECT_FALSE(std::filesystem::exists(farm / "run"));
}

TEST(CommandLine, HelpAndVersionAreAnswers) {
  for (const std::vector<std::string>& asked :
       {std::vector<std::string>{"--help"}, {"vet", "--help"}, {"map", "--help"}, {"spot", "--help"}}) {
    const Outcome outcome = sunfall_run(asked);
    EXPECT_EQ(outcome.status, 0);
    EXPECT_EQ(outcome.err, "");
    EXPECT_THAT(outcome.out, HasSubstr("Usage: sunfall"));
    EXPECT_THAT(outcome.out, HasSubstr("Exit status"));
  }
  const Outcome version = sunfall_run({"--version"});
  EXPECT_EQ(version.status, 0);
  EXPECT_THAT(version.out, HasSubstr("sunfall 0."));
  EXPECT_THAT(version.out, HasSubstr("GDAL 3."));
}

// /dev/full takes no byte, like a full disk.
TEST(CommandLine, ResultsThatCannotBePrintedAreAnError) {
  const SmallFarm farm;
  RunOptions options;
  options.output_to = "/dev/full";
  for (const std::vector<std::string>& asked :
       {std::vector<std::string>{"vet", "farm.toml", "--dome", "draft"},
        {"vet", "farm.toml", "--dome", "draft", "--json"},
        {"--help"}}) {
    expect_refused(farm.run(asked, options), 4,
                   {"standard output: the results cannot be written", "No space left"});
  }
}

// Progress that nobody can read does not end a run, and a message that nobody can read leaves its status.
TEST(CommandLine, AFullStandardErrorChangesNothing) {
  const SmallFarm farm;
  RunOptions options;
  options.errors_to = "/dev/full";
  EXPECT_EQ(farm.map({}, options).status, 0);
  expect_whole_run(farm / "run");
  EXPECT_EQ(farm.run({"vet", "nothing.toml"}, options).status, 2);
}

}  // namespace
}  // namespace sunfall::test

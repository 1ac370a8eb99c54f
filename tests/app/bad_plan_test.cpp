// Faults of the plan, met through the program.

#include <gmock/gmock.h>

#include "app/small_farm.h"

namespace sunfall::test {
namespace {

// Line 1 is [site], 2 ground, 3 clock, 4 [light], 5 monthly_global; more follows from 6 on.
TEST(BadPlan, MissingPlan) {
  const SmallFarm farm;
  expect_refused(farm.run({"vet", "frm.toml"}), 2,
                 {"frm.toml: the plan does not exist", R"(Perhaps "farm.toml")"});
  expect_refused(farm.run({"map", "."}), 2, {"the plan is a folder", ".toml"});
}

TEST(BadPlan, UnknownKeyNamesTheNearest) {
  const SmallFarm farm;
  farm.write_plan("reciever_height = 1\n");
  expect_all_refuse(
      farm, 2, {"farm.toml:4 site.reciever_height: unknown key", R"(Perhaps "receiver_height" is meant)"});
  farm.write_plan("", "[doom]\nquality = 'draft'\n");
  expect_all_refuse(farm, 2, {"farm.toml:6 doom: unknown", R"(Perhaps "dome" is meant)"});
}

TEST(BadPlan, WrongTypeTellsItsLine) {
  const SmallFarm farm;
  farm.write_plan("receiver_height = '0.5'\n");
  expect_all_refuse(farm, 2,
                    {"farm.toml:4 site.receiver_height: must be a number, in m", "0.5", "without quotes"});
  farm.write_plan("", "[output]\nshares = 1\n");
  expect_all_refuse(farm, 2, {"farm.toml:7 output.shares: must be true or false (found: "});
}

TEST(BadPlan, BrokenToml) {
  const SmallFarm farm;
  farm.write_plan("receiver_height = \n");
  expect_all_refuse(farm, 2, {"farm.toml:4"});
}

TEST(BadPlan, ElevenMonths) {
  const SmallFarm farm;
  write_text(farm / "farm.toml",
             "[site]\nground = 'ground.tif'\nclock = '+01:00'\n[light]\nmonthly_global = "
             "[2,4,8,13,17,18,17,15,10,6,3]\n");
  expect_all_refuse(farm, 2, {"farm.toml:5 light.monthly_global", "twelve numbers", "11"});
}

void expect_months_refused(const std::string& months, const std::vector<std::string>& parts) {
  const SmallFarm farm;
  write_text(farm / "farm.toml",
             "[site]\nground = 'ground.tif'\nclock = '+01:00'\n[light]\nmonthly_global = [" + months + "]\n");
  expect_all_refuse(farm, 2, parts);
}

TEST(BadPlan, NegativeRadiation) {
  expect_months_refused("2.2, 4.1, -8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 1.8",
                        {"farm.toml:5 light.monthly_global", "March", "-8", "MJ m-2 d-1"});
}

// FAO-56 table 2.6: at 52 degrees north December brings 6.1 to 7.3 MJ outside the air, so 9 cannot be.
TEST(BadPlan, MoreRadiationThanTheSunSends) {
  expect_months_refused("2.2, 4.1, 8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 9.0",
                        {"farm.toml:5 light.monthly_global", "December", "more than the sun sends",
                         "(found: 9 MJ m-2 d-1)", "kWh m-2 d-1 times 3.6"});
}

// Means in W m-2, the commonest mistake.
TEST(BadPlan, WattsForMegajoules) {
  expect_months_refused(
      "25, 47, 93, 153, 197, 209, 201, 172, 119, 68, 34, 21",
      {"farm.toml:5 light.monthly_global", "March", "(found: 93)", "mean W m-2 times 0.0864"});
}

TEST(BadPlan, UnknownTimeZone) {
  const SmallFarm farm;
  write_text(farm / "farm.toml",
             "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdan'\n" + kMonthlyLight);
  expect_all_refuse(farm, 2,
                    {"farm.toml:3 site.clock: the time zone is not known", R"("Europe/Amsterdan")",
                     R"(Did you mean "Europe/Amsterdam"?)"});
}

// Names in a plan reach the terminal as text, whatever they hold.
TEST(BadPlan, ControlCharactersAreShownAndNotSent) {
  const SmallFarm farm;
  write_text(farm / "farm.toml", "[site]\nground = \"\\u001b[2J.tif\"\nclock = '+01:00'\n" + kMonthlyLight);
  const Outcome outcome = farm.run({"vet", "farm.toml"});
  expect_refused(outcome, 2, {"farm.toml:2 site.ground"});
  EXPECT_EQ(outcome.err.find('\x1b'), std::string::npos);
  const Outcome name = farm.run({"vet", "a\nb\x1b[2J.toml"});
  expect_refused(name, 2, {"\\x0A"});
  EXPECT_EQ(name.err.find('\x1b'), std::string::npos);
}

}  // namespace
}  // namespace sunfall::test

// [light.grid]: the variables, unit and sums of a gridded weather file.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "plan/plan_folder.h"

namespace sunfall::testing {
namespace {

std::string plan_with_grid(const std::string& lines) {
  std::string plan = plan_with_light("");
  plan.replace(plan.find("[light]"), std::string::npos, "[light.grid]\nfile = 'reanalysis.nc'\n" + lines);
  return plan;
}

GridSource grid_of(const std::string& lines) {
  const PlanFolder folder;
  return std::get<GridSource>(folder.read(plan_with_grid(lines)).light);
}

TEST(GridTable, HoldsWhatThePlanSays) {
  const GridSource source = grid_of(
      "global = 'ssrd'\nbeam = 'fdir'\nbeam_plane = 'level'\nstamp = 'end'\nunit = 'J m-2'\naccumulated = "
      "'start'\n"
      "point = 'bilinear'\nsplit = 'erbs'\nallow_gaps = true\ntrust_clock = true\n");
  EXPECT_EQ(source.file.filename(), "reanalysis.nc");
  EXPECT_EQ(source.global + source.diffuse + source.beam, "ssrdfdir");
  EXPECT_EQ(source.beam_plane, GridSource::BeamPlane::level);
  EXPECT_EQ(source.stamp, SeriesSource::Stamp::end);
  EXPECT_EQ(source.unit, SeriesSource::Unit::j_m2);
  EXPECT_EQ(source.accumulated, GridSource::Accumulated::start);
  EXPECT_EQ(source.point, GridSource::Point::bilinear);
  EXPECT_EQ(source.split, SeriesSource::Split::erbs);
  EXPECT_TRUE(source.allow_gaps && source.trust_clock);
}

TEST(GridTable, HasDefaults) {
  const GridSource source = grid_of("global = 'ssrd'\nstamp = 'middle'\n");
  EXPECT_EQ(source.unit, std::nullopt);
  EXPECT_EQ(source.accumulated, GridSource::Accumulated::step);
  EXPECT_EQ(source.point, GridSource::Point::nearest);
  EXPECT_FALSE(source.allow_gaps || source.trust_clock);
}

TEST(GridTable, WantsVariablesThatMakeALight) {
  const PlanFolder folder;
  const auto refused = [&](const std::string& lines, const std::string& where, const std::string& what,
                           const std::string& remedy) {
    folder.expect_fault(plan_with_grid(lines), where, what, "", remedy);
  };
  refused("stamp = 'end'\ndiffuse = 'd'\n", "farm.toml:4 light.grid",
          "no variable of global radiation is named",
          "Add global = \"<the variable's name>\", or both diffuse and beam");
  refused("stamp = 'end'\nglobal = 'g'\nbeam = 'b'\n", "farm.toml:4 light.grid.beam_plane",
          "it is not said what plane the beam is counted on",
          "Give beam_plane = \"sun\" for a plane that faces the sun, \"level\" for the ground's");
  refused("stamp = 'end'\ndiffuse = 'd'\nbeam = 'b'\nbeam_plane = 'level'\n",
          "farm.toml:9 light.grid.beam_plane",
          "beam on the level goes with global alone: the rest is diffuse", "Name global");
  refused("stamp = 'begin'\nglobal = 'g'\naccumulated = 'start'\n", "farm.toml:6 light.grid.stamp",
          "a sum since the forecast's start ends at its time", "Give stamp = \"end\"");
  folder.expect_fault(plan_with_grid("stamp = 'end'\nglobal = 'g'\n") + "[light]\nyear = 2024\n",
                      "farm.toml:9 light.year", "a series has years of its own", "", "Remove it");
}

}  // namespace
}  // namespace sunfall::testing

// A gridded file's columns as light: units, sums since a forecast's start, beam on the level. The reader is a
// made one; files are read in tests/geo/point_series_test.cpp and tests/app/grid_test.cpp.

#include "light/grid.h"

#include <gmock/gmock.h>

#include <limits>

#include "light/accumulation.h"
#include "light/station.h"
#include "light/unit_text.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using testing::Contains;
using testing::HasSubstr;
using Accumulated = GridSource::Accumulated;
using Unit = SeriesSource::Unit;

constexpr double kNone = std::numeric_limits<double>::quiet_NaN();

const LightSeries& truth() {
  static const LightSeries series = cloudy_truth(place_at(52.0, 5.0), 2025, "+00:00");
  return series;
}

// Hour-ending means of the truth in W m-2.
PointRecord hours() {
  PointRecord record;
  const std::int64_t begin_s = truth().sun.begin.time_since_epoch().count();
  for (PointRecord::Quantity& quantity : record.quantities) quantity.unit = "W m-2";
  for (std::size_t minute = 0; minute < truth().steps.size() * 10; minute += 60) {
    const Shown values = shown(truth(), minute, 60);
    record.time_s.push_back(begin_s + static_cast<std::int64_t>(minute + 60) * 60);
    record.quantities[0].value.push_back(values.global);
    record.quantities[1].value.push_back(values.diffuse);
    record.quantities[2].value.push_back(values.global - values.diffuse);  // on the level
  }
  record.points = "a point";
  return record;
}

// Joules since the last of the given hours of the day; `runs` also tells when each began.
PointRecord accumulated(std::vector<int> starts, bool runs) {
  PointRecord record = hours();
  for (auto& quantity : record.quantities) {
    quantity.unit = "J m**-2";
    double sum = 0.0;
    for (std::size_t i = 0; i < quantity.value.size(); ++i) {
      const int hour = static_cast<int>(i % 24);  // in which the step begins
      if (std::find(starts.begin(), starts.end(), hour) != starts.end()) sum = 0.0;
      sum += 3600.0 * quantity.value[i];
      quantity.value[i] = sum;
    }
  }
  if (!runs) return record;
  std::int64_t run_s = record.time_s[0] - 3600;
  for (std::size_t i = 0; i < record.time_s.size(); ++i) {
    if (std::find(starts.begin(), starts.end(), static_cast<int>(i % 24)) != starts.end())
      run_s = record.time_s[i] - 3600;
    record.run_s.push_back(run_s);
  }
  return record;
}

GridSource global_alone() {
  GridSource source;
  source.file = "era.nc";
  source.global = "ssrd";
  return source;
}

LightSeries light_of_grid(const GridSource& source, const PointRecord& record) {
  LightOptions options;
  options.read_point = [&record](const GridSource&, const Place&) { return record; };
  return make_light(source, truth().place, Clock::parse("+00:00", "test"), options, "farm.toml:5 light.grid");
}

std::string fault_of(const GridSource& source, const PointRecord& record) {
  try {
    light_of_grid(source, record);
  } catch (const Error& error) {
    return error.what();
  }
  return "no fault";
}

// The demand is 0.1 % between variants of one record.
void expect_same_light(const LightSeries& a, const LightSeries& b) {
  const MonthlyLight one = monthly_dli(a);
  const MonthlyLight other = monthly_dli(b);
  for (std::size_t month = 0; month < 12; ++month) {
    EXPECT_NEAR(one.beam[month], other.beam[month], 0.001 * one.total(month)) << month;
    EXPECT_NEAR(one.sky[month], other.sky[month], 0.001 * one.total(month)) << month;
  }
}

TEST(UnitText, KnowsTheUsualWays) {
  for (const char* text : {"W m-2", "W m**-2", "W/m^2", "[W/(m^2)]", "W/m2", "W m^-2", "W.m-2", "Watts/m2"})
    EXPECT_EQ(unit_of_text(text), Unit::w_m2) << text;
  for (const char* text : {"J m**-2", "J m-2", "J/m2", "[J/(m^2)]"})
    EXPECT_EQ(unit_of_text(text), Unit::j_m2) << text;
  EXPECT_EQ(unit_of_text("kJ m-2"), Unit::kj_m2);
  EXPECT_EQ(unit_of_text("MJ/m^2"), Unit::mj_m2);
  EXPECT_EQ(unit_of_text("J cm-2"), Unit::j_cm2);
  EXPECT_EQ(unit_of_text("Wh m-2"), Unit::wh_m2);
  EXPECT_EQ(unit_of_text("kWh/m2"), Unit::kwh_m2);
  EXPECT_EQ(unit_of_text("umol m-2 s-1"), Unit::umol_m2_s);
  EXPECT_EQ(unit_of_text("µmol m-2 s-1"), Unit::umol_m2_s);
  for (const char* text : {"", "K", "lux", "W", "m-2", "mJ m-2", "J m-2 h-1", "W m-1", "1"})
    EXPECT_FALSE(unit_of_text(text)) << text;
}

// By hand: sums of hours that bring 0, 1, 2, 3 and then begin anew.
TEST(StepEnergies, AreDifferencesWithinARun) {
  const std::vector<std::int64_t> time_s{3600, 7200, 10800, 14400, 18000, 25200, 28800};
  const std::vector<std::int64_t> run_s{0, 0, 0, 10800, 10800, 10800, 21600};
  const StepEnergies energies = step_energies({0, 1, 3, 7, 9, 12, 5}, time_s, run_s, std::chrono::hours{1});
  // Hour 6 is missing: what came in it and in hour 7 cannot be told apart. The last run begins one hour
  // before hour 7 ended, and its first value comes two hours after its start.
  EXPECT_THAT(energies.value, testing::Pointwise(testing::NanSensitiveDoubleEq(),
                                                 std::vector<double>{0, 1, 2, 7, 2, kNone, kNone}));
  EXPECT_EQ(energies.resets, 2);
}

// The first hour after midnight brings more than the whole dull day before, and still begins anew.
TEST(StepEnergies, FindResetsThatTheSumHides) {
  std::vector<double> sum, truth;
  std::vector<std::int64_t> time_s;
  for (int day = 0; day < 8; ++day) {
    const double bright = day == 4 ? 0.01 : 1.0;
    double total = 0.0;
    for (int hour = 0; hour < 24; ++hour) {
      truth.push_back(bright * (hour < 6 || hour >= 18 ? 1.0 : 0.0));  // a place whose noon is midnight UTC
      total += truth.back();
      sum.push_back(total);
      time_s.push_back((day * 24 + hour + 1) * 3600);
    }
  }
  const StepEnergies energies = step_energies(sum, time_s, {}, std::chrono::hours{1});
  for (std::size_t i = 1; i < sum.size(); ++i) EXPECT_NEAR(energies.value[i], truth[i], 1e-12) << i;
  EXPECT_EQ(energies.resets, 7);
}

TEST(StepEnergies, AreToldFromLightOfSteps) {
  EXPECT_FALSE(look_accumulated(hours().quantities[0].value));
  EXPECT_TRUE(look_accumulated(accumulated({0}, false).quantities[0].value));
  EXPECT_TRUE(look_accumulated(accumulated({0, 6, 12, 18}, false).quantities[0].value));
}

TEST(Grid, IsTheLightOfTheSameRecordAsATable) {
  GridSource source = global_alone();
  source.diffuse = "dif";
  const LightSeries series = light_of_grid(source, hours());
  const TextFile file(logged(truth(), {.columns = "gd"}));
  expect_same_light(series, light_of(source_of(file, {.columns = "gd"}), truth().place, 2025, "+00:00"));
  // And that of the truth within the 1 % that is asked of hours run back.
  const MonthlyLight found = monthly_dli(series), known = monthly_dli(truth());
  for (std::size_t month = 0; month < 12; ++month) {
    EXPECT_NEAR(found.beam[month], known.beam[month], 0.01 * known.total(month));
    EXPECT_NEAR(found.sky[month], known.sky[month], 0.01 * known.total(month));
  }
  EXPECT_THAT(series.notes, Contains(HasSubstr("the point nearest to the map in era.nc: a point")));
  EXPECT_THAT(series.notes, Contains(HasSubstr("the file's own, W m-2")));
}

TEST(Grid, SumsSinceTheStartAreTheSameLight) {
  const LightSeries plain = light_of_grid(global_alone(), hours());
  GridSource source = global_alone();
  source.accumulated = Accumulated::start;
  for (const std::vector<int>& starts : {std::vector<int>{0}, {6, 18}, {0, 6, 12, 18}}) {
    for (const bool runs : {false, true}) {
      SCOPED_TRACE(std::to_string(starts.size()) + (runs ? " with runs" : ""));
      const LightSeries series = light_of_grid(source, accumulated(starts, runs));
      expect_same_light(plain, series);
      EXPECT_THAT(series.notes,
                  Contains(HasSubstr("they began anew " +
                                     std::to_string(365 * starts.size() - (starts[0] == 0 ? 1 : 0)))));
    }
  }
}

TEST(Grid, BeamOnTheLevelLeavesTheDiffuse) {
  GridSource parts = global_alone();
  parts.diffuse = "dif";
  GridSource level = global_alone();
  level.beam = "fdir";
  level.beam_plane = GridSource::BeamPlane::level;
  expect_same_light(light_of_grid(parts, hours()), light_of_grid(level, hours()));
}

TEST(Grid, UnitsComeFromTheFileOrThePlan) {
  const LightSeries plain = light_of_grid(global_alone(), hours());
  PointRecord joules = hours();
  for (double& value : joules.quantities[0].value) value *= 3600.0;
  joules.quantities[0].unit = "J/m^2";
  expect_same_light(plain, light_of_grid(global_alone(), joules));
  joules.quantities[0].unit = "";
  EXPECT_THAT(fault_of(global_alone(), joules), HasSubstr("does not say the unit"));
  GridSource told = global_alone();
  told.unit = Unit::j_m2;
  expect_same_light(plain, light_of_grid(told, joules));
  joules.quantities[0].unit = "kJ m-2";
  EXPECT_THAT(fault_of(told, joules),
              AllOf(HasSubstr("the file's unit is not the plan's"), HasSubstr("ssrd in kJ m-2, not J m-2")));
  joules.quantities[0].unit = "K";
  EXPECT_THAT(fault_of(global_alone(), joules), HasSubstr("none of light (found: ssrd in \"K\")"));
  GridSource parts = global_alone();
  parts.diffuse = "dif";
  joules.quantities[0].unit = "J m-2";
  EXPECT_THAT(fault_of(parts, joules), HasSubstr("different units"));
}

TEST(Grid, SaysWhatTheSumsAre) {
  EXPECT_THAT(fault_of(global_alone(), accumulated({0}, false)), HasSubstr("Give accumulated = \"start\""));
  GridSource source = global_alone();
  source.accumulated = Accumulated::start;
  PointRecord joules = hours();
  joules.quantities[0].unit = "J m-2";
  EXPECT_THAT(fault_of(source, joules), HasSubstr("Remove accumulated"));
  EXPECT_THAT(fault_of(source, hours()), HasSubstr("only energies are sums"));
}

TEST(Grid, ClockFaultsSayNothingOfZones) {
  GridSource source = global_alone();
  source.stamp = SeriesSource::Stamp::begin;
  const std::string fault = fault_of(source, hours());
  EXPECT_THAT(fault, HasSubstr("Give stamp = \"end\""));
  EXPECT_THAT(fault, testing::Not(HasSubstr("utc")));
}

TEST(Grid, WantsEvenSteps) {
  PointRecord record = hours();
  for (std::size_t i = 0; i < record.time_s.size(); ++i)
    record.time_s[i] = record.time_s[0] + 18000 * std::int64_t(i);
  EXPECT_THAT(fault_of(global_alone(), record),
              HasSubstr("or 2, 3, 4, 6, 8 or 12 hours (found: 18000 seconds"));
  record = hours();
  record.time_s[100] += 600;
  EXPECT_THAT(fault_of(global_alone(), record), HasSubstr("era.nc time number 101"));
}

}  // namespace
}  // namespace sunfall

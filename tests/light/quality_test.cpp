// Limits of Long and Shi (2008); the digits were compared in several public copies.

#include "light/quality.h"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>

#include "light/photons.h"
#include "light/quantum.h"
#include "light/radiation_limits.h"
#include "light/station.h"

namespace sunfall {
namespace {

using testing::Contains;
using testing::HasSubstr;
using testing::Not;

TEST(RadiationLimits, AreThoseOfTheNetwork) {
  // Overhead the powers are 1; at night nothing but the offsets is left.
  const RadiationLimits possible = physically_possible(1.0, 1361.0);
  EXPECT_DOUBLE_EQ(possible.global, 1.5 * 1361.0 + 100.0);
  EXPECT_DOUBLE_EQ(possible.diffuse, 0.95 * 1361.0 + 50.0);
  EXPECT_DOUBLE_EQ(possible.beam_normal, 1361.0);
  EXPECT_DOUBLE_EQ(physically_possible(0.0, 1361.0).global, 100.0);
  const RadiationLimits rare = extremely_rare(0.5, 1361.0);  // 0.5^1.2 = 0.43528, 0.5^0.2 = 0.87055
  EXPECT_NEAR(rare.global, 1.2 * 1361.0 * 0.435275 + 50.0, 0.01);
  EXPECT_NEAR(rare.diffuse, 0.75 * 1361.0 * 0.435275 + 30.0, 0.01);
  EXPECT_NEAR(rare.beam_normal, 0.95 * 1361.0 * 0.870551 + 10.0, 0.01);
  EXPECT_EQ(closure_tolerance(0.5), 0.08);
  EXPECT_EQ(closure_tolerance(0.2), 0.15);
  EXPECT_EQ(most_diffuse_over_global(0.5), 1.05);
  EXPECT_EQ(most_diffuse_over_global(0.2), 1.10);
}

// A record with a week's fault laid over it, and the notes that it leaves.
using Fault = std::string (*)(const std::string& stamp, const std::string& values);
std::vector<std::string> notes_with(Fault fault, const std::string& columns = "g") {
  const LightSeries truth = cloudy_truth(place_at(52.0, 15.0), 2025, "+01:00");
  const std::string text = logged(truth, {.columns = columns});
  std::string changed;
  for (std::size_t begin = 0; begin < text.size();) {
    const std::size_t end = text.find('\n', begin);
    const std::string row = text.substr(begin, end - begin);
    const std::string stamp = row.substr(0, row.find(','));
    const bool hit = stamp > "2025-06-10T00" && stamp < "2025-06-12T00";
    changed += (hit ? stamp + fault(stamp, row.substr(row.find(','))) : row) + '\n';
    begin = end + 1;
  }
  const TextFile file(changed);
  const LightSeries series = light_of(source_of(file, {.columns = columns}), truth.place, 2025, "+01:00");
  expect_sound(series);
  const MonthlyLight found = monthly_dli(series);
  // Two days of thirty are filled from their neighbours: June differs by a part of their weight.
  EXPECT_NEAR(found.total(5), monthly_dli(truth).total(5), 0.06 * found.total(5));
  return series.notes;
}

TEST(Quality, IsQuietAboutGoodRecords) {
  const auto notes = notes_with([](const std::string&, const std::string& values) { return values; }, "gdb");
  EXPECT_THAT(notes, Not(Contains(HasSubstr("rejected"))));
  EXPECT_THAT(notes, Not(Contains(HasSubstr("missing daylight"))));
}

TEST(Quality, RejectsTheImpossible) {
  const auto notes =
      notes_with([](const std::string&, const std::string&) -> std::string { return ",2500"; });
  EXPECT_THAT(notes, Contains(HasSubstr("beyond what is physically possible")));
  EXPECT_THAT(notes, Contains(HasSubstr("2025: June")));
}

// One hour of a fair day that reads 1.3 times the sun above the air lies below what is physically
// possible, 1.5 times and more, and half as far again from its neighbours as light moves.
TEST(Quality, RejectsASpike) {
  const auto notes = notes_with([](const std::string& stamp, const std::string& values) -> std::string {
    const double noon_w = 1320.0 * std::sin((90.0 - 52.0 + 23.0) * 3.14159265 / 180.0);
    return stamp == "2025-06-10T12:00" ? "," + std::to_string(1.3 * noon_w) : values;
  });
  EXPECT_THAT(notes, Contains(HasSubstr("1 that jump away from both neighbours")));
  EXPECT_THAT(notes, Contains(HasSubstr("Journée and Bertrand 2011")));
  EXPECT_THAT(notes, Contains(HasSubstr("2025: June")));
}

// By hand: an interval's light over that above the air, 1000 W m-2 throughout.
TEST(Quality, TellsASpikeFromAStep) {
  const auto spikes = [](std::vector<float> values, std::chrono::seconds step = std::chrono::seconds{600}) {
    Readings readings;
    readings.step = step;
    for (std::size_t i = 0; i < values.size(); ++i)
      readings.begin_s.push_back(std::int64_t(i) * step.count());
    std::vector<IntervalSun> suns(values.size(), IntervalSun{0.73F, 1000.0F, 0.73F});
    readings.value[kGlobal] = std::move(values);
    return judge(readings, suns, 1.0).spikes;
  };
  EXPECT_EQ(spikes({200, 960, 200}), 1);
  EXPECT_EQ(spikes({960, 200, 960}), 1);
  EXPECT_EQ(spikes({200, 940, 200}), 0);
  EXPECT_EQ(spikes({200, 200, 960, 960}), 0);                       // a cloud leaves
  EXPECT_EQ(spikes({200, 960, 200}, std::chrono::seconds{60}), 0);  // minutes move farther
  EXPECT_EQ(spikes({960, 200}), 0);
}

TEST(Quality, RejectsASensorThatStandsStill) {
  const auto notes = notes_with([](const std::string& stamp, const std::string& values) -> std::string {
    return stamp.substr(11) > "08" && stamp.substr(11) < "18" ? ",431.7" : values;
  });
  EXPECT_THAT(notes, Contains(HasSubstr("20 from a sensor that stood still")));
}

TEST(Quality, RejectsDarkDays) {
  const auto notes = notes_with([](const std::string&, const std::string&) -> std::string { return ",0"; });
  EXPECT_THAT(notes, Contains(HasSubstr("dark by day")));
}

TEST(Quality, RejectsPartsThatDoNotSum) {
  const auto notes = notes_with(
      [](const std::string&, const std::string& values) -> std::string {
        double global = 0.0, diffuse = 0.0, beam = 0.0;
        std::sscanf(values.c_str(), ",%lf,%lf,%lf", &global, &diffuse, &beam);
        return "," + std::to_string(1.3 * global) + "," + std::to_string(diffuse) + "," +
               std::to_string(beam);
      },
      "gdb");
  EXPECT_THAT(notes, Contains(HasSubstr("whose parts do not sum to the whole")));
}

TEST(Quality, CountsEmptyValuesAndSentinelsAsMissing) {
  for (Fault fault : {+[](const std::string&, const std::string&) -> std::string { return ","; },
                      +[](const std::string&, const std::string&) -> std::string { return ",NaN"; },
                      +[](const std::string&, const std::string&) -> std::string { return ",-9999"; }}) {
    EXPECT_THAT(notes_with(fault), Contains(HasSubstr("2025: June 6.7 %")));
  }
}

// The inverse of the relations by which photons are made from radiation.
TEST(Quantum, IsTheInverseOfPhotons) {
  for (double global_w = 1.0; global_w < 1100.0; global_w *= 1.3) {
    for (const double elevation_deg : {2.0, 15.0, 40.0, 80.0}) {
      const Angle elevation = Angle::degrees(elevation_deg);
      const double above_air_w = 1361.0 * sin(elevation);
      const PhotonSplit split = photons(0.6 * global_w, 0.4 * global_w, above_air_w, elevation);
      EXPECT_NEAR(global_of_photons_w(split.beam_umol + split.sky_umol, above_air_w, elevation), global_w,
                  1e-6 * global_w);
      EXPECT_NEAR(diffuse_part_of_radiation(split.sky_umol / (split.beam_umol + split.sky_umol)), 0.4, 1e-9);
    }
  }
  EXPECT_EQ(diffuse_part_of_radiation(0.0), 0.0);
  EXPECT_NEAR(diffuse_part_of_radiation(1.0), 1.0, 1e-9);
}

}  // namespace
}  // namespace sunfall

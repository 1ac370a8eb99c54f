// Light tables of the dome: nothing lost, nothing made, and the same whichever way north is.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numbers>

#include "light/series_checks.h"
#include "sunfall/dome.h"

namespace sunfall {
namespace {

const Dome kDomes[] = {Dome::of(DomeQuality::draft), Dome::of(DomeQuality::standard),
                       Dome::of(DomeQuality::fine)};

struct Means {
  std::array<double, 12> beam{};
  std::array<double, 12> sky{};
};

// The series' own mean days, mol m-2 d-1.
Means means_of(const LightSeries& series) {
  Means means;
  const auto days = days_of_months(series);
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const int month = month_of_step(series, i);
    means.beam[month] += double(series.steps[i].beam_umol) * 600e-6 / days[month];
    means.sky[month] += double(series.steps[i].sky_umol) * 600e-6 / days[month];
  }
  return means;
}

void expect_open_is_the_series(const LightSeries& series, const Dome& dome, SkyModel sky) {
  const DomeLight light = make_dome_light(series, dome, sky, month_periods());
  const Means means = means_of(series);
  for (int month = 0; month < 12; ++month) {
    EXPECT_NEAR(light.beam.open[month], means.beam[month], 1e-6 * means.beam[month]) << month;
    EXPECT_NEAR(light.sky.open[month], means.sky[month], 1e-6 * means.sky[month]) << month;
    double beam = 0.0, sky_sum = 0.0;
    for (int line = 0; line < dome.lines(); ++line) {
      for (int step = 0; step < dome.steps(); ++step) {
        const std::size_t at = light.index(line, step, month);
        ASSERT_TRUE(light.beam.level[at] >= 0.0 && light.beam.facing[at] >= 0.0);
        ASSERT_TRUE(light.sky.level[at] >= 0.0 && light.sky.facing[at] >= 0.0);
        beam += light.beam.level[at];
        sky_sum += light.sky.level[at];
      }
    }
    EXPECT_NEAR(beam, light.beam.open[month], 1e-9 * means.beam[month]);
    EXPECT_NEAR(sky_sum, light.sky.open[month], 1e-9 * means.sky[month]);
  }
}

TEST(DomeLight, OpenIsTheSeriesAtEveryQuality) {
  const LightSeries series = light_of(ClearSource{}, place_at(52.0));
  for (const Dome& dome : kDomes) expect_open_is_the_series(series, dome, SkyModel::clearness);
}

TEST(DomeLight, OpenIsTheSeriesUnderEverySky) {
  const LightSeries series = light_of(ClearSource{}, place_at(52.0));
  for (const SkyModel sky : {SkyModel::isotropic, SkyModel::overcast}) {
    expect_open_is_the_series(series, kDomes[1], sky);
  }
}

TEST(DomeLight, OpenIsTheSeriesAtTheEquatorInTheSouthAndInALeapYear) {
  for (const double latitude_deg : {0.0, -34.0, 52.0, 90.0}) {
    SCOPED_TRACE(latitude_deg);
    expect_open_is_the_series(light_of(ClearSource{}, place_at(latitude_deg), 2024), kDomes[0],
                              SkyModel::clearness);
  }
}

TEST(DomeLight, PolarNightHasMonthsWithoutBeam) {
  const LightSeries series = light_of(ClearSource{}, place_at(74.0));
  expect_open_is_the_series(series, kDomes[1], SkyModel::clearness);
  const DomeLight light = make_dome_light(series, kDomes[1], SkyModel::clearness, month_periods());
  EXPECT_EQ(light.beam.open[11], 0.0);
  EXPECT_GT(light.beam.open[5], 10.0);
  expect_open_is_the_series(light_of(ClearSource{}, place_at(69.0)), kDomes[1], SkyModel::clearness);
}

// A plane that faces the light gets it by the cosine of elevation where the level gets the sine: at
// each step facing over level is the tangent of the zenith angle, for the sky exactly, for the beam
// within a step on either side.
TEST(DomeLight, FacingGoesWithTheZenithAngle) {
  const Dome& dome = kDomes[1];
  const DomeLight light =
      make_dome_light(light_of(ClearSource{}, place_at(52.0)), dome, SkyModel::clearness, month_periods());
  const auto ratio = [&](double step) {
    const double sine = std::clamp(step / dome.steps(), 0.25 / dome.steps(), 1.0);
    return std::sqrt(1.0 - sine * sine) / sine;
  };
  for (int line = 0; line < dome.lines(); line += 7) {
    for (int step = 0; step < dome.steps(); ++step) {
      const std::size_t at = light.index(line, step, 5);
      EXPECT_NEAR(light.sky.facing[at], light.sky.level[at] * ratio(step + 0.5), 1e-9);
      EXPECT_LE(light.beam.facing[at], light.beam.level[at] * ratio(step - 0.5) * (1 + 1e-9));
      EXPECT_GE(light.beam.facing[at], light.beam.level[at] * ratio(step + 1.5) * (1 - 1e-9));
    }
  }
}

// Where the light comes from on the whole: the sum of level light times the direction on the ground
// (east, north) and times the sine.
struct Resultant {
  double east = 0.0, north = 0.0, sine = 0.0;
  void add(double level, double azimuth, double elevation_sine) {
    east += level * std::sin(azimuth);
    north += level * std::cos(azimuth);
    sine += level * elevation_sine;
  }
};

// Bilinear sharing keeps the middle of the light: the resultant shrinks by the cosine of half a line at
// most (1 - 1e-4 at 216 lines), and only the lowest half step, held at its middle, moves up in sine.
TEST(DomeLight, BeamComesFromTheSun) {
  const LightSeries series = light_of(ClearSource{}, place_at(52.0));
  const Dome& dome = kDomes[1];
  const DomeLight light = make_dome_light(series, dome, SkyModel::isotropic, month_periods());
  const auto days = days_of_months(series);
  for (const int month : {0, 3, 6, 9}) {
    Resultant sun, table;
    for (std::size_t i = 0; i < series.steps.size(); ++i) {
      if (month_of_step(series, i) != month || series.steps[i].beam_umol <= 0.0F) continue;
      const SkyDirection &a = series.sun.edges[i], &b = series.sun.edges[i + 1];
      sun.add(double(series.steps[i].beam_umol) * 600e-6 / days[month],
              std::atan2(a.east + b.east, a.north + b.north), std::max(0.0, 0.5 * (a.up + b.up)));
    }
    for (int line = 0; line < dome.lines(); ++line) {
      for (int step = 0; step < dome.steps(); ++step) {
        table.add(light.beam.level[light.index(line, step, month)],
                  dome.line_azimuth(line).from_true_north.radians(), (step + 0.5) / dome.steps());
      }
    }
    const double open = light.beam.open[month];
    EXPECT_NEAR(table.east, sun.east, 5e-4 * open) << month;
    EXPECT_NEAR(table.north, sun.north, 5e-4 * open) << month;
    EXPECT_NEAR(table.sine, sun.sine, 5e-4 * open) << month;
  }
}

LightSeries turned(LightSeries series, Angle clockwise) {
  for (SkyDirection& d : series.sun.edges) {
    const double east = d.east * cos(clockwise) + d.north * sin(clockwise);
    d.north = d.north * cos(clockwise) - d.east * sin(clockwise);
    d.east = east;
  }
  return series;
}

std::vector<double> by_step(const DomeLight& light, const std::vector<double>& values, std::size_t period) {
  std::vector<double> sums(light.dome.steps(), 0.0);
  for (int line = 0; line < light.dome.lines(); ++line) {
    for (int step = 0; step < light.dome.steps(); ++step)
      sums[step] += values[light.index(line, step, period)];
  }
  return sums;
}

// With the whole sky turned, every ring of the dome holds the same light: the beam's to rounding, the
// sky's to what patches at other places of the same radiance differ by.
TEST(DomeLight, RingsDoNotDependOnNorth) {
  const LightSeries series = light_of(ClearSource{}, place_at(52.0));
  const Dome& dome = kDomes[1];
  const DomeLight still = make_dome_light(series, dome, SkyModel::clearness, month_periods());
  for (const double turn_deg : {5.0, 1.7, 33.3}) {
    const DomeLight other =
        make_dome_light(turned(series, Angle::degrees(turn_deg)), dome, SkyModel::clearness, month_periods());
    for (const std::size_t month : {std::size_t{0}, std::size_t{5}}) {
      const std::vector<double> beam = by_step(still, still.beam.level, month);
      const std::vector<double> beam_turned = by_step(other, other.beam.level, month);
      const std::vector<double> sky = by_step(still, still.sky.level, month);
      const std::vector<double> sky_turned = by_step(other, other.sky.level, month);
      for (int step = 0; step < dome.steps(); ++step) {
        EXPECT_NEAR(beam_turned[step], beam[step], 1e-9 * still.beam.open[month]) << turn_deg;
        EXPECT_NEAR(sky_turned[step], sky[step], 1e-4 * still.sky.open[month]) << turn_deg;
      }
    }
  }
}

// Turned by whole lines the tables are the same ones, shifted.
TEST(DomeLight, TurnedByASectorTheTablesShift) {
  const LightSeries series = light_of(ClearSource{}, place_at(52.0));
  const Dome& dome = kDomes[0];
  const DomeLight still = make_dome_light(series, dome, SkyModel::clearness, month_periods());
  const DomeLight other = make_dome_light(turned(series, Angle::degrees(360.0 / dome.sectors)), dome,
                                          SkyModel::clearness, month_periods());
  for (int line = 0; line < dome.lines(); ++line) {
    const int to = (line + dome.lines_per_sector) % dome.lines();
    for (int step = 0; step < dome.steps(); ++step) {
      const std::size_t from_at = still.index(line, step, 5), to_at = still.index(to, step, 5);
      EXPECT_NEAR(other.beam.level[to_at], still.beam.level[from_at], 1e-9 * still.beam.open[5]);
      // Radiances are floats: 1e-6 of a patch.
      EXPECT_NEAR(other.sky.level[to_at], still.sky.level[from_at], 1e-7 * still.sky.open[5]);
    }
  }
}

// East's morning is west's afternoon at the solstice, when the day is the same before and after noon.
TEST(DomeLight, MorningsMirrorAfternoons) {
  const Dome& dome = kDomes[0];
  const DomeLight light = make_dome_light(light_of(ClearSource{}, place_at(45.0, 0.0)), dome,
                                          SkyModel::clearness, month_periods());
  double east = 0.0, west = 0.0;
  for (int line = 0; line < dome.lines(); ++line) {
    for (int step = 0; step < dome.steps(); ++step) {
      (line < dome.lines() / 2 ? east : west) += light.beam.level[light.index(line, step, 5)];
    }
  }
  // The declination's change over a day is below 0.01 degrees there.
  EXPECT_NEAR(east, west, 1e-3 * (east + west));
}

}  // namespace
}  // namespace sunfall

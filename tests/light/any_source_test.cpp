// What holds for the light of any source, whatever it is made of: finite, never negative, dark by night, its
// photons those of its energy, no day brighter than its ceiling, and the days' sums those of the source.

#include <gtest/gtest.h>

#include <random>

#include "light/day_file.h"

namespace sunfall {
namespace {

class AnySource : public testing::TestWithParam<unsigned> {
 protected:
  AnySource() : random_(GetParam()) {
    const int hour = static_cast<int>(uniform(-11.0, 12.0));
    char text[8];
    std::snprintf(text, sizeof text, "%+03d:00", hour);
    clock_ = text;
    place_ = place_at(uniform(-72.0, 72.0), 15.0 * hour + uniform(-7.0, 7.0), uniform(0.0, 3000.0));
    sun_ = light_of(ClearSource{}, place_, 2024, clock_);
    above_air_mj_ = day_above_air_mj(sun_);
    for (std::size_t day = 0; day < above_air_mj_.size(); ++day) clearness_.push_back(uniform(0.03, 0.74));
  }

  double uniform(double least, double most) {
    return least + (most - least) * static_cast<double>(random_()) / 4294967296.0;
  }
  LightSeries light(const LightSource& source) { return light_of(source, place_, 2024, clock_); }

  // Sums of days that the clearness brings, MJ m-2.
  std::vector<double> given_mj() const {
    std::vector<double> sums;
    for (std::size_t day = 0; day < clearness_.size(); ++day)
      sums.push_back(clearness_[day] * above_air_mj_[day]);
    return sums;
  }

  // Hours whose clearness scatters below that of their day, with 30 to 100 % of sky all through a day: steps
  // from hour to hour stay below those of spikes (0.35 of the light above the air for the sky), so that none
  // is rejected.
  struct Hours {
    std::vector<double> global, diffuse;
    std::vector<double> day_mj;
  };
  Hours hours() {
    Hours hours;
    double part = 1.0;
    hours.day_mj.assign(clearness_.size(), 0.0);
    for (std::size_t hour = 0; hour < 24 * clearness_.size(); ++hour) {
      double above_air = 0.0;
      if (hour % 24 == 0) part = uniform(0.3, 1.0);
      for (std::size_t i = 6 * hour; i < 6 * hour + 6; ++i)
        above_air += extraterrestrial_level_w_m2(sun_, i) / 6.0;
      hours.global.push_back(above_air * clearness_[hour / 24] * uniform(0.6, 1.0));
      hours.diffuse.push_back(hours.global.back() * part);
      hours.day_mj[hour / 24] += hours.global.back() * 3600e-6;
    }
    return hours;
  }

  // `most` is what of the light above the air a day can hold.
  void expect_holds(const LightSeries& series, double most) {
    expect_sound(series);
    const std::vector<double> days = day_global_mj(series);
    const std::vector<double> above = day_above_air_mj(series);
    // Floats keep 6e-8 of each of 144 steps.
    for (std::size_t day = 0; day < days.size(); ++day)
      ASSERT_LE(days[day], most * above[day] * (1.0 + 1e-5)) << day;
    for (const LightStep& step : series.steps) {
      const double energy_w = global_w(step);
      if (energy_w <= 0.0) continue;
      // Photons per joule of global lie between those of clear and of overcast skies (Jacovides and others
      // 2007).
      ASSERT_GE(global_umol(step), 1.971 * energy_w * (1.0 - 1e-5) - 1e-30);
      ASSERT_LE(global_umol(step), 2.099 * energy_w * (1.0 + 1e-5));
    }
  }
  // Files hold nine digits, floats 6e-8 of each step.
  static void expect_days(const LightSeries& series, const std::vector<double>& given) {
    const std::vector<double> found = day_global_mj(series);
    ASSERT_EQ(found.size(), given.size());
    for (std::size_t day = 0; day < given.size(); ++day)
      ASSERT_NEAR(found[day], given[day], 1e-5 * given[day] + 1e-6) << day;
  }

  std::mt19937 random_;
  std::string clock_;
  Place place_;
  LightSeries sun_;
  std::vector<double> above_air_mj_;
  std::vector<double> clearness_;
};

TEST_P(AnySource, HoursOfAStation) {
  const Hours record = hours();
  std::string text = "time,g,d\n";
  const std::chrono::sys_seconds midnight =
      std::chrono::sys_days{std::chrono::year{2024} / std::chrono::January / 1};
  for (std::size_t hour = 0; hour < record.global.size(); ++hour) {
    text += stamp_text(midnight + std::chrono::hours{hour}) + "," + number_text(record.global[hour]) + "," +
            number_text(record.diffuse[hour]) + "\n";
  }
  const TextFile file(text);
  SeriesSource source;
  source.file = file.path();
  source.global = "g";
  source.stamp = SeriesSource::Stamp::begin;
  for (const char* diffuse : {"", "d"}) {
    for (const auto split : {SeriesSource::Split::logistic, SeriesSource::Split::erbs}) {
      source.diffuse = diffuse;
      source.split = split;
      const LightSeries series = light(source);
      expect_holds(series, 0.74);
      expect_days(series, record.day_mj);
    }
  }
}

TEST_P(AnySource, HoursOfAGrid) {
  const Hours record = hours();
  PointRecord point;
  point.points = "a point";
  for (std::size_t hour = 0; hour < record.global.size(); ++hour) {
    point.time_s.push_back(sun_.sun.begin.time_since_epoch().count() +
                           3600 * static_cast<std::int64_t>(hour + 1));
    point.quantities[0].value.push_back(record.global[hour] * 3600.0);
    point.quantities[2].value.push_back((record.global[hour] - record.diffuse[hour]) * 3600.0);
  }
  point.quantities[0].unit = point.quantities[2].unit = "J m-2";
  GridSource source;
  source.file = "weather.nc";
  source.global = "ssrd";
  LightOptions options;
  options.read_point = [&point](const GridSource&, const Place&) { return point; };
  for (const char* beam : {"", "fdir"}) {
    source.beam = beam;
    source.beam_plane = GridSource::BeamPlane::level;
    const LightSeries series =
        make_light(source, place_, Clock::parse(clock_, "test"), options, "farm.toml:5 light");
    expect_holds(series, 0.74);
    expect_days(series, record.day_mj);
  }
}

TEST_P(AnySource, DaysOfAStation) {
  const std::vector<double> given = given_mj();
  const TextFile file(
      day_text("g", 2024, 366, [&](int day) { return number_text(given[std::size_t(day)]); }));
  SeriesSource source = days_of(file);
  for (const DaySplit split : {DaySplit::erbs, DaySplit::collares_pereira}) {
    source.day_split = split;
    const LightSeries series = light(source);
    expect_holds(series, 0.74);
    expect_days(series, given);
  }
}

TEST_P(AnySource, SunshineAndTemperature) {
  const TextFile sunshine(day_text("sunshine_hours", 2024, 366, [&](int day) {
    // At most nine tenths of the shortest that the day can be: dark days have none.
    const double lit = static_cast<double>(std::count_if(sun_.sun.mean_sine.begin() + day * 144,
                                                         sun_.sun.mean_sine.begin() + (day + 1) * 144,
                                                         [](float sine) { return sine > 0.0F; }));
    return number_text(0.9 * lit / 6.0 * uniform(0.0, 1.0));
  }));
  SunshineSource hours;
  hours.file = sunshine.path();
  // FAO-56 eq. 35: a day full of sun brings a_s + b_s = 0.75.
  expect_holds(light(hours), 0.75);

  const TextFile temperature(day_text("t_min,t_max", 2024, 366, [&](int) {
    const double low = uniform(-20.0, 20.0);
    return number_text(low) + "," + number_text(low + uniform(0.5, 30.0));
  }));
  TemperatureSource range;
  range.file = temperature.path();
  // FAO-56 eq. 37, the cloudless day.
  expect_holds(light(range), 0.75 + 2e-5 * place_.height_m);
}

TEST_P(AnySource, MonthlyMeans) {
  MonthlyGlobalSource source;
  const std::array<double, 12> above =
      monthly_mean_mj_m2_d(sun_, [&](std::size_t i) { return extraterrestrial_level_w_m2(sun_, i); });
  for (std::size_t month = 0; month < 12; ++month)
    source.global_mj_m2_d[month] = uniform(0.1, 0.74) * above[month];
  for (const auto days : {MonthlyGlobalSource::Days::mean, MonthlyGlobalSource::Days::varied}) {
    source.days = days;
    source.seed = static_cast<int>(GetParam());
    const LightSeries series = light(source);
    // Made days may be as clear as the air above them.
    expect_holds(series, days == MonthlyGlobalSource::Days::mean ? 0.74 : 1.0);
    const auto found = monthly_global_mj_m2_d(series);
    for (std::size_t month = 0; month < 12; ++month)
      EXPECT_NEAR(found[month], source.global_mj_m2_d[month], 1e-5 * above[month]);
  }
}

INSTANTIATE_TEST_SUITE_P(RandomPlaces, AnySource, testing::Range(1U, 9U));

}  // namespace
}  // namespace sunfall

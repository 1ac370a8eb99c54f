// What a daily record is refused for, and what each refusal says.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "light/day_file.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using testing::AllOf;
using testing::Contains;
using testing::HasSubstr;
using Unit = SeriesSource::Unit;

const Place kPlace = place_at(52.0);

std::string refusal(const LightSource& source, ErrorKind kind = ErrorKind::data) {
  try {
    light_of(source, kPlace);
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), kind);
    return error.what();
  }
  return "accepted";
}

const std::vector<double>& above() {
  static const std::vector<double> sums = day_above_air_mj(light_of(ClearSource{}, kPlace));
  return sums;
}

double global_of(int day) {
  return (0.1 + 0.6 * std::fmod(0.381966 * (day + 1), 1.0)) * above()[static_cast<std::size_t>(day)];
}
std::string global_text(int day) { return number_text(global_of(day)); }
double sunshine_of(int day) { return 6.0 * std::fmod(0.381966 * (day + 1), 1.0); }

std::string of_radiation(const std::string& text, Unit unit = Unit::mj_m2) {
  const TextFile file(text);
  return refusal(days_of(file, unit));
}
std::string of_sunshine(const std::string& text) {
  const TextFile file(text);
  SunshineSource source;
  source.file = file.path();
  return refusal(source);
}
std::string of_temperature(const std::string& text) {
  const TextFile file(text);
  TemperatureSource source;
  source.file = file.path();
  return refusal(source);
}

std::string with(std::string text, const std::string& old, const std::string& other) {
  const std::size_t at = text.find(old);
  EXPECT_NE(at, std::string::npos) << old;
  return text.replace(at, text.find('\n', at) - at, other);
}

TEST(DayRefusals, NameDatesThatCannotBe) {
  const std::string good = day_text("g", 2025, 365, global_text);
  EXPECT_EQ(of_radiation(good), "accepted");
  EXPECT_THAT(of_radiation(with(good, "2025-03-01,", "2025-02-29,5")),
              AllOf(HasSubstr(".csv:61"), HasSubstr("the date cannot be read"), HasSubstr("2025-02-29")));
  EXPECT_THAT(of_radiation(with(good, "2025-03-01,", "01/03/2025,5")),
              HasSubstr("Write ISO 8601, 2025-06-01"));
  EXPECT_THAT(of_radiation(with(good, "2025-03-01,", "2025-03-01T12:00,5")),
              HasSubstr("the stamp of a day must be its date alone"));
  EXPECT_THAT(of_radiation(with(good, "2025-03-01,", "2025-03-01T00:00Z,5")),
              HasSubstr("the stamp of a day must be its date alone"));
  EXPECT_THAT(of_radiation(with(good, "2025-03-01,", "2025-02-27,5")), HasSubstr("the dates go backward"));
  EXPECT_THAT(of_radiation(with(good, "2025-03-01,", "2025-02-28,5")),
              HasSubstr("the same day comes twice with different values"));
  EXPECT_THAT(of_radiation(with(good, "2025-03-01,", "2025-03-01,x")), HasSubstr("a value is not a number"));
  EXPECT_THAT(of_radiation("date,g\n"), HasSubstr("the file holds no record"));
}

TEST(DayRefusals, TakeARepeatedLineAndMidnights) {
  std::string text = day_text("g", 2025, 365, global_text);
  const std::size_t at = text.find("2025-03-01");
  text.insert(at, text.substr(at, text.find('\n', at) + 1 - at));
  EXPECT_EQ(of_radiation(text), "accepted");
  const TextFile file(text);
  EXPECT_THAT(light_of(days_of(file), kPlace).notes,
              Contains(HasSubstr("one line was left out that repeated the one before")));
  const std::string midnights = day_text("g", 2025, 365, [](int day) { return global_text(day); });
  std::string stamped;
  for (const char letter : midnights) {
    if (letter == ',' && stamped.size() > 10) stamped += "T00:00:00";
    stamped += letter;
  }
  EXPECT_EQ(of_radiation(stamped), "accepted");
}

TEST(DayRefusals, NameRecordsOfOtherSteps) {
  std::string months = "date,g\n";
  for (int month = 1; month <= 12; ++month)
    months += "2025-" + std::string(month < 10 ? "0" : "") + std::to_string(month) + "-01,5\n";
  EXPECT_THAT(of_radiation(months), AllOf(HasSubstr("not one of days"), HasSubstr("monthly_global")));
  std::string mistyped = day_text("g", 2025, 60, global_text);
  mistyped += "2052-03-02,5\n";
  EXPECT_THAT(of_radiation(mistyped), HasSubstr("Is a year mistyped?"));
  // A daily record given as one of hours is sent here.
  const TextFile file(day_text("g", 2025, 365, global_text));
  SeriesSource source = days_of(file);
  source.stamp = SeriesSource::Stamp::end;
  EXPECT_THAT(refusal(source), HasSubstr("stamp = \"day\""));
  source.unit = Unit::mj_m2_d;
  EXPECT_THAT(refusal(source, ErrorKind::plan), HasSubstr("a unit per day is for a daily record"));
}

TEST(DayRefusals, NameTheUnitThatTheValuesFit) {
  const auto in = [](double per_mj) {
    return day_text("g", 2025, 365, [&](int day) { return number_text(per_mj * global_of(day)); });
  };
  EXPECT_THAT(of_radiation(in(1e6 / 86400.0)),
              AllOf(HasSubstr("do not fit the unit MJ m-2"), HasSubstr("look like W m-2")));
  EXPECT_THAT(of_radiation(in(1.0 / 3.6)), HasSubstr("look like kWh m-2 d-1"));
  EXPECT_THAT(of_radiation(in(100.0)), HasSubstr("look like J cm-2 d-1"));
  EXPECT_THAT(of_radiation(in(1.0), Unit::w_m2), HasSubstr("look like MJ m-2 d-1"));
  EXPECT_THAT(of_radiation(in(1e6 / 86400.0), Unit::mol_m2_d), HasSubstr("do not fit the unit mol m-2 d-1"));
}

TEST(DayRefusals, WantWholeYears) {
  EXPECT_THAT(of_radiation(day_text("g", 2025, 240, global_text)),
              AllOf(HasSubstr("more than 10 % of a month's daylight is missing"),
                    HasSubstr("December 100.0 %"), HasSubstr("allow_gaps = true")));
  // Four days of April are more than a tenth, three are not.
  const auto without = [](int missing) {
    return day_text("g", 2025, 365, [&](int day) {
      return day >= 95 && day < 95 + 4 * missing && day % 4 == 3 ? std::string("NaN") : global_text(day);
    });
  };
  EXPECT_THAT(of_radiation(without(4)), HasSubstr("April 13."));
  EXPECT_EQ(of_radiation(without(3)), "accepted");
}

TEST(DayRefusals, CountDaysThatCannotBe) {
  const TextFile file(day_text("g", 2025, 365, [](int day) {
    if (day == 40) return std::string("-2");
    if (day == 80) return number_text(1.2 * above()[80]);
    if (day == 120) return std::string("0");
    if (day >= 200 && day < 203) return std::string("12.5");  // three days alike may be
    return global_text(day);
  }));
  EXPECT_THAT(
      light_of(days_of(file), kPlace).notes,
      Contains("of 365 days these were rejected: 2 negative or brighter than the sun above the air, 1 "
               "dark"));
  const TextFile stuck(day_text("g", 2025, 365, [](int day) {
    return day >= 58 && day < 63 ? std::string("9.5") : global_text(day);  // 28 February to 4 March
  }));
  SeriesSource source = days_of(stuck);
  source.allow_gaps = true;
  EXPECT_THAT(light_of(source, kPlace).notes,
              Contains(HasSubstr("5 in runs of 5 or more with the same value")));
}

TEST(SunshineRefusals, NameImpossibleDays) {
  const auto text = [](double scale, int day, const std::string& value) {
    return day_text("sunshine_hours", 2025, 365,
                    [&](int i) { return i == day ? value : number_text(scale * sunshine_of(i)); });
  };
  EXPECT_EQ(of_sunshine(text(1.0, -1, "")), "accepted");
  EXPECT_THAT(of_sunshine(text(1.0, 10, "-0.1")),
              AllOf(HasSubstr(".csv:12"), HasSubstr("sunshine is negative")));
  // 17 June at 52 N: 16.7 h from rim to rim.
  EXPECT_EQ(of_sunshine(text(1.0, 167, "16.8")), "accepted");
  EXPECT_THAT(of_sunshine(text(1.0, 167, "17.2")),
              AllOf(HasSubstr(".csv:169"), HasSubstr("more sunshine than the day is long"),
                    HasSubstr("17.2 h of 16.7 h")));
  EXPECT_THAT(of_sunshine(text(10.0, -1, "")),
              AllOf(HasSubstr("not hours of sunshine"), HasSubstr("tenths of hours")));
  EXPECT_THAT(of_sunshine(text(60.0, -1, "")), HasSubstr("look like minutes"));
  EXPECT_THAT(of_sunshine(text(3600.0, -1, "")), HasSubstr("look like seconds"));
  EXPECT_THAT(of_sunshine(text(0.1, -1, "")), HasSubstr("parts of the day's length"));
  EXPECT_THAT(of_sunshine(text(1.0, 10, "7:30")), HasSubstr("a value is not a number"));
}

TEST(TemperatureRefusals, NameTurnedColumnsAndOtherUnits) {
  const auto text = [](double scale, double shift, int turned) {
    return day_text("t_min,t_max", 2025, 365, [&](int day) {
      const double low = 9.0 - 9.0 * std::cos(day / 58.0) - std::fmod(0.38 * day, 1.0);
      const double high = low + 4.0 + 8.0 * std::fmod(0.62 * day, 1.0);
      const double a = scale * low + shift, b = scale * high + shift;
      return day < turned ? number_text(b) + "," + number_text(a) : number_text(a) + "," + number_text(b);
    });
  };
  EXPECT_EQ(of_temperature(text(1.0, 0.0, 0)), "accepted");
  EXPECT_THAT(of_temperature(text(1.0, 0.0, 1)),
              AllOf(HasSubstr(".csv:2"), HasSubstr("below its lowest"), HasSubstr("Mend the values")));
  EXPECT_THAT(of_temperature(text(1.0, 0.0, 365)), HasSubstr("Exchange the columns"));
  EXPECT_THAT(of_temperature(text(1.8, 32.0, 0)), HasSubstr("degrees Fahrenheit"));
  EXPECT_THAT(of_temperature(text(1.0, 273.15, 0)), HasSubstr("kelvin"));
  EXPECT_THAT(of_temperature(text(10.0, 0.0, 0)), HasSubstr("tenths of a degree"));
}

}  // namespace
}  // namespace sunfall

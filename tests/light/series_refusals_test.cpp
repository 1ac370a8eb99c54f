// Every fault of a record has its message: what, where, found, remedy.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <functional>

#include "light/station.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using testing::Contains;
using testing::EndsWith;
using testing::HasSubstr;
using testing::Not;
using Stamp = SeriesSource::Stamp;
using Unit = SeriesSource::Unit;

const std::string kClock = "+01:00";

const LightSeries& truth() {
  static const LightSeries series = cloudy_truth(place_at(52.0, 15.0), 2025, kClock);
  return series;
}

using Change = std::function<void(SeriesSource&)>;

LightSeries light_of_text(const std::string& text, const LoggerFormat& format, const Change& change,
                          const std::string& clock = kClock) {
  const TextFile file(text);
  SeriesSource source = source_of(file, format);
  if (change) change(source);
  return light_of(source, truth().place, 2025, clock);
}

struct Refusal {
  ErrorKind kind = ErrorKind::internal;
  std::string what, where, found, remedy;
};
Refusal refusal_of(const std::string& text, const LoggerFormat& format = {.columns = "g"},
                   const Change& change = {}, const std::string& clock = kClock) {
  try {
    light_of_text(text, format, change, clock);
  } catch (const Error& error) {
    return {error.kind(), error.parts().what, error.parts().where, error.parts().found, error.parts().remedy};
  }
  ADD_FAILURE() << "accepted";
  return {};
}

// Lines of the year's record that `keep` wants; the first is the header.
std::string kept_lines(const std::string& text,
                       const std::function<bool(std::size_t, const std::string&)>& keep) {
  std::string kept;
  std::size_t begin = 0, line = 1;
  while (begin < text.size()) {
    const std::size_t end = text.find('\n', begin) + 1;
    const std::string row = text.substr(begin, end - begin);
    if (line == 1 || keep(line, row)) kept += row;
    begin = end;
    ++line;
  }
  return kept;
}

const std::string& hours() {
  static const std::string text = logged(truth(), {.columns = "g"});
  return text;
}

TEST(SeriesRefusals, ValuesAndStamps) {
  Refusal refusal = refusal_of("time,ghi\n2025-01-01T01:00,1\n2025-01-01T02:00,x\n");
  EXPECT_EQ(refusal.kind, ErrorKind::data);
  EXPECT_EQ(refusal.what, "a value is not a number");
  EXPECT_EQ(refusal.found, "\"x\"");
  EXPECT_THAT(refusal.where, EndsWith(".csv:3"));
  refusal = refusal_of("time;ghi\n2025-01-01T01:00;1,5\n");
  EXPECT_EQ(refusal.remedy, "give decimal = \",\" in the plan");
  refusal = refusal_of("time,ghi\n2025-01-01T01:00,1\n01/02/2025 01:00,1\n");
  EXPECT_EQ(refusal.what, "the time stamp cannot be read");
  EXPECT_THAT(refusal.where, EndsWith(".csv:3"));
  EXPECT_EQ(refusal_of("time,ghi\n").what, "the file holds no record");
  EXPECT_EQ(refusal_of("").what, "the file is empty");
  EXPECT_EQ(refusal_of("time,swdown\n2025-01-01T01:00,1\n").what, "the file has no column of that name");
}

TEST(SeriesRefusals, OrderAndSpacing) {
  Refusal refusal = refusal_of("time,ghi\n2025-01-01T01:00,1\n2025-01-01T02:00,2\n2025-01-01T02:00,3\n");
  EXPECT_EQ(refusal.what, "the same time comes twice with different values");
  EXPECT_THAT(refusal.where, EndsWith(".csv:4"));
  refusal = refusal_of("time,ghi\n2025-01-01T05:00,1\n2025-01-01T06:00,2\n2025-01-01T03:00,3\n");
  EXPECT_EQ(refusal.what, "the time stamps go backward");
  refusal = refusal_of(
      "time,ghi\n2025-01-01T05:00,1\n2025-01-01T06:00,2\n2025-01-01T07:00,3\n2025-01-01T07:25,3\n");
  EXPECT_EQ(refusal.what, "the times are not equally spaced");
  EXPECT_THAT(refusal.found, HasSubstr("1500 seconds"));
  refusal = refusal_of("time,ghi\n2025-01-01T00:00,1\n2025-01-02T00:00,2\n2025-01-03T00:00,3\n");
  EXPECT_EQ(refusal.what, "the record's step must be 1 to 60 whole minutes, or 2, 3, 4, 6, 8 or 12 hours");
}

TEST(SeriesRefusals, AMistypedYear) {
  const Refusal refusal =
      refusal_of("time,ghi\n1955-01-01T05:00,1\n1955-01-01T06:00,2\n2095-01-01T07:00,3\n");
  EXPECT_EQ(refusal.what, "the record is almost all gaps");
  EXPECT_EQ(refusal_of("time,ghi\n2025-01-01T05:00,1\n2025-01-01T06:00,1e300\n").what,
            "a value is beyond any unit");
  EXPECT_THAT(refusal_of("time,ghi\n2125-01-01T05:00,1\n2125-01-01T06:00,2\n").found, HasSubstr("2125"));
}

// The zone of Berlin goes forward on 30 March 2025 at 02:00 and back on 26 October at 03:00.
TEST(SeriesRefusals, DaylightSavingInTheStamps) {
  const std::string zone = "Europe/Berlin";
  const std::string spring =
      "time,ghi\n2025-03-30T00:00,0\n2025-03-30T01:00,0\n2025-03-30T02:00,0\n2025-03-30T04:00,0\n";
  EXPECT_EQ(refusal_of(spring, {.columns = "g"}, {}, zone).what,
            "the time stamps follow daylight saving time");
  const std::string autumn =
      "time,ghi\n2025-10-26T01:00,0\n2025-10-26T02:00,0\n2025-10-26T03:00,0\n2025-10-26T03:00,0\n";
  const Refusal refusal = refusal_of(autumn, {.columns = "g"}, {}, zone);
  EXPECT_EQ(refusal.what, "the time stamps follow daylight saving time");
  EXPECT_THAT(refusal.where, EndsWith(".csv:5"));
  EXPECT_THAT(refusal.found, HasSubstr("set back"));
  // With a fixed clock nothing is known of summers, and in other nights a repeated line is only that.
  EXPECT_NE(refusal_of(autumn).what, "the time stamps follow daylight saving time");
}

// A record whose logger keeps daylight saving time without leaving a trace in the stamps.
TEST(SeriesRefusals, DaylightSavingInTheLight) {
  LoggerFormat format{.columns = "g", .daylight_saving = true};
  std::string text = logged(truth(), format);
  std::string before;
  text = kept_lines(text, [&](std::size_t, const std::string& row) {  // drop the hour that comes twice
    const std::string stamp = row.substr(0, 16);
    const bool fresh = stamp > before;
    before = std::max(before, stamp);
    return fresh;
  });
  const Refusal refusal = refusal_of(text, format);
  EXPECT_THAT(refusal.what, HasSubstr("daylight saving time"));
  EXPECT_THAT(refusal.found, HasSubstr("April, May, June, July, August, September"));
  EXPECT_THAT(refusal.found, HasSubstr("after the sun"));
}

TEST(SeriesRefusals, AClockWrongByAnHourIsNamed) {
  for (const int error_min : {60, -60, 120, -300, 540}) {
    SCOPED_TRACE(error_min);
    const LoggerFormat format{.columns = "g", .clock_error_min = error_min};
    const Refusal refusal = refusal_of(logged(truth(), format), format);
    const int hours = std::abs(error_min) / 60;
    EXPECT_EQ(refusal.what, "the record's clock is wrong by about " + std::to_string(hours) +
                                (hours == 1 ? " hour" : " hours"));
    EXPECT_THAT(refusal.found, HasSubstr(error_min > 0 ? "after the sun" : "before the sun"));
    EXPECT_THAT(refusal.remedy, HasSubstr("trust_clock"));
  }
}

TEST(SeriesRefusals, SayWhatMayHaveShiftedTheClock) {
  const std::string ends = logged(truth(), {.stamp = Stamp::end, .columns = "g"});
  Refusal refusal = refusal_of(ends, {.stamp = Stamp::begin, .columns = "g"});
  EXPECT_THAT(refusal.remedy, HasSubstr("give stamp = \"end\""));
  const std::string begins = logged(truth(), {.stamp = Stamp::begin, .columns = "g"});
  refusal = refusal_of(begins, {.stamp = Stamp::end, .columns = "g"});
  EXPECT_THAT(refusal.remedy, HasSubstr("give stamp = \"begin\""));
  EXPECT_THAT(refusal.remedy, HasSubstr("utc = true"));  // the same hour at this place
  refusal = refusal_of(ends, {.columns = "g"}, [](SeriesSource& source) { source.utc = true; });
  EXPECT_THAT(refusal.remedy, HasSubstr("remove utc = true"));
  EXPECT_THAT(refusal.remedy, Not(HasSubstr("stamp =")));
}

TEST(SeriesRefusals, TheClockMayBeTrusted) {
  const LoggerFormat format{.columns = "g", .clock_error_min = 60};
  const LightSeries series =
      light_of_text(logged(truth(), format), format, [](SeriesSource& source) { source.trust_clock = true; });
  EXPECT_THAT(series.notes, Contains(HasSubstr("minutes after the sun")));
  EXPECT_THAT(light_of_text(hours(), {.columns = "g"}, {}).notes, Not(Contains(HasSubstr("the sun"))));
}

// The factors between units are those of SI; daylight has about 110 lux per W m-2.
TEST(SeriesRefusals, NameTheUnitOfTheValues) {
  const auto remedy = [](double scale, Unit claimed) {
    const LoggerFormat format{.columns = "g", .scale = scale};
    const Refusal refusal =
        refusal_of(logged(truth(), format), format, [&](SeriesSource& source) { source.unit = claimed; });
    EXPECT_THAT(refusal.what, HasSubstr("the values do not fit the unit"));
    return refusal.remedy;
  };
  EXPECT_THAT(remedy(110.0, Unit::w_m2), HasSubstr("look like lux"));
  EXPECT_THAT(remedy(0.11, Unit::w_m2), HasSubstr("look like klux"));
  EXPECT_EQ(remedy(3600.0, Unit::w_m2), "the values look like J m-2 per step");
  EXPECT_EQ(remedy(3.6, Unit::w_m2), "the values look like kJ m-2 per step");
  EXPECT_EQ(remedy(0.36, Unit::w_m2), "the values look like J cm-2 per step");
  EXPECT_EQ(remedy(0.0036, Unit::w_m2), "the values look like MJ m-2 per step");
  EXPECT_EQ(remedy(0.001, Unit::w_m2), "the values look like kWh m-2 per step");
  EXPECT_EQ(remedy(2.0, Unit::w_m2), "the values look like µmol m-2 s-1");
  EXPECT_EQ(remedy(1.0, Unit::j_m2), "the values look like W m-2");
  EXPECT_EQ(remedy(1.0, Unit::mj_m2), "the values look like W m-2");
  EXPECT_EQ(remedy(0.0036, Unit::kwh_m2), "the values look like MJ m-2 per step");
}

TEST(SeriesRefusals, LightAtNight) {
  std::string text = kept_lines(hours(), [](std::size_t, const std::string&) { return true; });
  std::string lit;
  kept_lines(text, [&](std::size_t, const std::string& row) {
    lit += row.substr(row.find(',')) == ",0\n" ? row.substr(0, row.find(',')) + ",80\n" : row;
    return true;
  });
  const Refusal refusal = refusal_of("time,ghi\n" + lit);
  EXPECT_EQ(refusal.what, "there is light while the sun is down");
}

TEST(SeriesRefusals, MissingMonthsAreCounted) {
  // Twelve days of June's thirty are missing, the shorter ones.
  const auto without_june = [](std::size_t, const std::string& row) {
    return !(row >= "2025-06-01T01" && row < "2025-06-13T01");
  };
  const std::string text = kept_lines(hours(), without_june);
  const Refusal refusal = refusal_of(text);
  EXPECT_EQ(refusal.what, "more than 10 % of a month's daylight is missing");
  EXPECT_THAT(refusal.found, HasSubstr("2025: June 39."));
  const LightSeries series =
      light_of_text(text, {.columns = "g"}, [](SeriesSource& source) { source.allow_gaps = true; });
  EXPECT_THAT(series.notes, Contains(HasSubstr("2025: June 39.")));
  expect_sound(series);
}

TEST(SeriesRefusals, AYearCutShort) {
  const std::string text =
      kept_lines(hours(), [](std::size_t, const std::string& row) { return row < "2025-11-01T01"; });
  const Refusal refusal = refusal_of(text);
  EXPECT_EQ(refusal.found, "2025: November 100.0 %, December 100.0 %");
  EXPECT_THAT(refusal.remedy, HasSubstr("whole years"));
  const Refusal empty =
      refusal_of(text, {.columns = "g"}, [](SeriesSource& source) { source.allow_gaps = true; });
  EXPECT_THAT(empty.what, HasSubstr("gaps cannot be filled"));
}

TEST(SeriesRefusals, ColumnsThatDoNotMakeALight) {
  const LoggerFormat diffuse{.columns = "d"};
  EXPECT_EQ(refusal_of(logged(truth(), diffuse), diffuse).what, "global radiation is not given");
  EXPECT_EQ(refusal_of(logged(truth(), diffuse), diffuse).kind, ErrorKind::plan);
  const LoggerFormat both{.columns = "gb"};
  const Refusal refusal =
      refusal_of(logged(truth(), both), both, [](SeriesSource& source) { source.unit = Unit::umol_m2_s; });
  EXPECT_EQ(refusal.what, "photons are taken as global, with or without diffuse");
}

}  // namespace
}  // namespace sunfall

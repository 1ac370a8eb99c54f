#include "light/readings.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <map>
#include <optional>

#include "light/csv_file.h"
#include "light/csv_value.h"
#include "light/time_stamp.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr float kNone = std::numeric_limits<float>::quiet_NaN();
constexpr std::int64_t kHour_s = 3600;
constexpr double kLargest = 1e9;        // J m-2 of an hour are below 1e7
constexpr std::int64_t kMostGaps = 10;  // the record's length is at most so many times its readings

class ReadingsReader {
 public:
  ReadingsReader(const SeriesSource& source, const Clock& clock)
      : source_(source), clock_(clock), csv_(source.file, {source.delimiter, columns(source)}) {
    check_decimal(csv_, source.decimal, source.file.string());
    readings_.file = source.file.string();
  }

  Readings read() {
    long below_header = 0;
    while (csv_.next()) {
      const std::optional<TimeStamp> stamp = parse_time_stamp(csv_.field(0));
      if (stamp) {
        add(*stamp);
      } else if (readings_.size() > 0 || ++below_header > kMostLinesBelowHeader) {
        refuse("the time stamp cannot be read", shown_text(csv_.field(0)),
               "write ISO 8601, 2025-06-01T12:00 or 2025-06-01T12:00+01:00; dates alone are the stamps of a "
               "daily record, stamp = \"day\"");
      }
    }
    if (readings_.size() < 2) {
      throw Error(
          ErrorKind::data,
          {.what = "the file holds no record",
           .where = readings_.file,
           .found = fmt::format("{} lines with a time stamp", readings_.size()),
           .remedy = "write ISO 8601, 2025-06-01T12:00, in the column of time stamps; dates alone are "
                     "the stamps of a daily record, stamp = \"day\""});
    }
    finish(below_header);
    return std::move(readings_);
  }

 private:
  static std::vector<std::string> columns(const SeriesSource& source) {
    std::vector<std::string> names{source.time};
    for (const std::string& name : {source.global, source.diffuse, source.beam}) {
      if (!name.empty()) names.push_back(name);
    }
    return names;
  }

  [[noreturn]] void refuse(const std::string& what, const std::string& found,
                           const std::string& remedy) const {
    throw Error(ErrorKind::data, {what, csv_.where(), found, remedy});
  }
  [[noreturn]] void refuse_line(std::size_t i, const std::string& what, const std::string& found,
                                const std::string& remedy) const {
    throw Error(ErrorKind::data,
                {what, fmt::format("{}:{}", readings_.file, readings_.line[i]), found, remedy});
  }
  [[noreturn]] void refuse_daylight_saving(const std::string& where, const std::string& found) const {
    throw Error(ErrorKind::data, {"the time stamps follow daylight saving time", where, found,
                                  "write standard time all year, or UTC, or each stamp with its offset"});
  }

  std::int64_t utc_s(const TimeStamp& stamp) {
    const std::int64_t time_s = stamp.time.time_since_epoch().count();
    if (stamp.has_offset || source_.utc) return time_s;
    const std::chrono::year year =
        std::chrono::year_month_day{std::chrono::floor<std::chrono::days>(stamp.time)}.year();
    const auto [entry, is_new] = offsets_s_.try_emplace(int{year}, 0);
    if (is_new) entry->second = clock_.standard_offset(year).count();
    return time_s - entry->second;
  }

  // By how much the clock's own wall time changes around an instant.
  std::int64_t change_of_clock_s(std::int64_t from_s, std::int64_t to_s) const {
    const auto wall = [&](std::int64_t time_s) {
      return clock_.wall_offset(UtcTime{std::chrono::seconds{time_s}}).count();
    };
    return wall(to_s + 2 * kHour_s) - wall(from_s - 2 * kHour_s);
  }

  void add(const TimeStamp& stamp) {
    const std::int64_t time_s = utc_s(stamp);
    std::array<float, kQuantities> value{kNone, kNone, kNone};
    std::size_t column = 1;
    for (std::size_t q = 0; q < kQuantities; ++q) {
      if (is_column(q)) value[q] = number(csv_.field(column++));
    }
    if (readings_.size() > 0 && time_s <= readings_.begin_s.back()) {
      check_step_back(stamp, time_s);
      for (std::size_t q = 0; q < kQuantities; ++q) {
        const float before = is_column(q) ? readings_.value[q].back() : kNone;
        if (before == value[q] || (std::isnan(before) && std::isnan(value[q]))) continue;
        refuse("the same time comes twice with different values", shown_text(csv_.field(0)),
               "keep one of the lines");
      }
      ++repeated_;
      return;
    }
    wall_ = wall_ || !(stamp.has_offset || source_.utc);
    readings_.begin_s.push_back(time_s);
    readings_.line.push_back(static_cast<std::int32_t>(csv_.line()));
    for (std::size_t q = 0; q < kQuantities; ++q) {
      if (is_column(q)) readings_.value[q].push_back(value[q]);
    }
  }

  bool is_column(std::size_t quantity) const {
    return !(quantity == kGlobal    ? source_.global
             : quantity == kDiffuse ? source_.diffuse
                                    : source_.beam)
                .empty();
  }

  float number(std::string_view text) {
    if (is_missing(text)) return kNone;
    const std::optional<double> found = number_in(text, source_.decimal);
    if (!found) {
      refuse("a value is not a number", shown_text(text), number_remedy(text, source_.decimal));
    }
    const double value = *found;
    if (is_missing(value)) return kNone;
    if (std::abs(value) > kLargest) refuse("a value is beyond any unit", shown_text(text), "");
    return static_cast<float>(value);
  }

  void check_step_back(const TimeStamp& stamp, std::int64_t time_s) const {
    const std::int64_t back_s = readings_.begin_s.back() - time_s;
    if (!stamp.has_offset && !source_.utc && back_s <= kHour_s &&
        change_of_clock_s(time_s, readings_.begin_s.back()) < 0) {
      refuse_daylight_saving(csv_.where(), shown_text(csv_.field(0)) + ", where the clock is set back");
    }
    if (back_s > 0) {
      refuse("the time stamps go backward", shown_text(csv_.field(0)),
             "sort the lines by time; is the order of day and month the same everywhere?");
    }
  }

  // The most common distance, and every other one a multiple of it.
  void find_step() {
    std::map<std::int64_t, std::size_t> count;
    for (std::size_t i = 1; i < readings_.size(); ++i) {
      ++count[readings_.begin_s[i] - readings_.begin_s[i - 1]];
    }
    const auto most = std::max_element(count.begin(), count.end(),
                                       [](const auto& a, const auto& b) { return a.second < b.second; });
    const std::int64_t step_s = most->first;
    if (step_s < 60 || step_s > kHour_s || step_s % 60 != 0) {
      throw Error(ErrorKind::data,
                  {.what = "the record's step must be whole minutes, from 1 to 60",
                   .where = readings_.file,
                   .found = fmt::format("{} seconds between most lines", step_s),
                   .remedy = step_s == 86400 ? "is it a daily record? Then give stamp = \"day\""
                                             : "average it to 10 minutes or an hour"});
    }
    for (std::size_t i = 1; i < readings_.size(); ++i) {
      const std::int64_t gap_s = readings_.begin_s[i] - readings_.begin_s[i - 1];
      if (gap_s % step_s != 0) {
        refuse_line(i, "the time stamps are not equally spaced",
                    fmt::format("{} seconds after the line before, {} elsewhere", gap_s, step_s),
                    "bring the record to one step");
      }
      if (wall_ && gap_s == step_s + kHour_s &&
          change_of_clock_s(readings_.begin_s[i - 1], readings_.begin_s[i]) > 0) {
        refuse_daylight_saving(fmt::format("{}:{}", readings_.file, readings_.line[i]),
                               "an hour is left out where the clock is set forward");
      }
    }
    const std::int64_t length_s = readings_.begin_s.back() - readings_.begin_s.front();
    if (length_s / step_s > kMostGaps * static_cast<std::int64_t>(readings_.size())) {
      throw Error(ErrorKind::data,
                  {.what = "the record is almost all gaps",
                   .where = readings_.file,
                   .found = fmt::format("{} readings in {} days", readings_.size(), length_s / 86400),
                   .remedy = "is a year mistyped in one of the stamps?"});
    }
    readings_.step = std::chrono::seconds{step_s};
  }

  void finish(long below_header) {
    find_step();
    const std::int64_t step_s = readings_.step.count();
    const std::int64_t back_s = source_.stamp == SeriesSource::Stamp::begin    ? 0
                                : source_.stamp == SeriesSource::Stamp::middle ? step_s / 2
                                                                               : step_s;
    for (std::int64_t& begin_s : readings_.begin_s) begin_s -= back_s;
    note_lines_left_out(below_header, repeated_, readings_.notes);
  }

  const SeriesSource& source_;
  const Clock& clock_;
  CsvFile csv_;
  Readings readings_;
  std::map<int, std::int64_t> offsets_s_;
  long repeated_ = 0;
  bool wall_ = false;  // some stamps are the clock's own
};

}  // namespace

std::string quantities_text(const Readings& readings) {
  std::string text;
  const auto add = [&](std::size_t quantity, const char* name) {
    if (readings.has(quantity)) text += (text.empty() ? "" : ", ") + std::string(name);
  };
  add(kGlobal, "global");
  add(kDiffuse, "diffuse");
  add(kBeam, "beam");
  return text;
}

Readings read_readings(const SeriesSource& source, const Clock& clock) {
  return ReadingsReader(source, clock).read();
}

}  // namespace sunfall

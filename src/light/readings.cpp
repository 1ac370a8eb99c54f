#include "light/readings.h"

#include <fmt/format.h>

#include <map>
#include <optional>

#include "light/record_file.h"
#include "light/record_step.h"
#include "light/time_stamp.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr std::int64_t kHour_s = 3600;

class ReadingsReader {
 public:
  ReadingsReader(const SeriesSource& source, const Clock& clock)
      : source_(source), clock_(clock), file_(table_of(source), value_columns(source)) {
    readings_.file = source.file.string();
  }

  Readings read() {
    while (file_.next()) {
      const std::optional<TimeStamp> stamp = parse_time_stamp(file_.stamp());
      if (stamp) {
        add(*stamp);
      } else if (parse_date(file_.stamp())) {
        file_.refuse("the stamp is a date without a time", shown_text(file_.stamp()),
                     "for one line a day give stamp = \"day\", else write 2025-06-01T12:00");
      } else if (!file_.may_leave_out()) {
        file_.refuse("the time stamp cannot be read", shown_text(file_.stamp()),
                     "write ISO 8601, 2025-06-01T12:00 or 2025-06-01T12:00+01:00");
      }
    }
    if (readings_.size() < 2) {
      throw Error(ErrorKind::data,
                  {.what = "the file holds no record",
                   .where = readings_.file,
                   .found = fmt::format("{} lines with a time stamp", readings_.size()),
                   .remedy = "write ISO 8601, 2025-06-01T12:00, in the column of time stamps"});
    }
    finish();
    return std::move(readings_);
  }

 private:
  [[noreturn]] void refuse_daylight_saving(const std::string& where, const std::string& found) const {
    throw Error(ErrorKind::data, {"the time stamps follow daylight saving time", where, found,
                                  "write standard time all year, or UTC, or each stamp with its offset"});
  }

  std::string line_text(std::size_t i) const {
    return fmt::format("{}:{}", readings_.file, readings_.line[i]);
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
    const std::vector<double>& value = file_.values();
    if (readings_.size() > 0 && time_s <= readings_.begin_s.back()) {
      check_step_back(stamp, time_s);
      file_.leave_out_repeated("time");
      return;
    }
    file_.keep();
    wall_ = wall_ || !(stamp.has_offset || source_.utc);
    readings_.begin_s.push_back(time_s);
    readings_.line.push_back(static_cast<std::int32_t>(file_.line()));
    std::size_t column = 0;
    for (std::size_t q = 0; q < kQuantities; ++q) {
      if (!column_of(source_, q).empty()) readings_.value[q].push_back(static_cast<float>(value[column++]));
    }
  }

  void check_step_back(const TimeStamp& stamp, std::int64_t time_s) const {
    const std::int64_t back_s = readings_.begin_s.back() - time_s;
    if (!stamp.has_offset && !source_.utc && back_s <= kHour_s &&
        change_of_clock_s(time_s, readings_.begin_s.back()) < 0) {
      refuse_daylight_saving(file_.where(), shown_text(file_.stamp()) + ", where the clock is set back");
    }
    if (back_s > 0) {
      file_.refuse("the time stamps go backward", shown_text(file_.stamp()),
                   "sort the lines by time; is the order of day and month the same everywhere?");
    }
  }

  // An hour that is left out just where the clock is set forward tells what it is set to.
  void check_set_forward() const {
    const std::int64_t step_s = readings_.step.count();
    for (std::size_t i = 1; wall_ && i < readings_.size(); ++i) {
      const std::int64_t gap_s = readings_.begin_s[i] - readings_.begin_s[i - 1];
      if (gap_s == step_s + kHour_s &&
          change_of_clock_s(readings_.begin_s[i - 1], readings_.begin_s[i]) > 0) {
        refuse_daylight_saving(line_text(i), "an hour is left out where the clock is set forward");
      }
    }
  }

  void finish() {
    readings_.step =
        record_step(readings_.begin_s, readings_.file, [&](std::size_t i) { return line_text(i); });
    check_set_forward();
    const std::int64_t back_s = begin_before_stamp_s(source_.stamp, readings_.step);
    for (std::int64_t& begin_s : readings_.begin_s) begin_s -= back_s;
    readings_.station = file_.station();
    file_.note_left_out(readings_.notes);
  }

  const SeriesSource& source_;
  const Clock& clock_;
  RecordFile file_;
  Readings readings_;
  std::map<int, std::int64_t> offsets_s_;
  bool wall_ = false;  // some stamps are the clock's own
};

}  // namespace

std::vector<std::string> value_columns(const SeriesSource& source) {
  std::vector<std::string> names;
  for (std::size_t q = 0; q < kQuantities; ++q) {
    if (!column_of(source, q).empty()) names.push_back(column_of(source, q));
  }
  return names;
}

DaysFile table_of(const SeriesSource& source) {
  return {source.file, source.time, source.delimiter, source.decimal, source.latitude, source.longitude};
}

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

#include "light/day_record.h"

#include <fmt/format.h>

#include <algorithm>
#include <map>

#include "light/record_file.h"
#include "light/time_stamp.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr long kMostGaps = 10;  // the record's length is at most so many times its days

class DaysReader {
 public:
  DaysReader(const DaysFile& file, const std::vector<std::string>& columns) : file_(file, columns) {
    record_.file = file.file.string();
    record_.value.resize(columns.size());
  }

  DayRecord read() {
    while (file_.next()) {
      const std::string_view stamp = file_.stamp();
      if (const auto date = parse_date(stamp)) {
        add(*date);
      } else if (parse_time_stamp(stamp)) {
        file_.refuse("the stamp of a day must be its date alone, by the place's standard time",
                     shown_text(stamp),
                     "write 2025-06-01; a record of hours or minutes wants stamp = \"begin\" or \"end\"");
      } else if (!file_.may_leave_out()) {
        file_.refuse("the date cannot be read", shown_text(stamp), "write ISO 8601, 2025-06-01");
      }
    }
    if (record_.size() < 2) {
      throw Error(ErrorKind::data, {.what = "the file holds no record",
                                    .where = record_.file,
                                    .found = fmt::format("{} lines with a date", record_.size()),
                                    .remedy = "write ISO 8601, 2025-06-01, in the column of dates"});
    }
    check_step();
    record_.station = file_.station();
    file_.note_left_out(record_.notes);
    return std::move(record_);
  }

 private:
  void add(std::chrono::sys_days date) {
    const std::vector<double>& value = file_.values();
    if (record_.size() > 0 && date < record_.date.back()) {
      file_.refuse("the dates go backward", shown_text(file_.stamp()),
                   "sort the lines by date; is the order of day and month the same everywhere?");
    }
    if (record_.size() > 0 && date == record_.date.back()) {
      file_.leave_out_repeated("day");
      return;
    }
    file_.keep();
    record_.date.push_back(date);
    record_.line.push_back(static_cast<std::int32_t>(file_.line()));
    for (std::size_t c = 0; c < value.size(); ++c) record_.value[c].push_back(value[c]);
  }

  void check_step() const {
    std::map<long, std::size_t> count;
    for (std::size_t i = 1; i < record_.size(); ++i) {
      ++count[static_cast<long>((record_.date[i] - record_.date[i - 1]).count())];
    }
    const auto most = std::max_element(count.begin(), count.end(),
                                       [](const auto& a, const auto& b) { return a.second < b.second; });
    const auto length = static_cast<long>((record_.date.back() - record_.date.front()).count());
    if (most->first == 1 && length <= kMostGaps * static_cast<long>(record_.size())) return;
    throw Error(
        ErrorKind::data,
        {.what = "the record is not one of days",
         .where = record_.file,
         .found = fmt::format("{} lines in {} days, most of them {} day{} apart", record_.size(), length + 1,
                              most->first, most->first == 1 ? "" : "s"),
         .remedy = "give one line a day; monthly means belong in monthly_global. Is a year mistyped?"});
  }

  RecordFile file_;
  DayRecord record_;
};

}  // namespace

std::string DayRecord::where(std::size_t i) const { return fmt::format("{}:{}", file, line[i]); }

DayRecord read_days(const DaysFile& file, const std::vector<std::string>& columns, const Place& place) {
  DayRecord record = DaysReader(file, columns).read();
  check_station(record.station, file, place, record.notes);
  return record;
}

LightSeries open_years(const DayRecord& record, const LightRequest& request) {
  const auto year_of = [](std::chrono::sys_days date) { return std::chrono::year_month_day{date}.year(); };
  const std::chrono::year first = year_of(record.date.front());
  return open_series(request, first, int{year_of(record.date.back())} - int{first} + 1);
}

std::size_t day_of_series(const LightSeries& series, std::chrono::sys_days date) {
  return static_cast<std::size_t>(
      (date - std::chrono::sys_days{series.first_year / std::chrono::January / 1}).count());
}

}  // namespace sunfall

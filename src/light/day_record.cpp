#include "light/day_record.h"

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

constexpr double kNone = std::numeric_limits<double>::quiet_NaN();
constexpr long kMostGaps = 10;  // the record's length is at most so many times its days

class DaysReader {
 public:
  DaysReader(const DaysFile& file, const std::vector<std::string>& columns)
      : decimal_(file.decimal), csv_(file.file, {file.delimiter, all_columns(file, columns)}) {
    check_decimal(csv_, file.decimal, file.file.string());
    record_.file = file.file.string();
    record_.value.resize(columns.size());
  }

  DayRecord read() {
    long below_header = 0;
    while (csv_.next()) {
      const std::string_view stamp = csv_.field(0);
      if (const auto date = parse_date(stamp)) {
        add(*date);
      } else if (parse_time_stamp(stamp)) {
        refuse("the stamp of a day must be its date alone, by the place's standard time", shown_text(stamp),
               "write 2025-06-01; a record of hours or minutes wants stamp = \"begin\" or \"end\"");
      } else if (record_.size() > 0 || ++below_header > kMostLinesBelowHeader) {
        refuse("the date cannot be read", shown_text(stamp), "write ISO 8601, 2025-06-01");
      }
    }
    if (record_.size() < 2) {
      throw Error(ErrorKind::data, {.what = "the file holds no record",
                                    .where = record_.file,
                                    .found = fmt::format("{} lines with a date", record_.size()),
                                    .remedy = "write ISO 8601, 2025-06-01, in the column of dates"});
    }
    check_step();
    note_lines_left_out(below_header, repeated_, record_.notes);
    return std::move(record_);
  }

 private:
  static std::vector<std::string> all_columns(const DaysFile& file, const std::vector<std::string>& columns) {
    std::vector<std::string> all{file.time};
    all.insert(all.end(), columns.begin(), columns.end());
    return all;
  }

  [[noreturn]] void refuse(const std::string& what, const std::string& found,
                           const std::string& remedy) const {
    throw Error(ErrorKind::data, {what, csv_.where(), found, remedy});
  }

  double number(std::string_view text) const {
    if (is_missing(text)) return kNone;
    const std::optional<double> value = number_in(text, decimal_);
    if (!value) refuse("a value is not a number", shown_text(text), number_remedy(text, decimal_));
    return is_missing(*value) ? kNone : *value;
  }

  void add(std::chrono::sys_days date) {
    const std::size_t columns = record_.value.size();
    std::vector<double> value(columns);
    for (std::size_t c = 0; c < columns; ++c) value[c] = number(csv_.field(c + 1));
    if (record_.size() > 0 && date < record_.date.back()) {
      refuse("the dates go backward", shown_text(csv_.field(0)),
             "sort the lines by date; is the order of day and month the same everywhere?");
    }
    if (record_.size() > 0 && date == record_.date.back()) {
      check_repeated(value);
      ++repeated_;
      return;
    }
    record_.date.push_back(date);
    record_.line.push_back(static_cast<std::int32_t>(csv_.line()));
    for (std::size_t c = 0; c < columns; ++c) record_.value[c].push_back(value[c]);
  }

  void check_repeated(const std::vector<double>& value) const {
    for (std::size_t c = 0; c < value.size(); ++c) {
      const double before = record_.value[c].back();
      if (before == value[c] || (std::isnan(before) && std::isnan(value[c]))) continue;
      refuse("the same day comes twice with different values", shown_text(csv_.field(0)),
             "keep one of the lines");
    }
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

  char decimal_;
  CsvFile csv_;
  DayRecord record_;
  long repeated_ = 0;
};

}  // namespace

std::string DayRecord::where(std::size_t i) const { return fmt::format("{}:{}", file, line[i]); }

DayRecord read_days(const DaysFile& file, const std::vector<std::string>& columns) {
  return DaysReader(file, columns).read();
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

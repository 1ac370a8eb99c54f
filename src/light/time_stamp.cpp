#include "light/time_stamp.h"

namespace sunfall {
namespace {

// Reads along a text; every step fails for good once one has failed.
class Cursor {
 public:
  explicit Cursor(std::string_view text) : text_(text) {}

  bool good() const { return good_; }
  bool at_end() const { return at_ == text_.size(); }
  bool sees_digit() const { return !at_end() && text_[at_] >= '0' && text_[at_] <= '9'; }
  bool skip(char letter) {
    const bool there = !at_end() && text_[at_] == letter;
    at_ += there ? 1 : 0;
    return there;
  }
  void need(bool there) { good_ = good_ && there; }
  // A number of exactly so many digits from `least` to `most`.
  int number(int digits, int least, int most) {
    int value = 0;
    for (int i = 0; i < digits; ++i) {
      if (!sees_digit()) {
        good_ = false;
        return least;
      }
      value = 10 * value + (text_[at_++] - '0');
    }
    need(value >= least && value <= most);
    return value;
  }
  void skip_digits() {
    while (sees_digit()) ++at_;
  }

 private:
  std::string_view text_;
  std::size_t at_ = 0;
  bool good_ = true;
};

std::chrono::sys_days read_day(Cursor& cursor) {
  const int year = cursor.number(4, 1, 9999);
  const bool parted = cursor.skip('-');
  const int month = cursor.number(2, 1, 12);
  cursor.need(cursor.skip('-') == parted);
  const int day = cursor.number(2, 1, 31);
  const std::chrono::year_month_day date{std::chrono::year{year},
                                         std::chrono::month{static_cast<unsigned>(month)},
                                         std::chrono::day{static_cast<unsigned>(day)}};
  cursor.need(date.ok());
  return cursor.good() ? std::chrono::sys_days{date} : std::chrono::sys_days{};
}

std::chrono::seconds read_time_of_day(Cursor& cursor) {
  const int hour = cursor.number(2, 0, 24);
  const bool parted = cursor.skip(':');
  const int minute = cursor.number(2, 0, 59);
  int second = 0;
  if (parted ? cursor.skip(':') : cursor.sees_digit()) {
    second = cursor.number(2, 0, 59);
    if (cursor.skip('.') || cursor.skip(',')) {
      cursor.need(cursor.sees_digit());
      cursor.skip_digits();
    }
  }
  cursor.need(hour < 24 || (minute == 0 && second == 0));
  return std::chrono::hours{hour} + std::chrono::minutes{minute} + std::chrono::seconds{second};
}

std::chrono::seconds read_offset(Cursor& cursor, bool east) {
  const int hour = cursor.number(2, 0, 14);
  const bool parted = cursor.skip(':');
  const int minute = parted || cursor.sees_digit() ? cursor.number(2, 0, 59) : 0;
  const std::chrono::seconds offset = std::chrono::hours{hour} + std::chrono::minutes{minute};
  return east ? offset : -offset;
}

}  // namespace

std::optional<TimeStamp> parse_time_stamp(std::string_view text) {
  Cursor cursor(text);
  TimeStamp stamp;
  stamp.time = read_day(cursor);
  cursor.need(cursor.skip('T') || cursor.skip(' '));
  stamp.time += read_time_of_day(cursor);
  cursor.skip(' ');
  if (cursor.skip('Z')) {
    stamp.has_offset = true;
  } else if (const bool east = cursor.skip('+'); east || cursor.skip('-')) {
    stamp.has_offset = true;
    stamp.time -= read_offset(cursor, east);
  }
  if (!cursor.good() || !cursor.at_end()) return std::nullopt;
  return stamp;
}

std::optional<std::chrono::sys_days> parse_date(std::string_view text) {
  Cursor cursor(text);
  const std::chrono::sys_days day = read_day(cursor);
  if (cursor.good() && cursor.at_end()) return day;
  const auto stamp = parse_time_stamp(text);
  if (!stamp || stamp->has_offset || stamp->time != day) return std::nullopt;
  return day;
}

}  // namespace sunfall

#include "geo/cf_time.h"

#include <algorithm>
#include <cctype>
#include <charconv>
#include <chrono>
#include <cmath>

namespace sunfall {
namespace {

constexpr int kFirstGregorianYear = 1583;

std::string lower(std::string_view text) {
  std::string out(text);
  std::transform(out.begin(), out.end(), out.begin(), [](unsigned char c) { return std::tolower(c); });
  return out;
}

std::optional<double> unit_seconds(std::string_view name) {
  for (const char* known : {"s", "sec", "secs", "second", "seconds"}) {
    if (name == known) return 1.0;
  }
  for (const char* known : {"min", "mins", "minute", "minutes"}) {
    if (name == known) return 60.0;
  }
  for (const char* known : {"h", "hr", "hrs", "hour", "hours"}) {
    if (name == known) return 3600.0;
  }
  for (const char* known : {"d", "day", "days"}) {
    if (name == known) return 86400.0;
  }
  return std::nullopt;
}

// Reads a text from its beginning, piece by piece.
class Scanner {
 public:
  explicit Scanner(std::string_view text) : text_(text) {}

  bool at_end() const { return text_.empty(); }
  void skip_spaces() {
    while (!text_.empty() && text_.front() == ' ') text_.remove_prefix(1);
  }
  bool take(char letter) {
    if (text_.empty() || text_.front() != letter) return false;
    text_.remove_prefix(1);
    return true;
  }
  bool take(std::string_view word) {
    if (!text_.starts_with(word)) return false;
    text_.remove_prefix(word.size());
    return true;
  }
  std::string_view word() {
    const std::size_t end = std::min(text_.find(' '), text_.size());
    const std::string_view word = text_.substr(0, end);
    text_.remove_prefix(end);
    return word;
  }
  std::optional<int> number(std::size_t most_digits) {
    std::size_t digits = 0;
    while (digits < std::min(text_.size(), most_digits) &&
           std::isdigit(static_cast<unsigned char>(text_[digits])))
      ++digits;
    if (digits == 0) return std::nullopt;
    int value = 0;
    std::from_chars(text_.data(), text_.data() + digits, value);
    text_.remove_prefix(digits);
    return value;
  }
  void skip_digits() {
    while (number(9)) {
    }
  }

 private:
  std::string_view text_;
};

std::optional<std::int64_t> take_date_s(Scanner& text) {
  const auto year = text.number(4);
  if (!year || *year < kFirstGregorianYear || !text.take('-')) return std::nullopt;
  const auto month = text.number(2);
  if (!month || !text.take('-')) return std::nullopt;
  const auto day = text.number(2);
  if (!day) return std::nullopt;
  const std::chrono::year_month_day date{std::chrono::year{*year},
                                         std::chrono::month(static_cast<unsigned>(*month)),
                                         std::chrono::day(static_cast<unsigned>(*day))};
  if (!date.ok()) return std::nullopt;
  return std::chrono::seconds{std::chrono::sys_days{date}.time_since_epoch()}.count();
}

// "12", "12:30", "12:30:15.0"; a fraction must be none, for steps are whole minutes anyway.
std::optional<std::int64_t> take_clock_s(Scanner& text) {
  const auto hour = text.number(2);
  if (!hour || *hour > 24) return std::nullopt;
  std::int64_t time_s = *hour * 3600;
  for (const std::int64_t unit_s : {60, 1}) {
    if (!text.take(':')) return time_s;
    const auto value = text.number(2);
    if (!value || *value > 59) return std::nullopt;
    time_s += *value * unit_s;
  }
  if (text.take('.')) text.skip_digits();
  return time_s;
}

// What stands behind the time: nothing, "Z", "UTC", "+01:00", "-6".
std::optional<std::int64_t> take_zone_s(Scanner& text) {
  text.skip_spaces();
  if (text.at_end() || text.take("utc") || text.take("gmt") || text.take('z')) return 0;
  const bool west = text.take('-');
  if (!west && !text.take('+')) return std::nullopt;
  const auto hours = text.number(2);
  if (!hours || *hours > 14) return std::nullopt;
  text.take(':');
  const int minutes = text.number(2).value_or(0);
  const std::int64_t offset_s = *hours * 3600 + minutes * 60;
  return west ? -offset_s : offset_s;
}

}  // namespace

std::optional<CfTime> parse_cf_time(std::string_view units) {
  const std::string text = lower(units);
  Scanner scanner(text);
  scanner.skip_spaces();
  const auto unit_s = unit_seconds(scanner.word());
  scanner.skip_spaces();
  if (!unit_s || scanner.word() != "since") return std::nullopt;
  scanner.skip_spaces();
  const auto date_s = take_date_s(scanner);
  if (!date_s) return std::nullopt;
  if (!scanner.take('t')) scanner.skip_spaces();
  std::int64_t clock_s = 0;
  if (!scanner.at_end()) {
    const auto clock = take_clock_s(scanner);
    if (!clock) return std::nullopt;
    clock_s = *clock;
  }
  const auto zone_s = take_zone_s(scanner);
  scanner.skip_spaces();
  if (!zone_s || !scanner.at_end()) return std::nullopt;
  return CfTime{*date_s + clock_s - *zone_s, *unit_s};
}

bool is_world_calendar(const std::string& calendar) {
  const std::string name = lower(calendar);
  return name.empty() || name == "standard" || name == "gregorian" || name == "proleptic_gregorian";
}

}  // namespace sunfall

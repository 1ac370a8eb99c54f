#include "plan/periods_table.h"

#include <algorithm>
#include <regex>
#include <set>

#include "plan/words.h"

namespace sunfall {
namespace {

const FlagKey kMonths{"months", true, ""};
const DayKey kFrom{"from"};
const DayKey kTo{"to"};

constexpr std::size_t kMostRanges = 52;   // each costs a layer and a share of memory; enough for weeks
constexpr std::size_t kLongestName = 40;  // it becomes part of file names
const char* const kNamedRange = "a named range { from = \"MM-DD\", to = \"MM-DD\" }";

// Period names become file names: dli-<name>.tif must not meet the layers that every run writes.
const std::set<std::string>& taken_names() {
  static const std::set<std::string> names = {"year", "lowest", "lowest-month"};
  return names;
}

// dli-<name>-p10.tif and the like belong to the period without the ending.
bool is_taken(const std::string& name) {
  static const std::regex percentile(".*-p[0-9]+");
  return taken_names().contains(name) || std::regex_match(name, percentile);
}

bool is_name(const std::string& name) {
  const auto fits = [](char letter) {
    return (letter >= 'a' && letter <= 'z') || (letter >= '0' && letter <= '9') || letter == '_' ||
           letter == '-';
  };
  return !name.empty() && name.size() <= kLongestName && name[0] >= 'a' && name[0] <= 'z' &&
         std::all_of(name.begin(), name.end(), fits);
}

// February 29 alone is the one range that can be without a day.
bool is_without_days(const Period& period, int year) {
  const std::chrono::month_day leap_day{std::chrono::February, std::chrono::day{29}};
  return period.from == leap_day && period.to == leap_day && !std::chrono::year{year}.is_leap();
}

Period read_range(TableReader& periods, const std::string& name, int year) {
  TableReader range = periods.own_table(name, kNamedRange);
  if (!is_name(name)) {
    periods.refuse(name, "a range's name must be short, plain letters", in_quotes(name),
                   "Use a to z, 0 to 9, _ and -, beginning with a letter, at most 40 in all");
  }
  if (is_taken(name)) {
    periods.refuse(name, "the name belongs to a layer of another kind", in_quotes(name),
                   "Choose another name");
  }
  const Period period{name, range.day(kFrom), range.day(kTo)};
  range.finish();
  if (is_without_days(period, year)) {
    periods.refuse(name, "the range holds no day", "02-29 in " + std::to_string(year),
                   "Widen the range, or set [light] year to a leap year");
  }
  return period;
}

}  // namespace

TableShape periods_shape() { return {"periods", {kMonths}, {{"periods.<name>", {kFrom, kTo}}}}; }

void read_periods_table(TableReader& table, Plan& plan) {
  // The year, the darkest month and the tables per plot are all made from the twelve months.
  if (!table.flag(kMonths)) {
    table.refuse(kMonths.name, "the twelve months are always made", "false",
                 "Remove the key; the year and the darkest month are made from them");
  }
  const std::vector<std::string> names = table.own_names();
  if (names.size() > kMostRanges) {
    table.refuse(names[kMostRanges], "too many named ranges", std::to_string(names.size()),
                 "Keep to " + std::to_string(kMostRanges) + " in a plan");
  }
  plan.periods = month_periods();
  // A record's own years are known only once it is read: till then any may be a leap year.
  constexpr int kLeapYear = 2024;
  const int year = files_of(plan.light).empty() ? plan.light_options.year : kLeapYear;
  for (const std::string& name : names) plan.periods.push_back(read_range(table, name, year));
}

}  // namespace sunfall

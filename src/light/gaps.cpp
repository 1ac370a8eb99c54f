#include "light/gaps.h"

#include <fmt/format.h>

#include <cmath>

#include "light/open_series.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr double kMostMissing = 0.10;
constexpr long kDaysAround = 15;
constexpr int kDaysOfEachSide = 3;

std::string month_text(const MonthGaps& gaps) {
  return fmt::format("{} {:.1f} %", month_name(unsigned{gaps.month.month()} - 1), 100.0 * gaps.part());
}

// The light of some steps and that above the air.
struct Clearness {
  double global = 0.0;
  double sky = 0.0;
  double above_air = 0.0;
};

class GapFiller {
 public:
  GapFiller(const StepLight& known, const LightSeries& series) : known_(known), series_(series) {}

  Clearness around(std::size_t step) const {
    const auto day = static_cast<long>(step / kStepsPerDay);
    Clearness sums = near(day, step % kStepsPerDay);
    for (int year = 1; sums.above_air <= 0.0 && year < series_.years; ++year) {
      for (const int away : {year, -year}) {
        if (sums.above_air <= 0.0) sums = near(day + std::lround(365.2425 * away), step % kStepsPerDay);
      }
    }
    return sums;
  }

 private:
  Clearness near(long day, std::size_t time) const {
    Clearness sums;
    add_side(day, 1, time, sums);
    add_side(day, -1, time, sums);
    return sums;
  }

  void add_side(long day, long side, std::size_t time, Clearness& sums) const {
    int found = 0;
    const auto days = static_cast<long>(series_.steps.size() / kStepsPerDay);
    for (long away = side > 0 ? 0 : 1; away <= kDaysAround && found < kDaysOfEachSide; ++away) {
      const long other = day + side * away;
      if (other < 0 || other >= days) continue;
      const std::size_t i = static_cast<std::size_t>(other) * kStepsPerDay + time;
      if (std::isnan(known_.global[i]) || std::isnan(known_.sky[i])) continue;
      sums.global += known_.global[i];
      sums.sky += known_.sky[i];
      sums.above_air += extraterrestrial_level_w_m2(series_, i);
      ++found;
    }
  }

  const StepLight& known_;
  const LightSeries& series_;
};

}  // namespace

std::vector<MonthGaps> count_gaps(const StepLight& steps, const LightSeries& series) {
  std::vector<MonthGaps> months;
  const std::vector<int> month_of_day = months_of_days(series);
  std::chrono::year year = series.first_year - std::chrono::years{1};
  int before = 11;
  for (std::size_t i = 0; i < steps.global.size(); ++i) {
    const int month = month_of_day[i / kStepsPerDay];
    if (months.empty() || month != before) {
      if (month == 0) ++year;
      months.push_back({year / std::chrono::month{static_cast<unsigned>(month + 1)}});
      before = month;
    }
    if (series.sun.mean_sine[i] <= 0.0F) continue;
    ++months.back().lit;
    if (std::isnan(steps.global[i])) ++months.back().missing;
  }
  return months;
}

std::string gaps_text(const std::vector<MonthGaps>& months) {
  std::string text;
  std::chrono::year year{0};
  for (const MonthGaps& gaps : months) {
    if (gaps.missing == 0) continue;
    if (gaps.month.year() != year) {
      year = gaps.month.year();
      text += fmt::format("{}{}: ", text.empty() ? "" : "; ", int{year});
    } else {
      text += ", ";
    }
    text += month_text(gaps);
  }
  return text;
}

void check_gaps(const std::vector<MonthGaps>& months, bool allowed, const std::string& where,
                const std::string& rejected) {
  std::vector<MonthGaps> too_many;
  for (const MonthGaps& gaps : months) {
    if (gaps.part() > kMostMissing) too_many.push_back(gaps);
  }
  if (too_many.empty() || allowed) return;
  constexpr std::size_t kMostNamed = 12;
  const std::string rest =
      too_many.size() > kMostNamed ? fmt::format(" and {} more months", too_many.size() - kMostNamed) : "";
  too_many.resize(std::min(too_many.size(), kMostNamed));
  throw Error(
      ErrorKind::data,
      {.what = "more than 10 % of a month's daylight is missing",
       .where = where,
       .found = gaps_text(too_many) + rest + (rejected.empty() ? "" : "; " + rejected),
       .remedy = "mend the record or cut the file to whole years, or give allow_gaps = true to fill them "
                 "from the days around and from other years"});
}

namespace {

void put(StepLight& steps, const LightSeries& series, std::size_t i, const Clearness& clearness) {
  const double scale = extraterrestrial_level_w_m2(series, i) / clearness.above_air;
  steps.global[i] = static_cast<float>(scale * clearness.global);
  steps.sky[i] = static_cast<float>(scale * clearness.sky);
}

bool is_gap(const StepLight& steps, const LightSeries& series, std::size_t i) {
  return series.sun.mean_sine[i] > 0.0F && std::isnan(steps.global[i]);
}

// Where the days lengthen fast, a step at dawn may have been dark on every day around: it gets the
// clearness of its own day. False where the day has none.
bool fill_from_day(StepLight& steps, const LightSeries& series, std::size_t day) {
  Clearness sums;
  bool any = false;
  const std::size_t first = day * kStepsPerDay;
  for (std::size_t i = first; i < first + kStepsPerDay; ++i) {
    any = any || is_gap(steps, series, i);
    if (std::isnan(steps.global[i])) continue;
    sums.global += steps.global[i];
    sums.sky += steps.sky[i];
    sums.above_air += extraterrestrial_level_w_m2(series, i);
  }
  if (!any) return true;
  if (sums.above_air <= 0.0) return false;
  for (std::size_t i = first; i < first + kStepsPerDay; ++i) {
    if (is_gap(steps, series, i)) put(steps, series, i, sums);
  }
  return true;
}

}  // namespace

bool fill_gaps(StepLight& steps, const LightSeries& series) {
  const StepLight known = steps;
  const GapFiller filler(known, series);
  for (std::size_t i = 0; i < known.global.size(); ++i) {
    if (!is_gap(known, series, i)) continue;
    const Clearness clearness = filler.around(i);
    if (clearness.above_air > 0.0) put(steps, series, i, clearness);
  }
  bool all = true;
  for (std::size_t day = 0; day < known.global.size() / kStepsPerDay; ++day) {
    all = fill_from_day(steps, series, day) && all;
  }
  return all;
}

void fill_and_note(StepLight& steps, bool allow_gaps, const std::string& file, const std::string& rejected,
                   LightSeries& series) {
  const std::vector<MonthGaps> months = count_gaps(steps, series);
  check_gaps(months, allow_gaps, file, rejected);
  const std::string text = gaps_text(months);
  if (text.empty()) return;
  if (!fill_gaps(steps, series)) {
    throw Error(ErrorKind::data,
                {.what = "gaps cannot be filled: no day within 15 days, in any year, has light "
                         "at that time",
                 .where = file,
                 .found = text,
                 .remedy = "give a record of at least one whole year"});
  }
  series.notes.push_back(
      "missing daylight was filled with the mean clearness of the same time on the days "
      "around, or in other years: " +
      text);
}

}  // namespace sunfall

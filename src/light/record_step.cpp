#include "light/record_step.h"

#include <fmt/format.h>

#include <algorithm>
#include <map>

#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr std::int64_t kHour_s = 3600;
constexpr std::int64_t kDay_s = 86400;
constexpr std::int64_t kMostGaps = 10;  // the record's length is at most so many times its readings

// Whole minutes up to an hour, then the whole hours that part a day evenly.
bool is_step(std::int64_t step_s) {
  if (step_s <= kHour_s) return step_s >= 60 && step_s % 60 == 0;
  return step_s < kDay_s && step_s % kHour_s == 0 && kDay_s % step_s == 0;
}

}  // namespace

std::chrono::seconds record_step(const std::vector<std::int64_t>& time_s, const std::string& file,
                                 const std::function<std::string(std::size_t)>& where_of) {
  std::map<std::int64_t, std::size_t> count;
  for (std::size_t i = 1; i < time_s.size(); ++i) ++count[time_s[i] - time_s[i - 1]];
  const auto most = std::max_element(count.begin(), count.end(),
                                     [](const auto& a, const auto& b) { return a.second < b.second; });
  const std::int64_t step_s = most == count.end() ? 0 : most->first;
  if (!is_step(step_s)) {
    throw Error(ErrorKind::data,
                {.what = "the record's step must be 1 to 60 whole minutes, or 2, 3, 4, 6, 8 or 12 hours",
                 .where = file,
                 .found = fmt::format("{} seconds between most times", step_s),
                 .remedy = step_s == kDay_s ? "is it a daily record? As CSV it wants stamp = \"day\""
                                            : "average it to 10 minutes or an hour"});
  }
  for (std::size_t i = 1; i < time_s.size(); ++i) {
    const std::int64_t gap_s = time_s[i] - time_s[i - 1];
    if (gap_s % step_s == 0) continue;
    throw Error(ErrorKind::data,
                {.what = "the times are not equally spaced",
                 .where = where_of(i),
                 .found = fmt::format("{} seconds after the one before, {} elsewhere", gap_s, step_s),
                 .remedy = "bring the record to one step"});
  }
  const std::int64_t length_s = time_s.back() - time_s.front();
  if (length_s / step_s > kMostGaps * static_cast<std::int64_t>(time_s.size())) {
    throw Error(ErrorKind::data,
                {.what = "the record is almost all gaps",
                 .where = file,
                 .found = fmt::format("{} readings in {} days", time_s.size(), length_s / 86400),
                 .remedy = "is a year mistyped in one of the times?"});
  }
  return std::chrono::seconds{step_s};
}

std::int64_t begin_before_stamp_s(SeriesSource::Stamp stamp, std::chrono::seconds step) {
  switch (stamp) {
    case SeriesSource::Stamp::begin: return 0;
    case SeriesSource::Stamp::middle: return step.count() / 2;
    case SeriesSource::Stamp::end:
    case SeriesSource::Stamp::day: break;
  }
  return step.count();
}

std::string step_text(std::chrono::seconds step) {
  return step.count() > kHour_s ? fmt::format("{} hours", step.count() / kHour_s)
         : step.count() == 60   ? "minute"
                                : fmt::format("{} minutes", step.count() / 60);
}

}  // namespace sunfall

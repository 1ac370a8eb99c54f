#include "sunfall/dome.h"

#include <fmt/format.h>

namespace sunfall {

Dome Dome::of(DomeQuality quality) {
  switch (quality) {
    case DomeQuality::draft: return {36, 15, 4, 8, 0.03};
    case DomeQuality::standard: return {72, 30, 6, 4, 0.015};
    case DomeQuality::fine: return {180, 60, 4, 4, 0.005};
  }
  return {};
}

bool holds(const Period& period, std::chrono::month_day day) {
  if (period.from <= period.to) return period.from <= day && day <= period.to;
  return day >= period.from || day <= period.to;
}

std::vector<Period> month_periods() {
  using std::chrono::day, std::chrono::last, std::chrono::month;
  std::vector<Period> periods;
  for (unsigned m = 1; m <= 12; ++m) {
    const std::chrono::year_month_day_last end = std::chrono::year{2024} / month{m} / last;
    periods.push_back({fmt::format("{:02}", m), month{m} / day{1}, month{m} / end.day()});
  }
  return periods;
}

}  // namespace sunfall

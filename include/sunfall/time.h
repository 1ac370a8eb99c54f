#pragma once
// Instants and days. Instants are UTC; a plan's day runs from midnight to midnight of local
// standard time, never of daylight-saving time.

#include <chrono>
#include <string>

namespace sunfall {

using UtcTime = std::chrono::sys_seconds;
using Date = std::chrono::year_month_day;

// The plan's clock: an IANA zone name ("Europe/Amsterdam") or a fixed offset ("+01:00").
class Clock {
 public:
  // Throws Error(plan) for a name that the zone database lacks, naming the nearest one it has.
  // `where` tells the error where the name stood.
  static Clock parse(const std::string& name, const std::string& where);

  const std::string& name() const { return name_; }
  // Local standard time minus UTC in the given year: the zone's offset without daylight saving.
  // A zone that changed its standard offset within the year answers for 1 January.
  std::chrono::seconds standard_offset(std::chrono::year year) const;
  // Wall time minus UTC at an instant, daylight saving included (for showing times to people).
  std::chrono::seconds wall_offset(UtcTime time) const;

 private:
  std::string name_;
  bool fixed_ = false;
  std::chrono::seconds fixed_offset_{0};
};

}  // namespace sunfall

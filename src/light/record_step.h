#pragma once
// The step of a record whose times are known.

#include <chrono>
#include <cstdint>
#include <functional>
#include <string>
#include <vector>

#include "sunfall/light.h"

namespace sunfall {

// The most common distance between times that increase. Throws Error(data) where it is not 1 to 60 whole
// minutes or whole hours that part a day evenly, where another distance is no multiple of it, and where the
// record is almost all gaps. `where_of(i)` names reading i for messages.
std::chrono::seconds record_step(const std::vector<std::int64_t>& time_s, const std::string& file,
                                 const std::function<std::string(std::size_t)>& where_of);

// How long before its stamp an interval of a record with a clock begins.
std::int64_t begin_before_stamp_s(SeriesSource::Stamp stamp, std::chrono::seconds step);

// "minute", "60 minutes", "3 hours", behind "every".
std::string step_text(std::chrono::seconds step);

}  // namespace sunfall

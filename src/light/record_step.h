#pragma once
// The step of a record whose times are known.

#include <chrono>
#include <cstdint>
#include <functional>
#include <string>
#include <vector>

namespace sunfall {

// The most common distance between times that increase. Throws Error(data) where it is not whole minutes from
// 1 to 60, where another distance is no multiple of it, and where the record is almost all gaps.
// `where_of(i)` names reading i for messages.
std::chrono::seconds record_step(const std::vector<std::int64_t>& time_s, const std::string& file,
                                 const std::function<std::string(std::size_t)>& where_of);

}  // namespace sunfall

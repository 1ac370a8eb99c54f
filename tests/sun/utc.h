#pragma once
// Instants for tests.

#include "sunfall/time.h"

namespace sunfall {

inline Date date_of(int year, int month, int day) { return std::chrono::year{year} / month / day; }

inline UtcTime utc(int year, int month, int day, int hour = 0, int minute = 0, int second = 0) {
  return std::chrono::sys_days{date_of(year, month, day)} + std::chrono::hours{hour} +
         std::chrono::minutes{minute} + std::chrono::seconds{second};
}

}  // namespace sunfall

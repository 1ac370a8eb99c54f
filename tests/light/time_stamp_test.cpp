// Instants checked with `date -u -d '…' +%s` (GNU coreutils 9).

#include "light/time_stamp.h"

#include <gtest/gtest.h>

namespace sunfall {
namespace {

long long seconds_of(const char* text) {
  const auto stamp = parse_time_stamp(text);
  return stamp ? stamp->time.time_since_epoch().count() : -1;
}

TEST(TimeStamp, ReadsIso8601) {
  EXPECT_EQ(seconds_of("2025-06-01T12:00"), 1748779200);
  EXPECT_EQ(seconds_of("2025-06-01 12:00:00"), 1748779200);
  EXPECT_EQ(seconds_of("2025-06-01T12:00:00.000"), 1748779200);
  EXPECT_EQ(seconds_of("20250601T120000"), 1748779200);
  EXPECT_EQ(seconds_of("20250601T1200"), 1748779200);
  EXPECT_EQ(seconds_of("2024-02-29T23:59:59"), 1709251199);
  EXPECT_EQ(seconds_of("2025-05-31T24:00"), seconds_of("2025-06-01T00:00"));
}

TEST(TimeStamp, TakesOffsets) {
  for (const char* text : {"2025-06-01T12:00Z", "2025-06-01 14:00:00+02:00", "2025-06-01T14:00+02",
                           "20250601T140000+0200", "2025-06-01T06:30-05:30", "2025-06-01 12:00 +00:00"}) {
    EXPECT_EQ(seconds_of(text), 1748779200) << text;
    EXPECT_TRUE(parse_time_stamp(text)->has_offset) << text;
  }
  EXPECT_FALSE(parse_time_stamp("2025-06-01T12:00")->has_offset);
}

TEST(TimeStamp, RefusesOtherForms) {
  for (const char* text : {"",
                           "2025",
                           "2025-06-01",
                           "01/06/2025 12:00",
                           "01.06.2025 12:00",
                           "2025-6-1 12:00",
                           "2025-06-01T12",
                           "2025-06-01T25:00",
                           "2025-06-01T24:01",
                           "2025-06-01T12:60",
                           "2025-13-01T12:00",
                           "2025-02-29T12:00",
                           "2025-00-10T12:00",
                           "2025-06-01T12:00+15:00",
                           "2025-06-01T12:00+2",
                           "2025-06-01T12:00 CET",
                           "2025-06-01T12:00:00.",
                           "2025-0601T12:00",
                           "2025-06-01x12:00",
                           "45809.5",
                           "-2025-06-01T12:00"}) {
    EXPECT_FALSE(parse_time_stamp(text)) << text;
  }
}

}  // namespace
}  // namespace sunfall

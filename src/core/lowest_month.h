#pragma once
// The darkest month, which polar nights make ambiguous.

namespace sunfall {

// `value(m)` for m from 0 to 11, missing as NaN. The month (0 to 11) of the lowest value; -1 where all are
// missing. Where several are equally low, the middle of the longest row of them round the year (of two
// middles the earlier, of two rows the one that begins first): of November, December and January it is
// December.
template <typename Value>
int lowest_month_of(const Value& value) {
  int lowest = -1, equals = 0;
  for (int m = 0; m < 12; ++m) {
    if (lowest >= 0 && value(m) == value(lowest)) ++equals;
    if (value(m) == value(m) && (lowest < 0 || value(m) < value(lowest))) lowest = m, equals = 1;
  }
  if (equals < 2) return lowest;
  const auto is_low = [&](int m) { return value(m % 12) == value(lowest); };
  int longest = 0, middle = 5;  // all twelve alike
  for (int first = 0; first < 12; ++first) {
    if (!is_low(first) || is_low(first + 11)) continue;
    int length = 1;
    while (is_low(first + length)) ++length;
    if (length <= longest) continue;
    longest = length;
    middle = (first + (length - 1) / 2) % 12;
  }
  return middle;
}

}  // namespace sunfall

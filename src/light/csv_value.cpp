#include "light/csv_value.h"

#include <algorithm>
#include <charconv>
#include <cmath>
#include <string>

namespace sunfall {
bool is_missing(std::string_view text) {
  if (!text.empty() && text.front() >= '0' && text.front() <= '9') return false;
  for (const char* word : {"", "NaN", "nan", "NAN", "NA", "N/A", "null", "NULL", "None", "-", "--"}) {
    if (text == word) return true;
  }
  return false;
}

bool is_missing(double value) {
  for (const double mark : {-999.0, -9999.0, -99999.0, -999.9, -9999.9, -6999.0, -7999.0}) {
    if (value == mark) return true;
  }
  return !std::isfinite(value);
}

std::optional<double> number_in(std::string_view text, char decimal) {
  std::string with_point;
  if (decimal == ',' && text.find('.') == std::string_view::npos) {
    with_point.assign(text);
    std::replace(with_point.begin(), with_point.end(), ',', '.');
    text = with_point;
  }
  if (text.starts_with('+')) text.remove_prefix(1);
  double value = 0.0;
  const auto [end, fault] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (fault != std::errc{} || end != text.data() + text.size()) return std::nullopt;
  return value;
}

const char* number_remedy(std::string_view text, char decimal) {
  const bool comma = decimal == '.' && text.find(',') != std::string_view::npos;
  return comma ? "give decimal = \",\" in the plan" : "leave a missing value empty, or write NaN or -9999";
}

}  // namespace sunfall

#include "light/csv_value.h"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>

#include "sunfall/error.h"

namespace sunfall {
namespace {

// "one line was", "3 lines were".
std::string lines_were(long count) {
  return count == 1 ? "one line was" : fmt::format("{} lines were", count);
}

}  // namespace

bool is_missing(std::string_view text) {
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

void check_decimal(const CsvFile& csv, char decimal, const std::string& file) {
  if (decimal != csv.delimiter()) return;
  throw Error(ErrorKind::data, {.what = "the decimal mark and the delimiter are the same",
                                .where = file,
                                .found = shown_text(std::string(1, decimal)),
                                .remedy = "save it with another delimiter"});
}

void note_lines_left_out(long below_header, long repeated, std::vector<std::string>& notes) {
  if (below_header > 0) {
    notes.push_back(lines_were(below_header) + " left out, below the header and without a time stamp");
  }
  if (repeated > 0) notes.push_back(lines_were(repeated) + " left out that repeated the one before");
}

}  // namespace sunfall

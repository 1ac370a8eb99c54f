#include "light/csv_file.h"

#include <fmt/format.h>

#include <algorithm>
#include <cerrno>
#include <system_error>
#include <utility>

#include "core/nearest.h"
#include "core/utf8.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr std::size_t kChunk = 1U << 18U;
constexpr std::size_t kLongestRow = 1U << 20U;
constexpr std::size_t kMostLinesAboveHeader = 100;
constexpr std::size_t kLongestShown = 60;
constexpr char kDelimiters[] = {',', ';', '\t'};

std::string_view trimmed(std::string_view text) {
  const auto is_space = [](char letter) { return letter == ' ' || letter == '\t'; };
  while (!text.empty() && is_space(text.front())) text.remove_prefix(1);
  while (!text.empty() && is_space(text.back())) text.remove_suffix(1);
  return text;
}

// What a file is that begins so and is no table of text; empty for text.
std::string known_binary(std::string_view start) {
  if (start.starts_with("\xFF\xFE") || start.starts_with("\xFE\xFF")) return "text in UTF-16";
  if (start.starts_with("PK\x03\x04")) return "a zip archive or a spreadsheet";
  if (start.starts_with("\xD0\xCF\x11\xE0")) return "an old spreadsheet";
  if (start.starts_with("\x1F\x8B")) return "compressed by gzip";
  if (start.starts_with("CDF\x01") || start.starts_with("CDF\x02") || start.starts_with("\x89HDF")) {
    return "a NetCDF file";
  }
  if (start.starts_with("GRIB")) return "a GRIB file";
  return start.find('\0') != std::string_view::npos ? "binary" : "";
}

// The field that begins at `i`, and `i` moved to the delimiter behind it or to the row's end. Quotes
// are taken off in place, which only makes a field shorter.
std::string_view take_field(std::string& row, char delimiter, std::size_t& i) {
  const std::size_t begin = i;
  while (i < row.size() && row[i] == ' ') ++i;
  if (i >= row.size() || row[i] != '"') {
    i = std::min(row.find(delimiter, i), row.size());
    return std::string_view(row).substr(begin, i - begin);
  }
  const std::size_t text = ++i;
  std::size_t to = text;
  for (; i < row.size(); ++i) {
    if (row[i] == '"') {
      if (i + 1 >= row.size() || row[i + 1] != '"') break;
      ++i;
    }
    row[to++] = row[i];
  }
  i = std::min(row.find(delimiter, i), row.size());
  return std::string_view(row).substr(text, to - text);
}

void split(std::string& row, char delimiter, std::vector<std::string_view>& fields) {
  fields.clear();
  for (std::size_t i = 0; i <= row.size(); ++i) fields.push_back(trimmed(take_field(row, delimiter, i)));
}

std::vector<std::string> names_in(std::string row, char delimiter) {
  std::vector<std::string_view> fields;
  split(row, delimiter, fields);
  return {fields.begin(), fields.end()};
}

std::string in_line(const std::vector<std::string>& names) {
  constexpr std::size_t kMost = 12;
  std::string text;
  for (std::size_t i = 0; i < std::min(kMost, names.size()); ++i) {
    text += (i > 0 ? ", " : "") + shown_text(names[i]);
  }
  return names.size() > kMost ? text + ", …" : text;
}

}  // namespace

std::string shown_text(std::string_view text) {
  std::string shown = "\"";
  for (std::size_t i = 0; i < text.size();) {
    if (i >= kLongestShown) return shown + "…\"";
    const std::size_t length = utf8_length(text, i);
    const bool printable = length > 1 || (length == 1 && text[i] >= ' ' && text[i] != '\x7F');
    shown += printable ? std::string(text.substr(i, length)) : "?";
    i += std::max<std::size_t>(length, 1);
  }
  return shown + "\"";
}

CsvFile::CsvFile(std::filesystem::path file, CsvOptions options)
    : file_(std::move(file)), options_(std::move(options)), in_(file_, std::ios::binary) {
  if (!in_) {
    throw Error(ErrorKind::io, {.what = "cannot be read",
                                .where = file_.string(),
                                .found = std::generic_category().message(errno),
                                .remedy = "check the name and its permissions"});
  }
  refill();
  if (buffer_.empty()) {
    throw Error(ErrorKind::data,
                {.what = "the file is empty", .where = file_.string(), .found = "", .remedy = ""});
  }
  const std::string binary = known_binary(std::string_view(buffer_).substr(0, 4096));
  if (!binary.empty()) {
    throw Error(ErrorKind::data, {.what = "the file is not a table of text",
                                  .where = file_.string(),
                                  .found = binary,
                                  .remedy = "save it as CSV in UTF-8"});
  }
  if (buffer_.starts_with("\xEF\xBB\xBF")) begin_ = 3;
  find_header();
}

std::string CsvFile::where() const { return fmt::format("{}:{}", file_.string(), row_line_); }

bool CsvFile::refill() {
  if (at_end_) return false;
  buffer_.erase(0, begin_);
  begin_ = 0;
  const std::size_t kept = buffer_.size();
  buffer_.resize(kept + kChunk);
  in_.read(buffer_.data() + kept, static_cast<std::streamsize>(kChunk));
  const auto count = static_cast<std::size_t>(in_.gcount());
  buffer_.resize(kept + count);
  if (in_.bad()) {
    throw Error(ErrorKind::io,
                {.what = "reading failed", .where = file_.string(), .found = "", .remedy = ""});
  }
  at_end_ = count < kChunk;
  return count > 0;
}

// Finds the end of the row that begins at begin_; false where the buffer holds only a part of it.
bool CsvFile::take_row(std::size_t& end) {
  bool quoted = false;
  for (end = begin_; end < buffer_.size(); ++end) {
    const char letter = buffer_[end];
    if (letter == '"') quoted = !quoted;
    if (!quoted && (letter == '\n' || letter == '\r')) {
      // Whether a CR at the very end stands before an LF is known only with more of the file.
      return letter == '\n' || end + 1 < buffer_.size() || at_end_;
    }
  }
  if (at_end_ && quoted) {
    throw Error(ErrorKind::data, {.what = "a quote is never closed",
                                  .where = where(),
                                  .found = "",
                                  .remedy = "write \"\" for a quote inside a quoted field"});
  }
  return at_end_;
}

bool CsvFile::read_row() {
  while (true) {
    if (begin_ >= buffer_.size() && !refill()) return false;
    row_line_ = line_;
    std::size_t end = begin_;
    while (!take_row(end)) {
      if (buffer_.size() - begin_ > kLongestRow) {
        throw Error(ErrorKind::data, {.what = "a line is longer than a megabyte",
                                      .where = where(),
                                      .found = "",
                                      .remedy = "is it a table of text, with all its quotes closed?"});
      }
      refill();
    }
    row_.assign(buffer_, begin_, end - begin_);
    const bool pair = end + 1 < buffer_.size() && buffer_[end] == '\r' && buffer_[end + 1] == '\n';
    begin_ = std::min(buffer_.size(), end + (pair ? 2 : 1));
    line_ += 1 + std::count(row_.begin(), row_.end(), '\n');
    if (!trimmed(row_).empty()) return true;
  }
}

bool CsvFile::may_part(char delimiter) const {
  return options_.delimiter == '\0' || options_.delimiter == delimiter;
}

bool CsvFile::row_holds_columns(const std::string& row, char delimiter) {
  const std::vector<std::string> names = names_in(row, delimiter);
  position_.clear();
  for (const std::string& name : options_.columns) {
    const auto found = std::find(names.begin(), names.end(), name);
    if (found == names.end()) return false;
    if (std::find(found + 1, names.end(), name) != names.end()) {
      throw Error(ErrorKind::data, {.what = "two columns have the same name",
                                    .where = where(),
                                    .found = shown_text(name),
                                    .remedy = "rename one of them"});
    }
    position_.push_back(static_cast<std::size_t>(found - names.begin()));
  }
  return true;
}

void CsvFile::find_header() {
  std::vector<std::string> rows;
  while (rows.size() < kMostLinesAboveHeader && read_row()) {
    for (const char delimiter : kDelimiters) {
      if (!may_part(delimiter) || !row_holds_columns(row_, delimiter)) continue;
      options_.delimiter = delimiter;
      wanted_.resize(options_.columns.size());
      return;
    }
    rows.push_back(row_);
  }
  refuse_header(rows);
}

// Names the column that is missing from the line that comes closest to a header.
void CsvFile::refuse_header(const std::vector<std::string>& rows) const {
  std::vector<std::string> best;
  std::ptrdiff_t best_score = -1;
  const auto holds = [](const std::vector<std::string>& names, const std::string& name) {
    return std::find(names.begin(), names.end(), name) != names.end();
  };
  for (const std::string& row : rows) {
    for (const char delimiter : kDelimiters) {
      if (!may_part(delimiter)) continue;
      const std::vector<std::string> names = names_in(row, delimiter);
      const auto score = 2 * std::count_if(options_.columns.begin(), options_.columns.end(),
                                           [&](const std::string& name) { return holds(names, name); }) +
                         (names.size() > 1 ? 1 : 0);
      if (score <= best_score) continue;
      best_score = score;
      best = names;
    }
  }
  for (const std::string& wanted : options_.columns) {
    if (holds(best, wanted)) continue;
    const std::string nearest = wanted.size() > kLongestShown ? "" : nearest_name(wanted, best);
    throw Error(ErrorKind::data,
                {.what = "the file has no column of that name",
                 .where = file_.string(),
                 .found = shown_text(wanted),
                 .remedy = nearest.empty() ? "its columns are " + in_line(best)
                                           : "perhaps " + shown_text(nearest) + " is meant"});
  }
  throw Error(ErrorKind::internal,
              {.what = "a header was overlooked", .where = file_.string(), .found = "", .remedy = ""});
}

bool CsvFile::next() {
  if (!read_row()) return false;
  split(row_, options_.delimiter, fields_);
  for (std::size_t i = 0; i < position_.size(); ++i) {
    if (position_[i] >= fields_.size()) {
      throw Error(ErrorKind::data,
                  {.what = "the line has too few fields",
                   .where = where(),
                   .found = fmt::format("{} fields, column {} is number {}", fields_.size(),
                                        shown_text(options_.columns[i]), position_[i] + 1),
                   .remedy = "is the file whole, and is a decimal comma taken for a delimiter?"});
    }
    wanted_[i] = fields_[position_[i]];
  }
  return true;
}

}  // namespace sunfall

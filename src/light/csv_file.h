#pragma once
// A table of text, read row by row: the header is found by the names of the wanted columns, so that
// lines above it do not matter. Memory does not grow with the file.

#include <cstddef>
#include <filesystem>
#include <fstream>
#include <string>
#include <string_view>
#include <vector>

namespace sunfall {

struct CsvOptions {
  char delimiter = '\0';             // ',', ';' or tab; '\0': the one that yields the wanted columns
  std::vector<std::string> columns;  // wanted, all of them, by name
};

// Fields may stand in double quotes, with "" for a quote and line ends inside; a byte-order mark and
// spaces around names are ignored; lines end in LF, CR LF or CR; empty lines are skipped.
class CsvFile {
 public:
  // Throws Error(io) where the file cannot be read, Error(data) where it is no such table: empty,
  // binary, in UTF-16, or without a wanted column among its first lines.
  CsvFile(std::filesystem::path file, CsvOptions options);

  // The next row; false at the end. Throws Error(data) for a row with fewer fields than a wanted
  // column needs, and for a quote that is never closed.
  bool next();
  // The row's field of wanted column i, without quotes and surrounding spaces; good until next().
  std::string_view field(std::size_t i) const { return wanted_[i]; }
  // The file's line on which the row begins, from 1.
  long line() const { return row_line_; }
  char delimiter() const { return options_.delimiter; }
  // "station.csv:12", for messages.
  std::string where() const;

 private:
  void find_header();
  bool row_holds_columns(const std::string& row, char delimiter);
  [[noreturn]] void refuse_header(const std::vector<std::string>& rows) const;
  bool may_part(char delimiter) const;
  bool read_row();
  bool take_row(std::size_t& end);
  bool refill();

  std::filesystem::path file_;
  CsvOptions options_;
  std::ifstream in_;
  std::string buffer_;
  std::size_t begin_ = 0;  // of what is left in the buffer
  bool at_end_ = false;
  std::string row_;
  long line_ = 1;
  long row_line_ = 1;
  std::vector<std::string_view> fields_;
  std::vector<std::size_t> position_;  // of each wanted column
  std::vector<std::string_view> wanted_;
};

// A piece of a file in quotes for a message: cut when long, other than printable characters as '?'.
std::string shown_text(std::string_view text);

}  // namespace sunfall

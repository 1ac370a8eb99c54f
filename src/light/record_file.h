#pragma once
// What all records in CSV files share: rows of a stamp and some values, and perhaps the station's place.

#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "core/globe.h"
#include "light/csv_file.h"
#include "sunfall/light.h"

namespace sunfall {

class RecordFile {
 public:
  // `values` are the names of the wanted columns. Throws Error as CsvFile does.
  RecordFile(const DaysFile& file, const std::vector<std::string>& values);

  bool next() { return csv_.next(); }
  std::string_view stamp() const { return csv_.field(0); }
  long line() const { return csv_.line(); }
  std::string where() const { return csv_.where(); }
  [[noreturn]] void refuse(const std::string& what, const std::string& found,
                           const std::string& remedy) const;

  // Whether a row without a stamp may be left out: units and the like below the header.
  bool may_leave_out();
  // The row's values, NaN where missing, good until the next call. Throws Error(data) for what is no number,
  // and where the station stands elsewhere than in the rows before.
  const std::vector<double>& values();
  // Before the next row's values are read: the row just read counts.
  void keep() { kept_ = values_; }
  // The row just read has the stamp of the kept one. Throws Error(data), "the same <what> comes twice", where
  // its values are others.
  void leave_out_repeated(const std::string& what);

  // Where the file says that the station stands.
  const std::optional<LonLat>& station() const { return station_; }
  // How many rows were left out, in words.
  void note_left_out(std::vector<std::string>& notes) const;

 private:
  double number(std::string_view text) const;
  void read_station();

  char decimal_;
  bool tells_station_;
  CsvFile csv_;
  std::vector<double> values_;
  std::vector<double> kept_;
  std::optional<LonLat> station_;
  long below_header_ = 0;
  long repeated_ = 0;
};

// What a file says of its station against the plan's map. Throws Error(data) for a station too far away to
// stand for the map.
void check_station(const std::optional<LonLat>& station, const DaysFile& file, const Place& place,
                   std::vector<std::string>& notes);

}  // namespace sunfall

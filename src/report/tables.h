#pragma once
// Tables as CSV: RFC 4180 quoting, UTF-8, LF, decimal points whatever the locale; the header carries
// the units; a missing number is an empty field.

#include <filesystem>
#include <string>
#include <vector>

#include "map/years.h"
#include "report/statistics.h"
#include "sunfall/time.h"

namespace sunfall {

class CsvTable {
 public:
  explicit CsvTable(const std::vector<std::string>& header);
  // As many fields as the header has.
  void add(const std::vector<std::string>& fields);
  const std::string& text() const { return text_; }
  // Whole or not at all. Throws Error(io).
  void write(const std::filesystem::path& file) const;

 private:
  std::size_t columns_;
  std::string text_;
};

// "12.30" with 2 decimals; empty where missing.
std::string csv_number(double value, int decimals);

struct PlotRow {
  std::string id;
  std::string crop;  // may be empty
  double area_m2 = 0.0;
  std::vector<PlotStatistics> by_period;    // DLI, as many as there are periods
  std::vector<YearPercentiles> over_years;  // of the plot's mean DLI, per period; or empty
};

// A row per plot and period; percentiles over the years where the first plot has them.
void write_plots_csv(const std::filesystem::path& file, const std::vector<PlotRow>& plots,
                     const std::vector<std::string>& periods);

// One time step of a day at one place; photons 400-700 nm on the receiver, µmol m-2 s-1.
struct DayStep {
  UtcTime begin{};
  double azimuth_deg = 0.0;    // of the sun at mid-step, from true north
  double elevation_deg = 0.0;  // apparent
  double open_beam_umol = 0.0;
  double open_sky_umol = 0.0;
  double beam_umol = 0.0;
  double sky_umol = 0.0;
};

void write_day_csv(const std::filesystem::path& file, const std::vector<DayStep>& steps,
                   std::chrono::seconds utc_offset);

}  // namespace sunfall

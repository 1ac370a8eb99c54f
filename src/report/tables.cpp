#include "report/tables.h"

#include <fmt/format.h>

#include <cassert>
#include <cmath>
#include <cstdlib>

#include "core/whole_file.h"
#include "report/years_table.h"

namespace sunfall {
namespace {

// RFC 4180 §2.5 to 2.7; blanks at the ends are quoted too, for readers that would trim them.
std::string quoted(const std::string& field) {
  const bool plain = field.find_first_of("\",\r\n") == std::string::npos &&
                     (field.empty() || (field.front() != ' ' && field.back() != ' '));
  if (plain) return field;
  std::string text = "\"";
  for (const char letter : field) {
    if (letter == '"') text += '"';
    text += letter;
  }
  return text + '"';
}

// ISO 8601 without the zone.
std::string date_and_time(UtcTime time) {
  const auto day = std::chrono::floor<std::chrono::days>(time);
  const std::chrono::year_month_day date(day);
  const auto minutes = std::chrono::floor<std::chrono::minutes>(time - day).count();
  return fmt::format("{:04}-{:02}-{:02}T{:02}:{:02}", static_cast<int>(date.year()),
                     static_cast<unsigned>(date.month()), static_cast<unsigned>(date.day()), minutes / 60,
                     minutes % 60);
}

std::string zone_suffix(std::chrono::seconds utc_offset) {
  const auto minutes = std::abs(std::chrono::duration_cast<std::chrono::minutes>(utc_offset).count());
  return fmt::format("{}{:02}:{:02}", utc_offset.count() < 0 ? '-' : '+', minutes / 60, minutes % 60);
}

}  // namespace

CsvTable::CsvTable(const std::vector<std::string>& header) : columns_(header.size()) { add(header); }

void CsvTable::add(const std::vector<std::string>& fields) {
  assert(fields.size() == columns_);
  for (std::size_t i = 0; i < fields.size(); ++i) {
    if (i > 0) text_ += ',';
    text_ += quoted(fields[i]);
  }
  text_ += '\n';
}

void CsvTable::write(const std::filesystem::path& file) const { write_whole_file(file, text_); }

std::string csv_number(double value, int decimals) {
  if (!std::isfinite(value)) return "";
  const std::string text = fmt::format("{:.{}f}", value, decimals);
  // What rounds to nothing has no sign.
  return text.find_first_not_of("-0.") == std::string::npos && text.front() == '-' ? text.substr(1) : text;
}

void write_plots_csv(const std::filesystem::path& file, const std::vector<PlotRow>& plots,
                     const std::vector<std::string>& periods) {
  std::vector<std::string> header{"plot",
                                  "crop",
                                  "period",
                                  "area (m2)",
                                  "mean DLI (mol m-2 d-1)",
                                  "P10 DLI (mol m-2 d-1)",
                                  "min DLI (mol m-2 d-1)",
                                  "max DLI (mol m-2 d-1)",
                                  "CV (1)"};
  const bool years = !plots.empty() && !plots.front().over_years.empty();
  if (years) {
    for (const std::string& heading : percentile_headings()) header.push_back("mean DLI " + heading);
  }
  CsvTable table(header);
  for (const PlotRow& plot : plots) {
    assert(plot.by_period.size() == periods.size());
    for (std::size_t i = 0; i < periods.size(); ++i) {
      const PlotStatistics& light = plot.by_period[i];
      std::vector<std::string> fields{plot.id,
                                      plot.crop,
                                      periods[i],
                                      csv_number(plot.area_m2, 1),
                                      csv_number(light.mean, 3),
                                      csv_number(light.p10, 3),
                                      csv_number(light.least, 3),
                                      csv_number(light.most, 3),
                                      csv_number(light.cv, 4)};
      if (years) add_percentiles(fields, plot.over_years[i]);
      table.add(fields);
    }
  }
  table.write(file);
}

void write_day_csv(const std::filesystem::path& file, const std::vector<DayStep>& steps,
                   std::chrono::seconds utc_offset) {
  CsvTable table({"step begins (local standard time)", "step begins (UTC)",
                  "sun azimuth (deg from true north)", "sun elevation (deg)", "open beam (umol m-2 s-1)",
                  "open sky (umol m-2 s-1)", "open total (umol m-2 s-1)", "beam (umol m-2 s-1)",
                  "sky (umol m-2 s-1)", "total (umol m-2 s-1)"});
  const std::string zone = zone_suffix(utc_offset);
  for (const DayStep& step : steps) {
    table.add({date_and_time(step.begin + utc_offset) + zone, date_and_time(step.begin) + "Z",
               csv_number(step.azimuth_deg, 3), csv_number(step.elevation_deg, 3),
               csv_number(step.open_beam_umol, 1), csv_number(step.open_sky_umol, 1),
               csv_number(step.open_beam_umol + step.open_sky_umol, 1), csv_number(step.beam_umol, 1),
               csv_number(step.sky_umol, 1), csv_number(step.beam_umol + step.sky_umol, 1)});
  }
  table.write(file);
}

}  // namespace sunfall

#include "report/years_table.h"

#include <fmt/format.h>

#include <numeric>

namespace sunfall {
namespace {

// Beam and sky of the year's mean day at a place.
struct YearLight {
  double beam = 0.0;
  double sky = 0.0;
  int days = 0;
};

YearLight whole_year(const OpenYear& year, const std::vector<double>& shares) {
  YearLight light;
  const std::size_t periods = year.beam.size();
  light.days = std::accumulate(year.days.begin(), year.days.begin() + 12, 0);
  for (std::size_t m = 0; m < 12; ++m) {
    const double part = double(year.days[m]) / light.days;
    light.beam += part * year.beam[m] * (shares.empty() ? 1.0 : shares[m]);
    light.sky += part * year.sky[m] * (shares.empty() ? 1.0 : shares[periods + m]);
  }
  return light;
}

}  // namespace

void write_years_csv(const std::filesystem::path& file, const OpenField& open,
                     const std::vector<Period>& periods, const std::vector<double>& shares) {
  CsvTable table({"year", "period", "days", "beam_mol_m2_d", "sky_mol_m2_d", "total_mol_m2_d"});
  const auto add = [&](int year, const std::string& period, const YearLight& light) {
    table.add({fmt::format("{}", year), period, fmt::format("{}", light.days), csv_number(light.beam, 3),
               csv_number(light.sky, 3), csv_number(light.beam + light.sky, 3)});
  };
  for (const OpenYear& year : open.years) {
    for (std::size_t p = 0; p < periods.size(); ++p) {
      const double beam_share = shares.empty() ? 1.0 : shares[p];
      const double sky_share = shares.empty() ? 1.0 : shares[periods.size() + p];
      add(year.year, periods[p].name, {year.beam[p] * beam_share, year.sky[p] * sky_share, year.days[p]});
    }
    add(year.year, "year", whole_year(year, shares));
  }
  table.write(file);
}

std::vector<std::string> percentile_headings() {
  std::vector<std::string> headings;
  for (const int percent : kYearPercents)
    headings.push_back(fmt::format("P{} over years (mol m-2 d-1)", percent));
  return headings;
}

void add_percentiles(std::vector<std::string>& fields, const YearPercentiles& percentiles) {
  for (const double value : percentiles) fields.push_back(csv_number(value, 3));
}

}  // namespace sunfall

// A table of measured angles in a file of the user's own.

#include <fmt/format.h>

#include <cmath>
#include <optional>

#include "light/csv_file.h"
#include "light/csv_value.h"
#include "sunfall/covers.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

// Three values, each rounded to hundredths, may miss their sum by so much.
constexpr double kSumTolerance = 0.015;
constexpr std::size_t kMostAngles = 1000;

// With the column of totals where the file has one.
CsvFile open_angles(const std::filesystem::path& file, bool& has_total) {
  has_total = true;
  try {
    return CsvFile(file, {'\0', {"angle", "regular", "scattered", "total"}});
  } catch (const Error& error) {
    if (error.parts().found != shown_text("total")) throw;
  }
  has_total = false;
  return CsvFile(file, {'\0', {"angle", "regular", "scattered"}});
}

double number_of(const CsvFile& csv, std::size_t column, const char* name) {
  const std::string_view text = csv.field(column);
  const std::optional<double> value = number_in(text, csv.delimiter() == ',' ? '.' : ',');
  if (value) return *value;
  throw Error(ErrorKind::data, {"is not a number", csv.where() + " " + name, shown_text(text),
                                "Write shares such as 0.83 and angles in degrees, without a unit"});
}

void check_total(const CsvFile& csv, const CoverReading& reading, double total) {
  const double sum = reading.regular + reading.scattered;
  if (std::abs(sum - total) <= kSumTolerance) return;  // false for NaN
  throw Error(ErrorKind::data,
              {sum > total ? "regular and scattered light are more than the total"
                           : "regular and scattered light are less than the total",
               csv.where() + " total",
               fmt::format("{:g} + {:g}, total {:g}", reading.regular, reading.scattered, total),
               "Regular light is the total less the scattered"});
}

}  // namespace

CoverReadings read_cover_angles(const std::filesystem::path& file) {
  bool has_total = false;
  CsvFile csv = open_angles(file, has_total);
  CoverReadings readings;
  std::vector<std::string> places;
  while (csv.next()) {
    const CoverReading reading{number_of(csv, 0, "angle"), number_of(csv, 1, "regular"),
                               number_of(csv, 2, "scattered")};
    if (has_total) check_total(csv, reading, number_of(csv, 3, "total"));
    readings.push_back(reading);
    places.push_back(csv.where());
    if (readings.size() > kMostAngles) {
      throw Error(ErrorKind::data, {fmt::format("there are more than {} angles", kMostAngles), csv.where(),
                                    "", "Give a line for every degree or fewer"});
    }
  }
  if (const auto fault = fault_of(Cover{"", readings, ""})) {
    const bool placed = fault->item && *fault->item < places.size();
    throw Error(ErrorKind::data,
                {fault->what, (placed ? places[*fault->item] : file.string()) + " " + fault->key,
                 fault->found, fault->remedy});
  }
  return readings;
}

}  // namespace sunfall

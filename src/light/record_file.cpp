#include "light/record_file.h"

#include <fmt/format.h>

#include <cmath>
#include <limits>

#include "light/csv_value.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr double kLargest = 1e9;           // J m-2 of an hour are below 1e7
constexpr double kSamePlace_deg = 0.01;    // receivers of satellite signals jitter by less
constexpr long kMostLinesBelowHeader = 4;  // units and the like stand between names and values

// Beyond the first distance a satellite's days are better than those of the station (about 50 km for daily
// sums: Zelenka, Perez, Seals and Renné 1999, Theor. Appl. Climatol. 62:199; from memory). Beyond the second
// the sun itself is another: 1.8 degrees of latitude, a seventh of a December day's sun at 52° N, or 12
// minutes of it.
constexpr double kNear_km = 50.0;
constexpr double kFar_km = 200.0;

std::vector<std::string> all_columns(const DaysFile& file, const std::vector<std::string>& values) {
  std::vector<std::string> all{file.time};
  all.insert(all.end(), values.begin(), values.end());
  if (!file.latitude.empty()) all.insert(all.end(), {file.latitude, file.longitude});
  return all;
}

// "one line was", "3 lines were".
std::string lines_were(long count) {
  return count == 1 ? "one line was" : fmt::format("{} lines were", count);
}

// What would bring the station near, as advice.
std::string place_remedy(LonLat station, LonLat map) {
  const auto near = [&](double longitude_deg, double latitude_deg) {
    return distance_km({longitude_deg, latitude_deg}, map) <= kFar_km;
  };
  if (near(station.latitude_deg, station.longitude_deg)) return "exchange latitude and longitude in the plan";
  if (near(-station.longitude_deg, station.latitude_deg))
    return "west is negative: turn the sign of the longitude";
  if (near(station.longitude_deg, -station.latitude_deg))
    return "south is negative: turn the sign of the latitude";
  return "take a record of a station less than 200 km away, and check the CRS of the ground";
}

}  // namespace

RecordFile::RecordFile(const DaysFile& file, const std::vector<std::string>& values)
    : decimal_(file.decimal),
      tells_station_(!file.latitude.empty()),
      csv_(file.file, {file.delimiter, all_columns(file, values)}),
      values_(values.size()) {
  if (decimal_ != csv_.delimiter()) return;
  throw Error(ErrorKind::data, {.what = "the decimal mark and the delimiter are the same",
                                .where = file.file.string(),
                                .found = shown_text(std::string(1, decimal_)),
                                .remedy = "save it with another delimiter"});
}

void RecordFile::refuse(const std::string& what, const std::string& found, const std::string& remedy) const {
  throw Error(ErrorKind::data, {what, csv_.where(), found, remedy});
}

bool RecordFile::may_leave_out() { return kept_.empty() && ++below_header_ <= kMostLinesBelowHeader; }

double RecordFile::number(std::string_view text) const {
  constexpr double kNone = std::numeric_limits<double>::quiet_NaN();
  if (is_missing(text)) return kNone;
  const std::optional<double> value = number_in(text, decimal_);
  if (!value) refuse("a value is not a number", shown_text(text), number_remedy(text, decimal_));
  if (is_missing(*value)) return kNone;
  if (std::abs(*value) > kLargest) refuse("a value is beyond any unit", shown_text(text), "");
  return *value;
}

void RecordFile::read_station() {
  const std::size_t at = 1 + values_.size();
  const LonLat found{number(csv_.field(at + 1)), number(csv_.field(at))};
  if (std::isnan(found.longitude_deg) || std::isnan(found.latitude_deg)) return;
  if (std::abs(found.latitude_deg) > 90.0 || found.longitude_deg < -180.0 || found.longitude_deg > 360.0) {
    refuse("there is no such place on the globe",
           fmt::format("latitude {:g}, longitude {:g}", found.latitude_deg, found.longitude_deg),
           "write decimal degrees, north and east positive");
  }
  if (!station_) station_ = found;
  const double turn = std::remainder(found.longitude_deg - station_->longitude_deg, 360.0);
  if (std::abs(found.latitude_deg - station_->latitude_deg) <= kSamePlace_deg &&
      std::abs(turn) <= kSamePlace_deg)
    return;
  refuse("the record is of more than one place",
         fmt::format("{}, after {}", globe_text(found), globe_text(*station_)),
         "give each station a file of its own");
}

const std::vector<double>& RecordFile::values() {
  for (std::size_t i = 0; i < values_.size(); ++i) values_[i] = number(csv_.field(i + 1));
  if (tells_station_) read_station();
  return values_;
}

void RecordFile::leave_out_repeated(const std::string& what) {
  for (std::size_t i = 0; i < values_.size(); ++i) {
    if (values_[i] == kept_[i] || (std::isnan(values_[i]) && std::isnan(kept_[i]))) continue;
    refuse("the same " + what + " comes twice with different values", shown_text(stamp()),
           "keep one of the lines");
  }
  ++repeated_;
}

void RecordFile::note_left_out(std::vector<std::string>& notes) const {
  if (below_header_ > 0)
    notes.push_back(lines_were(below_header_) + " left out, below the header and without a time stamp");
  if (repeated_ > 0) notes.push_back(lines_were(repeated_) + " left out that repeated the one before");
}

void check_station(const std::optional<LonLat>& station, const DaysFile& file, const Place& place,
                   std::vector<std::string>& notes) {
  if (file.latitude.empty()) return;
  if (!station) {
    notes.push_back("the columns of the station's place are empty: it was not held against the map's");
    return;
  }
  const LonLat map{place.longitude.degrees(), place.latitude.degrees()};
  const double away_km = distance_km(*station, map);
  if (away_km > kFar_km) {
    throw Error(ErrorKind::data,
                {.what = "the record is of another place than the map",
                 .where = file.file.string(),
                 .found = fmt::format("the station stands at {}, the map at {}, {:.0f} km away",
                                      globe_text(*station), globe_text(map), away_km),
                 .remedy = place_remedy(*station, map)});
  }
  notes.push_back(fmt::format(
      "the record's station stands {:.0f} km from the middle of the map, at {}{}", away_km,
      globe_text(*station),
      away_km > kNear_km
          ? ": beyond 50 km the light of a satellite or a reanalysis at the map mostly fits better"
          : ""));
}

}  // namespace sunfall

#include <date/tz.h>
#include <fmt/format.h>

#include <algorithm>
#include <optional>
#include <regex>
#include <string>
#include <vector>

#include "core/nearest.h"
#include "sunfall/error.h"
#include "sunfall/time.h"

namespace sunfall {
namespace {

using std::chrono::seconds;

// "+01:00", "-3", "+05:45"; nothing for anything else. The bounds are those of the world's zones.
std::optional<seconds> parse_offset(const std::string& text) {
  static const std::regex form(R"(([+-])(\d{1,2})(?::?([0-5]\d))?)");
  std::smatch part;
  if (!std::regex_match(text, part, form)) return std::nullopt;
  const int minutes = 60 * std::stoi(part[2]) + (part[3].matched ? std::stoi(part[3]) : 0);
  if (minutes > 14 * 60) return std::nullopt;
  return std::chrono::minutes(part[1] == "-" ? -minutes : minutes);
}

const date::tzdb& zone_database() {
  try {
    return date::get_tzdb();
  } catch (const std::exception& problem) {
    throw Error(ErrorKind::io,
                {.what = "the system's time zone database cannot be read",
                 .where = "time zones",
                 .found = problem.what(),
                 .remedy = "install the package tzdata, or give a fixed offset such as \"+01:00\""});
  }
}

// The system keeps second copies of its zones, which nobody means.
bool is_copy(const std::string& name) { return name.starts_with("posix/") || name.starts_with("right/"); }

std::vector<std::string> zone_names() {
  std::vector<std::string> names;
  for (const date::time_zone& zone : zone_database().zones) {
    if (!is_copy(zone.name())) names.push_back(zone.name());
  }
  return names;
}

// Looked up by hand: Debian's library of the date package is compiled without the overload of
// locate_zone that a C++20 program sees.
const date::time_zone* find_zone(const std::string& name) {
  const auto& zones = zone_database().zones;
  const auto found = std::find_if(zones.begin(), zones.end(),
                                  [&name](const date::time_zone& zone) { return zone.name() == name; });
  return found == zones.end() || is_copy(name) ? nullptr : &*found;
}

// "Amsterdam" of "Europe/Amsterdam".
std::string city_of(const std::string& zone) { return zone.substr(zone.rfind('/') + 1); }

// The zone whose name is nearest, or whose city is where only a city is given.
std::string nearest_zone(const std::string& name) {
  const std::vector<std::string> zones = zone_names();
  if (name.find('/') != std::string::npos) return nearest_name(name, zones);
  std::vector<std::string> cities;
  for (const std::string& zone : zones) cities.push_back(city_of(zone));
  const std::string nearest = nearest_name(name, cities);
  if (nearest.empty()) return {};
  return zones[static_cast<std::size_t>(std::find(cities.begin(), cities.end(), nearest) - cities.begin())];
}

std::string zone_remedy(const std::string& name) {
  const std::string nearest = nearest_zone(name);
  const std::string general =
      "give an IANA zone such as \"Europe/Amsterdam\" or a fixed offset between \"-14:00\" and \"+14:00\"";
  return nearest.empty() ? general : fmt::format("did you mean \"{}\"? Otherwise {}", nearest, general);
}

date::sys_info zone_info(const std::string& name, UtcTime time) {
  const date::time_zone* zone = find_zone(name);
  if (zone == nullptr) {
    throw Error(ErrorKind::internal,
                {.what = "a clock without a zone", .where = "clock", .found = name, .remedy = ""});
  }
  return zone->get_info(time);
}

}  // namespace

Clock Clock::parse(const std::string& name, const std::string& where) {
  Clock clock;
  clock.name_ = name;
  if (const auto offset = parse_offset(name)) {
    clock.fixed_ = true;
    clock.fixed_offset_ = *offset;
    return clock;
  }
  if (find_zone(name) == nullptr) {
    throw Error(ErrorKind::plan, {.what = "the time zone is not known",
                                  .where = where,
                                  .found = '"' + name + '"',
                                  .remedy = zone_remedy(name)});
  }
  return clock;
}

seconds Clock::standard_offset(std::chrono::year year) const {
  if (fixed_) return fixed_offset_;
  const UtcTime january = std::chrono::sys_days{year / std::chrono::January / 1};
  const date::sys_info at_january = zone_info(name_, january);
  if (at_january.save.count() == 0) return at_january.offset;
  // Daylight saving on 1 January: a southern summer, whose standard time follows. Ireland's law
  // calls the winter hour the exception; there the smaller offset, the winter's, is the one meant.
  date::sys_info next = at_january;
  while (next.save.count() != 0 && next.end < january + std::chrono::days{400}) {
    next = zone_info(name_, next.end);
  }
  return std::min(at_january.offset, next.offset);
}

seconds Clock::wall_offset(UtcTime time) const {
  return fixed_ ? fixed_offset_ : zone_info(name_, time).offset;
}

}  // namespace sunfall

// sunfall spot PLAN --at E,N [--day MM-DD] [-o DIR]

#include <fmt/format.h>

#include <array>
#include <charconv>
#include <cmath>
#include <memory>
#include <nlohmann/json.hpp>

#include "app/command_line.h"
#include "app/run_folder.h"
#include "app/terminal_progress.h"
#include "map/layers.h"
#include "map/open_terrain.h"
#include "map/site.h"
#include "map/spot.h"
#include "map/years.h"
#include "report/spot_report.h"
#include "report/write_run.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

struct SpotCommand {
  CommonOptions common;
  std::string at;
  std::string day = "06-21";
  std::filesystem::path folder;
};

double number_of(std::string_view text, const std::string& whole, const char* option,
                 const std::string& remedy) {
  double value = 0.0;
  const auto [end, code] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (code != std::errc() || end != text.data() + text.size() || !std::isfinite(value)) {
    throw Error(ErrorKind::plan, {"the value cannot be read", option, whole, remedy});
  }
  return value;
}

MapPoint point_of(const std::string& text) {
  const std::string remedy =
      "Give easting and northing in the map's CRS with a comma between, such as 691240,5759310";
  const std::size_t comma = text.find(',');
  if (comma == std::string::npos)
    throw Error(ErrorKind::plan, {"a place needs two numbers", "--at", text, remedy});
  const std::string_view view = text;
  return {number_of(view.substr(0, comma), text, "--at", remedy),
          number_of(view.substr(comma + 1), text, "--at", remedy)};
}

std::chrono::month_day day_of(const std::string& text) {
  const std::string remedy = "Give month and day such as 12-21";
  const std::size_t dash = text.find('-');
  if (dash == std::string::npos)
    throw Error(ErrorKind::plan, {"a day needs month and day", "--day", text, remedy});
  const std::string_view view = text;
  const double month = number_of(view.substr(0, dash), text, "--day", remedy);
  const double day = number_of(view.substr(dash + 1), text, "--day", remedy);
  const std::chrono::month_day out = std::chrono::month{static_cast<unsigned>(std::clamp(month, 0.0, 99.0))} /
                                     std::chrono::day{static_cast<unsigned>(std::clamp(day, 0.0, 99.0))};
  if (!out.ok() || month != std::floor(month) || day != std::floor(day)) {
    throw Error(ErrorKind::plan, {"there is no such day", "--day", text, remedy});
  }
  return out;
}

void require_day_of_years(const std::string& text, std::chrono::month_day day, const LightSeries& series) {
  for (int y = 0; y < series.years; ++y) {
    if (((series.first_year + std::chrono::years{y}) / day).ok()) return;
  }
  throw Error(ErrorKind::plan,
              {fmt::format("there is no such day in {}, the light's year", int{series.first_year}), "--day",
               text, "Give another day, or light of a leap year"});
}

void print_years(const Spot& spot) {
  const std::vector<YearPercentiles> here = percentiles_of(spot.open, spot.shares);
  const std::vector<YearPercentiles> open = percentiles_of(spot.open);
  fmt::print("\n{:<22} {:^26} {:^26}\n", fmt::format("Over {} years", spot.open.years.size()), "here",
             "open field");
  fmt::print("{:<22}", "");
  for (int side = 0; side < 2; ++side) {
    for (const int percent : kYearPercents) fmt::print(" {:>8}", fmt::format("P{}", percent));
  }
  fmt::print("\n");
  for (std::size_t p = 0; p < here.size(); ++p) {
    fmt::print("{:<22}", p < spot.periods.size() ? period_title(spot.periods[p]) : "Year");
    for (const YearPercentiles& side : {here[p], open[p]}) {
      for (const double value : side) fmt::print(" {:8.2f}", value);
    }
    fmt::print("\n");
  }
}

void print_spot(const Plan& plan, const Spot& spot, const std::filesystem::path& out) {
  fmt::print("{:.1f} E, {:.1f} N, ground {:.1f} m (cell centre)\n\n", spot.centre.east, spot.centre.north,
             spot.ground_m);
  fmt::print("{:<22} {:>8} {:>8} {:>8} {:>10} {:>8}\n", "mol m-2 d-1", "beam", "sky", "total", "open field",
             "share");
  for (std::size_t p = 0; p < spot.periods.size(); ++p) {
    const double total = spot.beam[p] + spot.sky[p], open = spot.open.beam[p] + spot.open.sky[p];
    fmt::print("{:<22} {:8.2f} {:8.2f} {:8.2f} {:10.2f} {:>8}\n", period_title(spot.periods[p]), spot.beam[p],
               spot.sky[p], total, open,
               open > 0.0 ? fmt::format("{:.1f} %", 100.0 * total / open) : "no light");
  }
  fmt::print("{:<22} {:>8} {:>8} {:8.2f} {:10.2f} {:6.1f} %\n", "Year", "", "", spot.year, spot.open.year,
             100.0 * spot.year / spot.open.year);
  if (has_percentiles(spot.open)) print_years(spot);
  if (plan.site.receiver_plane == ReceiverPlane::ground) {
    fmt::print("\nThe months are in the plane of the ground; the day's curve is for a level receiver.\n");
  }
  for (const std::string& note : spot.notes)
    fmt::print("{}{}\n", &note == &spot.notes.front() ? "\n" : "", note);
  fmt::print("\nSun path, months and the day's curve are in {}\n", out.string());
}

nlohmann::ordered_json as_json(const Spot& spot, const std::filesystem::path& out) {
  nlohmann::ordered_json periods = nlohmann::ordered_json::array();
  for (std::size_t p = 0; p < spot.periods.size(); ++p) {
    periods.push_back({{"period", spot.periods[p].name},
                       {"beam", spot.beam[p]},
                       {"sky", spot.sky[p]},
                       {"open_beam", spot.open.beam[p]},
                       {"open_sky", spot.open.sky[p]}});
  }
  // By period, the year last: P10, P50 and P90 over the years.
  nlohmann::ordered_json over_years = nlohmann::ordered_json::array();
  if (has_percentiles(spot.open)) {
    const std::vector<YearPercentiles> here = percentiles_of(spot.open, spot.shares);
    const std::vector<YearPercentiles> open = percentiles_of(spot.open);
    for (std::size_t p = 0; p < here.size(); ++p) {
      over_years.push_back({{"period", p < spot.periods.size() ? spot.periods[p].name : "year"},
                            {"dli", here[p]},
                            {"open_dli", open[p]}});
    }
  }
  std::vector<double> horizon;
  for (const Angle angle : spot.horizon) horizon.push_back(std::round(angle.degrees() * 100.0) / 100.0);
  return {{"east", spot.centre.east}, {"north", spot.centre.north},      {"ground_m", spot.ground_m},
          {"dli_year", spot.year},    {"open_dli_year", spot.open.year}, {"periods", periods},
          {"over_years", over_years}, {"horizon_deg", horizon},          {"folder", out.string()}};
}

void run_spot(const SpotCommand& command) {
  const MapPoint point = point_of(command.at);
  const std::chrono::month_day day = day_of(command.day);
  const Plan plan = plan_of(command.common);
  const Site site = site_of(plan);
  require_day_of_years(command.day, day, site.series);
  TerminalProgress progress(command.common.quiet || command.common.json);
  const Terrain terrain(open_terrain(plan.site), progress);
  const DomeLight light = dome_light_of(plan, site);
  const Spot spot = look_at_spot(plan, terrain, light, point, {});
  const std::vector<SpotStep> steps = spot_day(plan, site, spot, day);
  const std::filesystem::path out =
      command.folder.empty() ? std::filesystem::path("outputs") / (plan.file.stem().string() + "-spot")
                             : command.folder;
  RunFolder folder(out);
  write_spot(plan, site, spot, steps, command.day, folder.staging());
  folder.publish("sun-path.png");
  if (command.common.json)
    fmt::print("{}\n", as_json(spot, out).dump());
  else if (!command.common.quiet)
    print_spot(plan, spot, out);
}

}  // namespace

Action add_spot(CLI::App& app, CLI::App*& command) {
  auto options = std::make_shared<SpotCommand>();
  command = add_command(app, "spot", "one place: sun path with its horizon, months, a day's light",
                        options->common);
  command->add_option("--at", options->at, "easting,northing in the map's CRS, metres")->required();
  command->add_option("--day", options->day, "the day whose light is written as CSV, month-day")
      ->capture_default_str();
  command->add_option("-o,--output", options->folder, "folder (default: outputs/NAME-spot)");
  return [options] { run_spot(*options); };
}

}  // namespace sunfall

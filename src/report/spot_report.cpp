#include "report/spot_report.h"

#include <fmt/format.h>

#include <array>
#include <cmath>

#include "core/month_names.h"
#include "map/layers.h"
#include "report/sun_path.h"
#include "report/tables.h"
#include "report/write_run.h"
#include "report/years_table.h"

namespace sunfall {
namespace {

using std::chrono::minutes;

// The sun's way on the 21st of the months from the year's end to its middle, which are nearly those
// of the other half.
std::vector<SunDayPath> paths_of(const Site& site) {
  constexpr std::array<const char*, 7> kNames = {"21 Dec", "21 Jan", "21 Feb", "21 Mar",
                                                 "21 Apr", "21 May", "21 Jun"};
  constexpr std::array<unsigned, 7> kMonths = {12, 1, 2, 3, 4, 5, 6};
  std::vector<SunDayPath> paths;
  for (std::size_t i = 0; i < kMonths.size(); ++i) {
    const std::chrono::sys_days day =
        site.series.first_year / std::chrono::month{kMonths[i]} / std::chrono::day{21};
    SunDayPath path{kNames[i], {}};
    for (minutes at{0}; at <= minutes{24 * 60}; at += minutes{5}) {
      const UtcTime time = day + at - site.series.utc_offset;
      const SunPosition sun = sun_position(time, site.middle.place);
      const bool full_hour = at.count() % 60 == 0 && at < minutes{24 * 60};
      path.points.push_back({sun.azimuth.from_true_north.degrees(), sun.apparent_elevation.degrees(),
                             full_hour ? fmt::format("{}", at.count() / 60) : ""});
    }
    paths.push_back(std::move(path));
  }
  return paths;
}

std::string clock_text(std::chrono::seconds offset) {
  const long minutes_east = offset.count() / 60;
  const long hours = std::abs(minutes_east) / 60, rest = std::abs(minutes_east) % 60;
  return fmt::format("local standard time, UTC{}{}{}", minutes_east < 0 ? "−" : "+", hours,
                     rest != 0 ? fmt::format(":{:02}", rest) : "");
}

SunPathPicture picture_of(const Plan& plan, const Site& site, const Spot& spot) {
  SunPathPicture picture;
  picture.text.title = plan.name;
  picture.text.place = fmt::format("{:.0f} E, {:.0f} N · {} · {}", spot.centre.east, spot.centre.north,
                                   crs_name(site.frame), place_text(site.middle.place));
  picture.text.light = site.series.description;
  picture.text.is_ceiling = site.series.is_ceiling;
  picture.clock = clock_text(site.series.utc_offset);
  picture.centre_azimuth_deg = site.middle.place.latitude.degrees() < 0.0 ? 0.0 : 180.0;
  for (const Angle angle : spot.horizon) picture.horizon_deg.push_back(angle.degrees());
  picture.days = paths_of(site);
  for (std::size_t m = 0; m < 12; ++m) {
    picture.months.push_back({std::string(month_name(m)).substr(0, 3), spot.beam[m], spot.sky[m],
                              spot.open.beam[m] + spot.open.sky[m]});
  }
  return picture;
}

void write_months(const Spot& spot, const std::filesystem::path& file) {
  std::vector<std::string> header{"period",         "beam_mol_m2_d",      "sky_mol_m2_d",
                                  "total_mol_m2_d", "open_beam_mol_m2_d", "open_sky_mol_m2_d"};
  const bool years = has_percentiles(spot.open);
  if (years) {
    for (const std::string& heading : percentile_headings()) header.push_back("total " + heading);
  }
  CsvTable table(header);
  const std::vector<YearPercentiles> over_years = percentiles_of(spot.open, spot.shares);
  for (std::size_t p = 0; p < spot.periods.size(); ++p) {
    std::vector<std::string> fields{spot.periods[p].name,
                                    csv_number(spot.beam[p], 3),
                                    csv_number(spot.sky[p], 3),
                                    csv_number(spot.beam[p] + spot.sky[p], 3),
                                    csv_number(spot.open.beam[p], 3),
                                    csv_number(spot.open.sky[p], 3)};
    if (years) add_percentiles(fields, over_years[p]);
    table.add(fields);
  }
  table.write(file);
}

}  // namespace

void write_spot(const Plan& plan, const Site& site, const Spot& spot, const std::vector<SpotStep>& steps,
                const std::string& day, const std::filesystem::path& folder) {
  const SunPathPicture picture = picture_of(plan, site, spot);
  draw_sun_path(folder / "sun-path.png", picture);
  draw_sun_path(folder / "sun-path.svg", picture);
  write_months(spot, folder / "months.csv");
  if (spot.open.years.size() > 1) write_years_csv(folder / "years.csv", spot.open, spot.periods, spot.shares);
  std::vector<DayStep> rows;
  for (const SpotStep& step : steps) {
    rows.push_back({step.begin, step.sun_azimuth.from_true_north.degrees(), step.sun_elevation.degrees(),
                    step.open_beam_umol, step.open_sky_umol, step.beam_umol, step.sky_umol});
  }
  write_day_csv(folder / ("day-" + day + ".csv"), rows, site.series.utc_offset);
}

}  // namespace sunfall

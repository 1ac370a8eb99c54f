#include "map/site.h"

#include <fmt/format.h>

#include <algorithm>
#include <cctype>
#include <cmath>

#include "geo/far_ground_check.h"
#include "geo/layer_writer.h"
#include "geo/map_scale.h"
#include "geo/raster_source.h"
#include "geo/surface_check.h"
#include "map/read_point.h"
#include "map/years.h"
#include "sun/ephemeris.h"
#include "sunfall/error.h"
#include "sunfall/version.h"

namespace sunfall {
namespace {

// The ground's height at the middle of the map, or at the nearest row that knows one.
double height_at_middle(const RasterSource& ground) {
  const GridFrame& frame = ground.frame();
  for (int away = 0; away <= frame.rows / 2; ++away) {
    for (const int row : {frame.rows / 2 - away, frame.rows / 2 + away}) {
      if (row < 0 || row >= frame.rows) continue;
      const Grid<float> line = ground.read({0, row, frame.columns, 1});
      const float middle = line.at(frame.columns / 2, 0);
      if (!std::isnan(middle)) return middle;
      for (const float height : line.values()) {
        if (!std::isnan(height)) return height;
      }
    }
  }
  return 0.0;
}

const char* sky_name(SkyModel sky) {
  switch (sky) {
    case SkyModel::clearness: return "all-weather sky (Perez, Seals and Michalsky 1993)";
    case SkyModel::isotropic: return "isotropic sky";
    case SkyModel::overcast: return "CIE overcast sky";
  }
  return "";
}

// Days and named hours are the clock's. The widest zone, that of China, is 3.1 h ahead of the sun at its
// western end.
void note_clock(const LightSeries& series, std::vector<std::string>& notes) {
  constexpr double kMost_h = 3.2;
  const double clock_h = static_cast<double>(series.utc_offset.count()) / 3600.0;
  const double sun_h = series.place.longitude.degrees() / 15.0;
  const double ahead_h = std::remainder(clock_h - sun_h, 24.0);
  if (std::abs(ahead_h) <= kMost_h) return;
  notes.push_back(
      fmt::format("the clock (UTC{:+g}) stands {:.1f} h {} the sun of the map's place: is site.clock the "
                  "zone of this place?",
                  clock_h, std::abs(ahead_h), ahead_h > 0 ? "ahead of" : "behind"));
}

// What can be said over the years of a series, and what only seems so.
void check_years(const Plan& plan, Site& site) {
  const std::vector<OpenYear> years = open_years(site.series, plan.periods);
  for (std::size_t p = 0; p < plan.periods.size(); ++p) {
    if (std::any_of(years.begin(), years.end(), [p](const OpenYear& year) { return year.days[p] > 0; }))
      continue;
    throw Error(ErrorKind::plan,
                {"the range holds no day of the light's years", plan.file.string() + " periods",
                 plan.periods[p].name, "Widen the range, or give light of a leap year"});
  }
  if (plan.output.percentiles) require_years(years, plan.periods, plan.output.percentiles_where);
  if (site.series.made_years) return;
  const auto count = static_cast<int>(years.size());
  if (count > 1 && count < kLeastYears) {
    site.notes.push_back(
        fmt::format("Two years of light give a mean, and no percentiles over the years: these take {} years.",
                    kLeastYears));
  } else if (count >= kLeastYears && count < kEnoughYears) {
    site.notes.push_back(
        fmt::format("Percentiles over the years come from {} years only: P10 and P90 lie close "
                    "to the darkest and the brightest of them. {} years or more tell better.",
                    count, kEnoughYears));
  }
}

// A note as a sentence of its own.
std::string sentence(std::string note) {
  if (note.empty()) return note;
  note[0] = static_cast<char>(std::toupper(static_cast<unsigned char>(note[0])));
  if (note.back() != '.') note.push_back('.');
  return note;
}

}  // namespace

std::string place_text(const Place& place) {
  const double longitude = place.longitude.degrees(), latitude = place.latitude.degrees();
  return fmt::format("{:.4f}° {}, {:.4f}° {}", std::abs(longitude), longitude < 0 ? "W" : "E",
                     std::abs(latitude), latitude < 0 ? "S" : "N");
}

Site open_site(const Plan& plan) {
  Site site;
  const RasterSource ground = RasterSource::open(plan.site.ground, "ground");
  site.frame = ground.frame();
  site.middle = geo_place(site.frame, site.frame.middle());
  require_true_metres(site.frame, site.middle, ground.file().string() + " (ground)");
  site.middle.place.height_m = height_at_middle(ground);
  LightOptions options = plan.light_options;
  options.read_point = read_point;
  site.series = make_light(plan.light, site.middle.place, plan.site.clock, options, plan.light_where);
  site.umol_per_joule = umol_per_joule(site.series);
  for (const std::string& note : site.series.notes) site.notes.push_back(sentence(note));
  note_clock(site.series, site.notes);
  check_years(plan, site);
  site.notes.push_back("The sun and the sky are those of the middle of the map (" +
                       place_text(site.middle.place) + ").");
  if (plan.site.far_ground) {
    for (std::string& odd : far_ground_oddities(ground, *plan.site.far_ground))
      site.notes.push_back(std::move(odd));
  } else {
    site.notes.push_back(
        "No far_ground: hills and trees beyond the edge of the map are unknown; sight.tif tells where "
        "that may matter.");
  }
  if (plan.site.surface) {
    const RasterSource surface = RasterSource::open(*plan.site.surface, "surface");
    require_same_grid(surface, ground);
    for (std::string& odd : surface_oddities(ground, surface, plan.site.receiver_height_m))
      site.notes.push_back(std::move(odd));
  } else {
    site.notes.push_back(
        "No surface: only the ground itself casts shade; buildings, walls and trees are left out.");
  }
  if (plan.site.receiver_plane == ReceiverPlane::ground) {
    site.notes.push_back(
        "Light is counted on the plane of the ground; light reflected from the ground around is left out.");
  }
  return site;
}

DomeLight dome_light_of(const Plan& plan, const Site& site) {
  return make_dome_light(site.series, Dome::of(plan.dome.quality), plan.dome.sky, plan.periods);
}

double umol_per_joule(const LightSeries& series) {
  double photons = 0.0, energy = 0.0;
  for (const LightStep& step : series.steps) {
    photons += double(step.beam_umol) + step.sky_umol;
    energy += double(step.beam_w) + step.sky_w;
  }
  return energy > 0.0 ? photons / energy : 0.0;
}

void forget_steps(Site& site) {
  site.series.steps = {};
  site.series.sun = {};
}

std::map<std::string, std::string> provenance_of(const Plan& plan, const Site& site) {
  const Dome dome = Dome::of(plan.dome.quality);
  std::map<std::string, std::string> out;
  out["SUNFALL_VERSION"] = kVersion;
  out["SUNFALL_PLAN"] = plan.name;
  out["SUNFALL_LIGHT"] =
      site.series.description + (site.series.is_ceiling ? " (a cloudless ceiling, not a forecast)" : "");
  out["SUNFALL_PHOTONS"] =
      fmt::format("{:.3f} umol per J of global radiation over the year", site.umol_per_joule);
  out["SUNFALL_SKY"] = sky_name(plan.dome.sky);
  out["SUNFALL_DOME"] =
      fmt::format("{} sectors, {} bands, {} lines a sector", dome.sectors, dome.bands, dome.lines_per_sector);
  out["SUNFALL_RECEIVER"] =
      fmt::format("{} m above the ground, {}", plan.site.receiver_height_m,
                  plan.site.receiver_plane == ReceiverPlane::level ? "level" : "in the plane of the ground");
  out["SUNFALL_LIBRARIES"] = fmt::format("{}, {}", geo_versions(), ephemeris_version());
  return out;
}

}  // namespace sunfall

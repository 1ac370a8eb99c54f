#include "map/geometry_record.h"

#include <fmt/format.h>

#include "core/fingerprint.h"

namespace sunfall {
namespace {

std::string print_of(const std::optional<std::filesystem::path>& file) {
  return file ? fingerprint(*file).sha256 : "none";
}

std::string sky_word(SkyModel sky) {
  switch (sky) {
    case SkyModel::clearness: return "clearness";
    case SkyModel::isotropic: return "isotropic";
    case SkyModel::overcast: return "overcast";
  }
  return "";
}

std::string dome_words(const Dome& dome) {
  return fmt::format("{} sectors of {} lines, {} bands of {} steps", dome.sectors, dome.lines_per_sector,
                     dome.bands, dome.steps_per_band);
}

std::string ranges_of(const std::vector<Period>& periods) {
  std::string words;
  for (std::size_t p = 12; p < periods.size(); ++p) {
    words += fmt::format("{}{} {} to {}", words.empty() ? "" : ", ", periods[p].name,
                         day_key(periods[p].from), day_key(periods[p].to));
  }
  return words.empty() ? "none" : words;
}

std::string area_words(const AreaPlan& area) {
  return fmt::format("{} {} {}", fingerprint(area.file).sha256, area.layer, area.where);
}
std::string words_of(const NumberOrFile& value) {
  return value.file ? fingerprint(*value.file).sha256 : fmt::format("{}", value.number);
}
std::string words_of(const NumberOrField& value) {
  return value.field.empty() ? fmt::format("{}", value.number) : value.field;
}

std::string canopy_words(const Plan& plan) {
  std::string words;
  for (const CanopyPlan& canopy : plan.canopy) {
    if (!words.empty()) words += "; ";
    if (canopy.trees) {
      const TreesPlan& trees = *canopy.trees;
      words +=
          fmt::format("trees {} {} {} {} {}", area_words(trees.layer), words_of(trees.height_m),
                      words_of(trees.crown_base_m), trees.crown_width_m ? words_of(*trees.crown_width_m) : "",
                      trees.leaf_density ? words_of(*trees.leaf_density) : "");
    } else {
      words += fmt::format("{} {} {}", words_of(canopy.top_m), words_of(canopy.base_m),
                           canopy.leaf_density ? words_of(*canopy.leaf_density) : "");
    }
    if (canopy.windbreak)
      words += fmt::format(" porosity {} {}", canopy.windbreak->optical_porosity, canopy.windbreak->width_m);
    words += fmt::format(" {} {} {} {}", canopy.leaf_angle, canopy.clumping, canopy.absorptance,
                         fmt::join(canopy.leafing, " "));
  }
  return words.empty() ? "none" : words;
}

std::string rows_words(const Plan& plan) {
  std::string words;
  for (const RowsPlan& rows : plan.rows) {
    const CropRows& r = rows.rows;
    words += fmt::format("{}{} {} {} {} {} {} {} {} {} {} {} {}", words.empty() ? "" : "; ",
                         area_words(rows.area), rows.azimuth.from_true_north.degrees(), r.spacing_m,
                         r.height_m, r.width_m, r.base_m, static_cast<int>(r.section), r.leaf_density,
                         r.leaf_angle, r.clumping, r.absorptance, fmt::join(rows.leafing, " "));
  }
  return words.empty() ? "none" : words;
}

}  // namespace

std::string day_key(std::chrono::month_day day) {
  return fmt::format("{:02}-{:02}", static_cast<unsigned>(day.month()), static_cast<unsigned>(day.day()));
}

GeometryRecord geometry_of(const Plan& plan) {
  return {{"site.ground", print_of(plan.site.ground)},
          {"site.surface", print_of(plan.site.surface)},
          {"site.far_ground", print_of(plan.site.far_ground)},
          {"site.receiver_height", fmt::format("{} m", plan.site.receiver_height_m)},
          {"site.receiver_plane", plan.site.receiver_plane == ReceiverPlane::level ? "level" : "ground"},
          {"periods", ranges_of(plan.periods)},
          {"dome.quality", dome_words(Dome::of(plan.dome.quality))},
          {"dome.sky", sky_word(plan.dome.sky)},
          {"canopy", canopy_words(plan)},
          {"rows", rows_words(plan)}};
}

}  // namespace sunfall

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
          {"dome.sky", sky_word(plan.dome.sky)}};
}

}  // namespace sunfall

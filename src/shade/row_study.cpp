#include <algorithm>
#include <cmath>

#include "shade/row_sums.h"
#include "sunfall/error.h"
#include "sunfall/rows.h"

namespace sunfall {
namespace {

constexpr std::size_t kAlleyPlaces = 16;

// The middles of equal stretches of the ground between two rows' widths.
std::vector<double> alley_places(const CropRows& rows) {
  std::vector<double> places(kAlleyPlaces);
  for (std::size_t i = 0; i < kAlleyPlaces; ++i) {
    const double part = (static_cast<double>(i) + 0.5) / kAlleyPlaces;
    places[i] = 0.5 * rows.width_m + part * (rows.spacing_m - rows.width_m);
  }
  return places;
}

void require_lists(const RowStudyRequest& request) {
  const auto require = [](bool empty, const char* list) {
    if (!empty) return;
    throw Error(ErrorKind::plan, {"a study of rows needs at least one value in every list", "row study", "",
                                  std::string("give ") + list});
  };
  require(request.azimuths.empty(), "azimuths");
  require(request.spacings_m.empty(), "spacings");
  require(request.heights_m.empty(), "heights");
}

RowCase open_case(Azimuth azimuth, const CropRows& rows, std::size_t periods) {
  const std::vector<double> none(periods, 0.0);
  return {azimuth, rows.spacing_m, rows.height_m, none, none, none, none, none};
}

// Fills the periods of one state of leaf into one case: the azimuth-th of its stand.
void fill_case(const LeafingGroup& group, const RowSums& sums, std::size_t azimuth,
               const std::vector<double>& open_mol, RowCase& result) {
  const std::size_t right = azimuth * 2 * group.periods.size(), left = right + group.periods.size();
  for (std::size_t k = 0; k < group.periods.size(); ++k) {
    const std::size_t period = group.periods[k];
    const double open = open_mol[period];
    if (open <= 0.0) continue;
    result.taken_right[period] = sums.taken[right + k] / open;
    result.taken_left[period] = sums.taken[left + k] / open;
    result.taken[period] = result.taken_right[period] + result.taken_left[period];
    double sum = 0.0, least = HUGE_VAL;
    for (std::size_t i = 0; i < kAlleyPlaces; ++i) {
      const double mol = sums.place[i][right + k] + sums.place[mirrored(i, kAlleyPlaces)][left + k];
      sum += mol / open;
      least = std::min(least, mol / open);
    }
    result.floor_mean[period] = sum / kAlleyPlaces;
    result.floor_least[period] = least;
  }
}

std::vector<CropRows> stands_of(const RowStudyRequest& request) {
  std::vector<CropRows> stands;
  for (const double spacing_m : request.spacings_m) {
    for (const double height_m : request.heights_m) {
      stands.push_back(request.rows);
      stands.back().spacing_m = spacing_m;
      stands.back().height_m = height_m;
      require_sound(stands.back(), request.leafing);
    }
  }
  return stands;
}

}  // namespace

RowStudy study_rows(const DomeLight& light, const RowStudyRequest& request) {
  require_lists(request);
  const std::vector<CropRows> stands = stands_of(request);
  RowStudy study{light.periods, open_light(light), {}};
  std::vector<RowSky> skies;
  for (const Azimuth azimuth : request.azimuths) {
    skies.emplace_back(light, azimuth);
    for (const CropRows& rows : stands) study.cases.push_back(open_case(azimuth, rows, light.periods.size()));
  }
  const std::vector<LeafLight> lights = leaf_lights(skies, light.periods, request.leafing);
  for (std::size_t s = 0; s < stands.size(); ++s) {
    const std::vector<RowSums> all = sum_over_sky(stands[s], lights, alley_places(stands[s]), 0.0);
    for (std::size_t a = 0; a < skies.size(); ++a) {
      RowCase& result = study.cases[a * stands.size() + s];
      for (std::size_t g = 0; g < lights.size(); ++g) {
        fill_case(lights[g].group, all[g], a, study.open_mol, result);
      }
    }
  }
  return study;
}

}  // namespace sunfall

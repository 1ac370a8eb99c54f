#pragma once
// One place of a plan: its months, its horizon, and a day's light.

#include <functional>
#include <vector>

#include "map/site.h"
#include "shade/terrain.h"
#include "sunfall/map.h"
#include "sunfall/plan.h"

namespace sunfall {

struct SpotStep {
  UtcTime begin{};
  Azimuth sun_azimuth;  // at mid-step
  Angle sun_elevation;  // apparent
  double open_beam_umol = 0.0;
  double open_sky_umol = 0.0;
  double beam_umol = 0.0;  // at the place
  double sky_umol = 0.0;
};

struct Spot {
  CellIndex cell;
  MapPoint centre;  // of the cell: the receiver stands above it
  double ground_m = 0.0;
  OpenField open;
  std::vector<Period> periods;
  std::vector<double> beam;  // DLI at the place, per period
  std::vector<double> sky;
  double year = 0.0;
  std::vector<double> shares;  // beam of every period, then sky
  std::vector<Angle> horizon;  // at kSpotAzimuths equal azimuths, the first at true north; ≥ 0
  // Of light from there, above the horizon, what leaves let through in a month (0 to 11); empty where the
  // plan has none. Must not outlive the terrain.
  std::vector<std::string> notes;  // assumptions that were made for the user
  std::function<double(Azimuth from, double tangent, int month)> through_leaves;
};
inline constexpr int kSpotAzimuths = 720;

// The same tile as the map's is solved, so the numbers are the map's own. Throws Error(plan) for a
// point off the map, on unknown ground, or under something solid.
Spot look_at_spot(const Plan& plan, const Terrain& terrain, const DomeLight& light, MapPoint point,
                  const MapOptions& options);

// Light of every step of a day of the series, under the spot's horizon.
std::vector<SpotStep> spot_day(const Plan& plan, const Site& site, const Spot& spot,
                               std::chrono::month_day day);

}  // namespace sunfall

#include "map/spot.h"

#include "map/casters.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "dome/horizon_steps.h"
#include "dome/sky_patch.h"
#include "map/layers.h"
#include "map/tile_solver.h"
#include "shade/horizon_sweep.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

[[noreturn]] void refuse(const std::string& what, MapPoint point, const std::string& remedy) {
  throw Error(ErrorKind::plan, {what, "--at", fmt::format("{:.2f},{:.2f}", point.east, point.north), remedy});
}

CellIndex cell_of(const GridFrame& frame, MapPoint point) {
  const double column = std::floor((point.east - frame.west) / frame.cell_m);
  const double row = std::floor((frame.north - point.north) / frame.cell_m);
  if (!(column >= 0 && row >= 0 && column < frame.columns && row < frame.rows)) {
    refuse("the point lies off the map", point,
           fmt::format("Give easting {:.0f} to {:.0f} and northing {:.0f} to {:.0f} in the map's CRS",
                       frame.west, frame.west + frame.columns * frame.cell_m,
                       frame.north - frame.rows * frame.cell_m, frame.north));
  }
  return {static_cast<int>(column), static_cast<int>(row)};
}

std::vector<Angle> horizon_of(const Terrain& terrain, CellIndex cell, Angle convergence) {
  const TerrainTile tile = terrain.tile({cell.column, cell.row, 1, 1});
  SweepOptions options;
  options.cell_m = terrain.frame().cell_m;
  HorizonSweep sweep(tile, options);
  std::vector<Angle> horizon;
  for (int k = 0; k < kSpotAzimuths; ++k) {
    const GridAzimuth azimuth = to_grid({Angle::degrees(360.0 * k / kSpotAzimuths)}, convergence);
    std::uint16_t step = 0;
    sweep.look_near(azimuth);
    sweep.look_far(azimuth, &step);
    horizon.push_back(Angle::radians(std::atan(static_cast<double>(step_tangent(step)))));
  }
  return horizon;
}

// The casters' view of one cell, kept alive by the function that asks them.
struct CellLeaves {
  std::shared_ptr<PlanCasters> casters;
  TerrainTile tile;
  std::vector<std::unique_ptr<CasterTile>> views;  // nullptr where a caster cannot touch the cell
};

std::function<double(Azimuth, double, int)> leaves_of(const std::shared_ptr<PlanCasters>& casters,
                                                      const Terrain& terrain, CellIndex cell,
                                                      Angle convergence) {
  auto leaves = std::make_shared<CellLeaves>();
  leaves->casters = casters;
  leaves->tile = terrain.tile({cell.column, cell.row, 1, 1});
  for (const auto& caster : casters->casters) leaves->views.push_back(caster->tile(leaves->tile));
  return [leaves, convergence](Azimuth from, double tangent, int month) {
    const GridAzimuth azimuth = to_grid(from, convergence);
    double depth = 0.0;
    for (std::size_t i = 0; i < leaves->views.size(); ++i) {
      const double leaf = leaves->casters->casters[i]->leafing()[static_cast<std::size_t>(month)];
      if (!leaves->views[i] || leaf == 0.0) continue;
      Depth found = 0;
      leaves->views[i]->add_depth(azimuth, static_cast<float>(tangent), {&found, 1});
      depth += leaf * found / double(kDepthUnits);
    }
    return std::exp(-depth);
  };
}

// The horizon at any azimuth, linear between those known.
double horizon_radians(const std::vector<Angle>& horizon, double azimuth_radians) {
  const double count = static_cast<double>(horizon.size());
  double place = azimuth_radians / (2.0 * std::numbers::pi) * count;
  place -= std::floor(place / count) * count;
  const auto first = static_cast<std::size_t>(place) % horizon.size();
  const auto second = (first + 1) % horizon.size();
  const double part = place - std::floor(place);
  return horizon[first].radians() * (1 - part) + horizon[second].radians() * part;
}

// The part of a step's beam that passes over the horizon.
double beam_share(const std::vector<Angle>& horizon, const SkyDirection& from, const SkyDirection& to) {
  constexpr int kPieces = 20;
  double seen = 0.0, all = 0.0;
  for (int k = 0; k < kPieces; ++k) {
    const double t = (k + 0.5) / kPieces;
    const double east = from.east + t * (to.east - from.east),
                 north = from.north + t * (to.north - from.north);
    const double up = from.up + t * (to.up - from.up);
    if (up <= 0.0) continue;
    const double elevation = std::atan2(up, std::hypot(east, north));
    all += up;
    if (elevation > horizon_radians(horizon, std::atan2(east, north))) seen += up;
  }
  return all > 0.0 ? seen / all : 1.0;
}

// For every sector and band, the part of a uniform patch's level light above the horizon that leaves let
// through.
std::vector<float> open_parts(const Spot& spot, const Dome& dome, int month) {
  const std::vector<Angle>& horizon = spot.horizon;
  std::vector<float> parts;
  const int per_sector = static_cast<int>(horizon.size()) / dome.sectors;
  for (int sector = 0; sector < dome.sectors; ++sector) {
    for (int band = 0; band < dome.bands; ++band) {
      const double low = double(band) / dome.bands, high = double(band + 1) / dome.bands;
      double sum = 0.0;
      for (int k = 0; k < per_sector; ++k) {
        const double edge =
            std::clamp(sin(horizon[static_cast<std::size_t>(sector * per_sector + k)]), low, high);
        sum += (high * high - edge * edge) / (high * high - low * low);
      }
      double part = sum / per_sector;
      if (spot.through_leaves && part > 0.0) {
        const double sine = 0.5 * (low + high);
        const Azimuth middle{Angle::degrees(360.0 * (sector + 0.5) / dome.sectors)};
        part *= spot.through_leaves(middle, sine / std::sqrt(1.0 - sine * sine), month);
      }
      parts.push_back(static_cast<float>(part));
    }
  }
  return parts;
}

}  // namespace

Spot look_at_spot(const Plan& plan, const Terrain& terrain, const DomeLight& light, MapPoint point,
                  const MapOptions& options) {
  const GridFrame& frame = terrain.frame();
  Spot spot;
  spot.cell = cell_of(frame, point);
  spot.centre = frame.centre(spot.cell);
  const float ground = terrain.ground({spot.cell.column, spot.cell.row, 1, 1}).at(0, 0);
  if (std::isnan(ground))
    refuse("the ground is unknown here", point, "Choose a place where the ground has a height");
  spot.ground_m = ground;

  const int size = options.tile_cells;
  CellWindow window{spot.cell.column / size * size, spot.cell.row / size * size, 0, 0};
  window.columns = std::min(size, frame.columns - window.column);
  window.rows = std::min(size, frame.rows - window.row);
  const CellIndex middle{window.column + window.columns / 2, window.row + window.rows / 2};
  const Angle convergence = geo_place(frame, frame.centre(middle)).convergence;
  const auto casters = std::make_shared<PlanCasters>(make_casters(plan, terrain));
  const TileSolver solver(terrain, light, plan.site.receiver_plane, casters->casters);
  const TileShares shares = solver.solve(terrain.tile(window), convergence);
  const std::size_t cell = static_cast<std::size_t>(spot.cell.row - window.row) * window.columns +
                           (spot.cell.column - window.column);
  if (!shares.usable[cell]) {
    refuse("the place is under something solid", point,
           "Choose a place that is not covered in the surface raster");
  }
  spot.open = open_field(light);
  spot.periods = light.periods;
  const std::size_t periods = light.periods.size();
  for (std::size_t p = 0; p < periods; ++p) {
    spot.beam.push_back(spot.open.beam[p] * shares.of(cell)[p]);
    spot.sky.push_back(spot.open.sky[p] * shares.of(cell)[periods + p]);
  }
  spot.year = light_of(shares, spot.open).year[cell];
  spot.shares.assign(shares.of(cell), shares.of(cell) + shares.columns);
  const Angle own = geo_place(frame, spot.centre).convergence;
  spot.horizon = horizon_of(terrain, spot.cell, own);
  if (!casters->casters.empty()) spot.through_leaves = leaves_of(casters, terrain, spot.cell, own);
  spot.notes = casters->notes;
  return spot;
}

std::vector<SpotStep> spot_day(const Plan& plan, const Site& site, const Spot& spot,
                               std::chrono::month_day day) {
  const LightSeries& series = site.series;
  const Dome dome = Dome::of(plan.dome.quality);
  const std::vector<float> open =
      open_parts(spot, dome, static_cast<int>(static_cast<unsigned>(day.month())) - 1);
  SkyPatches patches(dome);
  std::vector<SpotStep> steps;
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const UtcTime begin = series.sun.begin + series.sun.step * i;
    const std::chrono::year_month_day date{std::chrono::floor<std::chrono::days>(begin + series.utc_offset)};
    if (date.month() / date.day() != day) continue;
    const SkyDirection& from = series.sun.edges[i];
    const SkyDirection& to = series.sun.edges[i + 1];
    const SkyDirection middle = middle_direction(from, to);
    SpotStep step;
    step.begin = begin;
    step.sun_azimuth = {wrapped(Angle::radians(std::atan2(middle.east, middle.north)))};
    step.sun_elevation = Angle::radians(std::asin(std::clamp(middle.up, -1.0, 1.0)));
    step.open_beam_umol = series.steps[i].beam_umol;
    step.open_sky_umol = series.steps[i].sky_umol;
    step.beam_umol =
        step.open_beam_umol > 0.0 ? step.open_beam_umol * beam_share(spot.horizon, from, to) : 0.0;
    if (step.beam_umol > 0.0 && spot.through_leaves) {
      const double tangent = std::max(0.0, middle.up) / std::max(std::hypot(middle.east, middle.north), 1e-9);
      step.beam_umol *= spot.through_leaves(step.sun_azimuth, tangent,
                                            static_cast<int>(static_cast<unsigned>(day.month())) - 1);
    }
    if (step.open_sky_umol > 0.0) {
      const std::vector<float>& fraction = sky_fractions(patches, plan.dome.sky, series, i);
      double passed = 0.0;
      for (std::size_t k = 0; k < fraction.size(); ++k) passed += double(fraction[k]) * open[k];
      step.sky_umol = step.open_sky_umol * passed;
    }
    steps.push_back(step);
  }
  return steps;
}

}  // namespace sunfall

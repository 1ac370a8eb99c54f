// Tiles, one after another on every core: terrain around the tile, shares, light, layers.

#include <tbb/enumerable_thread_specific.h>

#include <optional>

#include "core/parallel.h"
#include "geo/geodesy.h"
#include "map/casters.h"
#include "map/layer_set.h"
#include "map/open_terrain.h"
#include "map/sight.h"
#include "map/tile_solver.h"
#include "map/years.h"
#include "shade/terrain.h"
#include "sunfall/map.h"

namespace sunfall {

Terrain::Inputs open_terrain(const SitePlan& site) {
  Terrain::Inputs inputs{
      RasterSource::open(site.ground, "ground"), {}, site.far_ground, site.receiver_height_m};
  if (site.surface) inputs.surface = RasterSource::open(*site.surface, "surface");
  return inputs;
}

MapResult make_maps(const Plan& plan, const DomeLight& light,
                    const std::map<std::string, std::string>& provenance, const std::filesystem::path& folder,
                    const MapOptions& options, Progress& progress) {
  MapResult result;
  Stopwatch reading;
  std::optional<Terrain> terrain(std::in_place, open_terrain(plan.site), progress);
  result.seconds["reading"] = reading.seconds();

  result.frame = terrain->frame();
  result.periods = light.periods;
  result.open = open_field(light);
  LayerSet layers(plan, provenance, folder, result);
  {
    const PlanCasters casters = make_casters(plan, *terrain);
    result.notes = casters.notes;
    const TileSolver solver(*terrain, light, plan.site.receiver_plane, casters.casters);
    tbb::enumerable_thread_specific<TileRoom> rooms;
    const auto work = [&](const CellWindow& window) {
      const GridFrame& frame = result.frame;
      const CellIndex middle{window.column + window.columns / 2, window.row + window.rows / 2};
      const Angle convergence = geo_place(frame, frame.centre(middle)).convergence;
      const TerrainTile tile = terrain->tile(window);
      return TileAnswer{solver.solve(tile, convergence, rooms.local()), tile_sight(tile, frame.cell_m)};
    };
    layers.fill(work, "following the light", options, progress);
  }
  terrain.reset();  // room for what finishing takes
  layers.finish(options, progress);
  return result;
}

}  // namespace sunfall

// Tiles, one after another on every core: terrain around the tile, shares, light, layers.

#include <tbb/enumerable_thread_specific.h>

#include <algorithm>
#include <memory>
#include <mutex>

#include "core/parallel.h"
#include "geo/geodesy.h"
#include "geo/layer_writer.h"
#include "map/layers.h"
#include "map/open_terrain.h"
#include "map/plot_shares.h"
#include "map/sight.h"
#include "map/tile_solver.h"
#include "map/tiles.h"
#include "shade/terrain.h"
#include "sunfall/error.h"
#include "sunfall/map.h"

namespace sunfall {
namespace {

void stop_if_asked(const Progress& progress) {
  if (progress.stop_requested()) {
    throw Error(ErrorKind::interrupted,
                {"stopped before the maps were done", "", "", "Run the same command again"});
  }
}

// A layer on its way to disk; tiles arrive from several threads.
struct OpenLayer {
  LayerRecipe recipe;
  LayerWriter writer;
  std::mutex writing;
  OpenLayer(const std::filesystem::path& folder, LayerRecipe r, const GridFrame& frame)
      : recipe(std::move(r)), writer(folder, recipe.spec, frame) {}
};

}  // namespace

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
  Terrain terrain(open_terrain(plan.site), progress);
  result.seconds["reading"] = reading.seconds();

  const GridFrame& frame = terrain.frame();
  result.frame = frame;
  result.periods = light.periods;
  result.open = open_field(light);
  const TileSolver solver(terrain, light, plan.site.receiver_plane);
  std::vector<std::unique_ptr<OpenLayer>> layers;
  for (LayerRecipe& recipe : layers_of(plan, light.periods, provenance)) {
    result.layers.push_back({recipe.spec.file_name, recipe.spec.description, recipe.spec.unit});
    layers.push_back(std::make_unique<OpenLayer>(folder, std::move(recipe), frame));
  }

  Stopwatch solving;
  const std::vector<CellWindow> tiles = tiles_of(frame, options.tile_cells);
  SharedProgress told(progress, "following the light", tiles.size());
  struct Sum {
    double sight = 0.0;
    std::size_t usable = 0;
  };
  std::vector<Sum> sums(tiles.size());  // by tile, so that totals add up in one order
  PlotShares plot_shares(options.plots, tiles.size());
  tbb::enumerable_thread_specific<TileRoom> rooms;
  on_all_cores(options.jobs, tiles.size(), [&](std::size_t turn) {
    stop_if_asked(progress);
    const std::size_t i = options.reverse_tiles ? tiles.size() - 1 - turn : turn;
    const CellWindow& window = tiles[i];
    const CellIndex middle{window.column + window.columns / 2, window.row + window.rows / 2};
    const Angle convergence = geo_place(frame, frame.centre(middle)).convergence;
    const TerrainTile tile = terrain.tile(window);
    const TileShares shares = solver.solve(tile, convergence, rooms.local());
    TileLight tile_light = light_of(shares, result.open);
    if (plan.output.percentiles) tile_light.over_years = percentiles_of(result.open, shares);
    plot_shares.add(i, shares);
    tile_light.sight = tile_sight(tile, frame.cell_m);
    for (std::size_t cell = 0; cell < shares.usable.size(); ++cell) {
      sums[i].sight += tile_light.sight[cell];
      sums[i].usable += shares.usable[cell] ? 1 : 0;
    }
    std::vector<float> values(shares.usable.size());
    for (const auto& layer : layers) {
      layer->recipe.fill(tile_light, values);
      const std::lock_guard lock(layer->writing);
      layer->writer.write(window, values.data());
    }
    told.one_done();
  });
  std::size_t usable = 0;
  for (const Sum& sum : sums) {
    result.mean_sight += sum.sight / double(frame.size());
    usable += sum.usable;
  }
  result.valid_fraction = double(usable) / double(frame.size());
  result.plot_shares = plot_shares.means();
  result.seconds["light"] = solving.seconds();

  Stopwatch writing;
  SharedProgress finished(progress, "finishing the layers", layers.size());
  on_all_cores(options.jobs, layers.size(), [&](std::size_t i) {
    stop_if_asked(progress);
    layers[i]->writer.finish();
    finished.one_done();
  });
  result.seconds["layers"] = writing.seconds();
  return result;
}

}  // namespace sunfall

#include "map/layer_set.h"

#include <mutex>

#include "core/parallel.h"
#include "map/crop_sums.h"
#include "map/layers.h"
#include "map/plot_shares.h"
#include "map/tiles.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

void stop_if_asked(const Progress& progress) {
  if (progress.stop_requested()) {
    throw Error(ErrorKind::interrupted,
                {"stopped before the maps were done", "", "", "Run the same command again"});
  }
}

}  // namespace

// Tiles arrive from several threads.
struct LayerSet::OpenLayer {
  LayerRecipe recipe;
  LayerWriter writer;
  std::mutex writing;
  OpenLayer(const std::filesystem::path& folder, LayerRecipe r, const GridFrame& frame)
      : recipe(std::move(r)), writer(folder, recipe.spec, frame) {}
};

LayerSet::LayerSet(const Plan& plan, const std::map<std::string, std::string>& provenance,
                   const std::filesystem::path& folder, MapResult& result)
    : plan_(plan), result_(result) {
  for (LayerRecipe& recipe : layers_of(plan, result.periods, provenance)) {
    result.layers.push_back({recipe.spec.file_name, recipe.spec.description, recipe.spec.unit});
    layers_.push_back(std::make_unique<OpenLayer>(folder, std::move(recipe), result.frame));
  }
}

LayerSet::~LayerSet() = default;

void LayerSet::fill(const TileWork& work, const std::string& stage, const MapOptions& options,
                    Progress& progress) {
  const Stopwatch watch;
  const GridFrame& frame = result_.frame;
  const std::vector<CellWindow> tiles = tiles_of(frame, options.tile_cells);
  SharedProgress told(progress, stage, tiles.size());
  struct Sum {
    double sight = 0.0;
    std::size_t usable = 0;
  };
  std::vector<Sum> sums(tiles.size());  // by tile, so that totals add up in one order
  PlotShares plot_shares(options.plots, tiles.size());
  CropSums crop_sums(plan_.rows.size(), tiles.size());
  on_all_cores(options.jobs, tiles.size(), [&](std::size_t turn) {
    stop_if_asked(progress);
    const std::size_t i = options.reverse_tiles ? tiles.size() - 1 - turn : turn;
    TileAnswer answer = work(tiles[i]);
    const TileShares& shares = answer.shares;
    TileLight light = light_of(shares, result_.open);
    light.sight = std::move(answer.sight);
    if (plan_.output.percentiles) light.over_years = percentiles_of(result_.open, shares);
    plot_shares.add(i, shares);
    crop_sums.add(i, shares, result_.open);
    for (std::size_t cell = 0; cell < shares.usable.size(); ++cell) {
      sums[i].sight += light.sight[cell];
      sums[i].usable += shares.usable[cell] ? 1 : 0;
    }
    std::vector<float> values(shares.usable.size());
    for (const auto& layer : layers_) {
      layer->recipe.fill(light, values);
      const std::lock_guard lock(layer->writing);
      layer->writer.write(tiles[i], values.data());
    }
    told.one_done();
  });
  std::size_t usable = 0;
  for (const Sum& sum : sums) {
    result_.mean_sight += sum.sight / double(frame.size());
    usable += sum.usable;
  }
  result_.valid_fraction = double(usable) / double(frame.size());
  result_.plot_shares = plot_shares.means();
  result_.crops = crop_sums.means(result_.periods.size());
  result_.seconds["light"] = watch.seconds();
}

void LayerSet::finish(const MapOptions& options, Progress& progress) {
  const Stopwatch watch;
  SharedProgress told(progress, "finishing the layers", layers_.size());
  on_all_cores(options.jobs, layers_.size(), [&](std::size_t i) {
    stop_if_asked(progress);
    layers_[i]->writer.finish();
    told.one_done();
  });
  result_.seconds["layers"] = watch.seconds();
}

}  // namespace sunfall

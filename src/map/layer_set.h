#pragma once
// The layers of a run on their way to disk: filled tile by tile on every core, finished at the end.

#include <filesystem>
#include <functional>
#include <map>
#include <memory>
#include <string>
#include <vector>

#include "map/tile_solver.h"
#include "sunfall/map.h"

namespace sunfall {

// What a tile's light is made of, however it was found.
struct TileAnswer {
  TileShares shares;
  std::vector<float> sight;  // per cell
};
// Called from several threads.
using TileWork = std::function<TileAnswer(const CellWindow& window)>;

class LayerSet {
 public:
  // `result` has frame, periods and open field; the layers are added to it.
  LayerSet(const Plan& plan, const std::map<std::string, std::string>& provenance,
           const std::filesystem::path& folder, MapResult& result);
  ~LayerSet();

  // Cuts the map into tiles, has `work` done for each and fills the layers. What `result` tells of the
  // whole map does not depend on the order of tiles. Throws Error; on interruption, Error(interrupted).
  void fill(const TileWork& work, const std::string& stage, const MapOptions& options, Progress& progress);
  void finish(const MapOptions& options, Progress& progress);

 private:
  struct OpenLayer;
  const Plan& plan_;
  MapResult& result_;
  std::vector<std::unique_ptr<OpenLayer>> layers_;
};

}  // namespace sunfall

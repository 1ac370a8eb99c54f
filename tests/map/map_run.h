#pragma once
// Whole maps of invented ground: plans made in memory, solved by the main job, read back.

#include <filesystem>
#include <string>

#include "map/scene.h"
#include "map/site.h"
#include "sunfall/map.h"

namespace sunfall::testing {

// The options' map with its middle at a place on the globe, degrees.
SceneOptions centred(SceneOptions options, int epsg, double longitude_deg, double latitude_deg);

// A cloudless year over the scene's ground and surface, the sun's year and clock fixed.
Plan clear_plan(const Scene& scene, const SceneOptions& options, int year = 2025);

// The light of a plan, which several maps may share.
struct PlanLight {
  Site site;
  DomeLight dome;
};
PlanLight light_of_plan(const Plan& plan);

// The layers of one run, in a folder that goes with it.
class MapRun {
 public:
  MapRun(const Plan& plan, const PlanLight& light, const MapOptions& options = {});
  ~MapRun();
  MapRun(const MapRun&) = delete;
  MapRun& operator=(const MapRun&) = delete;

  const MapResult& result() const { return result_; }
  const std::filesystem::path& folder() const { return folder_; }
  Grid<float> layer(const std::string& file_name) const;
  Grid<float> dli(const std::string& period) const { return layer("dli-" + period + ".tif"); }
  double open_dli(std::size_t period) const { return result_.open.beam[period] + result_.open.sky[period]; }

 private:
  std::filesystem::path folder_;
  MapResult result_;
};

// Shares of the whole scene as one tile, before any rounding of layers.
TileShares whole_shares(const Scene& scene, const DomeLight& light,
                        ReceiverPlane plane = ReceiverPlane::level);

// Rounding of the layers, either way (docs/layers.md).
inline constexpr double kDliRounding = 0.5 / 128.0;
inline constexpr double kShareRounding = 0.5 / 4096.0;
// Of values near one that are kept as 32-bit floats and added a few times.
inline constexpr double kFloatRounding = 1e-6;

}  // namespace sunfall::testing

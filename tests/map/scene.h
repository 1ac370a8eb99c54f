#pragma once
// Invented ground for tests: a height for every place, written as a raster and read as any other.

#include <filesystem>
#include <functional>
#include <memory>
#include <optional>

#include "map/tile_solver.h"
#include "shade/terrain.h"
#include "sunfall/dome.h"
#include "sunfall/plan.h"

namespace sunfall::testing {

using Height = std::function<double(double east, double north)>;

struct SceneOptions {
  int columns = 300;
  int rows = 300;
  double cell_m = 1.0;
  double receiver_height_m = 0.0;
  double west = 500000.0;
  double north = 5700000.0;
  int epsg = 25831;
};

// A new empty folder among the system's temporary ones.
std::filesystem::path fresh_folder();

// East and north in `Height` are metres from the middle of the map; heights are taken at cell centres.
class Scene {
 public:
  Scene(const Height& ground, const std::optional<Height>& surface, const SceneOptions& options = {});
  ~Scene();
  Scene(const Scene&) = delete;
  Scene& operator=(const Scene&) = delete;

  const Terrain& terrain() const { return *terrain_; }
  const std::filesystem::path& folder() const { return folder_; }
  std::filesystem::path ground_file() const { return folder_ / "ground.tif"; }
  std::filesystem::path surface_file() const { return folder_ / "surface.tif"; }
  // The cell that holds a place.
  CellIndex cell(double east, double north) const;

 private:
  SceneOptions options_;
  std::filesystem::path folder_;
  std::unique_ptr<Terrain> terrain_;
};

void write_heights(const std::filesystem::path& file, const Height& height, const SceneOptions& options);

// A dome with an even sky and no beam, one period: the sky share is the sky view of a level receiver.
DomeLight even_sky(const Dome& dome);

// Share of one column at a place, from a tile around it.
double share_at(Scene& scene, const TileSolver& solver, double east, double north, int column,
                Angle convergence = Angle(), int tile = 96);

inline constexpr int kSkyColumn = 1;  // of even_sky: beam, then sky

}  // namespace sunfall::testing

#include "map/scene.h"

#include <unistd.h>

#include <atomic>
#include <cmath>

#include "geo/geodesy.h"
#include "geo/layer_writer.h"

namespace sunfall::testing {
std::filesystem::path fresh_folder() {
  static std::atomic<int> count{0};
  const auto folder = std::filesystem::temp_directory_path() /
                      ("sunfall-scene-" + std::to_string(getpid()) + "-" + std::to_string(count++));
  std::filesystem::create_directories(folder);
  return folder;
}

void write_heights(const std::filesystem::path& file, const Height& height, const SceneOptions& options) {
  start_geo();
  GridFrame frame;
  frame.columns = options.columns;
  frame.rows = options.rows;
  frame.west = options.west;
  frame.north = options.north;
  frame.cell_m = options.cell_m;
  frame.crs_wkt = crs_wkt_of_epsg(options.epsg);
  Grid<float> grid(frame);
  const MapPoint middle = frame.middle();
  for (int row = 0; row < options.rows; ++row) {
    for (int column = 0; column < options.columns; ++column) {
      const MapPoint centre = frame.centre({column, row});
      grid.at(column, row) =
          static_cast<float>(height(centre.east - middle.east, centre.north - middle.north));
    }
  }
  LayerWriter writer(file.parent_path(), {file.filename().string(), "height", "m"}, frame);
  writer.write({0, 0, options.columns, options.rows}, grid.values().data());
  writer.finish();
}

Scene::Scene(const Height& ground, const std::optional<Height>& surface, const SceneOptions& options)
    : options_(options), folder_(fresh_folder()) {
  write_heights(ground_file(), ground, options);
  Terrain::Inputs inputs{RasterSource::open(ground_file(), "ground"), {}, {}, options.receiver_height_m};
  if (surface) {
    write_heights(surface_file(), *surface, options);
    inputs.surface = RasterSource::open(surface_file(), "surface");
  }
  SilentProgress quiet;
  terrain_ = std::make_unique<Terrain>(std::move(inputs), quiet);
}

Scene::~Scene() {
  terrain_.reset();
  std::error_code ignored;
  std::filesystem::remove_all(folder_, ignored);
}

CellIndex Scene::cell(double east, double north) const {
  return {static_cast<int>(std::floor(east / options_.cell_m + 0.5 * options_.columns)),
          static_cast<int>(std::floor(0.5 * options_.rows - north / options_.cell_m))};
}

DomeLight even_sky(const Dome& dome) {
  DomeLight light;
  light.dome = dome;
  light.periods = {month_periods().front()};
  const std::size_t size = static_cast<std::size_t>(dome.lines()) * dome.steps();
  light.beam = {std::vector<double>(size, 0.0), std::vector<double>(size, 0.0), {0.0}};
  light.sky = light.beam;
  for (int line = 0; line < dome.lines(); ++line) {
    for (int step = 0; step < dome.steps(); ++step) {
      const double low = double(step) / dome.steps(), high = double(step + 1) / dome.steps();
      const double level = (high * high - low * low) / dome.lines();
      const double sine = 0.5 * (low + high);
      light.sky.level[light.index(line, step, 0)] = level;
      light.sky.facing[light.index(line, step, 0)] = level * std::sqrt(1.0 - sine * sine) / sine;
      light.sky.open[0] += level;
    }
  }
  return light;
}

double share_at(Scene& scene, const TileSolver& solver, double east, double north, int column,
                Angle convergence, int tile) {
  const CellIndex cell = scene.cell(east, north);
  const GridFrame& frame = scene.terrain().frame();
  CellWindow window{std::max(0, cell.column - tile / 2), std::max(0, cell.row - tile / 2), tile, tile};
  window.columns = std::min(tile, frame.columns - window.column);
  window.rows = std::min(tile, frame.rows - window.row);
  const TileShares shares = solver.solve(scene.terrain().tile(window), convergence);
  const std::size_t at =
      static_cast<std::size_t>(cell.row - window.row) * window.columns + (cell.column - window.column);
  return shares.usable[at] ? shares.of(at)[column] : std::nan("");
}

}  // namespace sunfall::testing

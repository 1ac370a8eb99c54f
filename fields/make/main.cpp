// Makes the inputs of the demo farm Alder Reach: make_alder_reach FOLDER

#include <fmt/format.h>

#include <cmath>
#include <filesystem>
#include <functional>

#include "buildings.h"
#include "geo/geodesy.h"
#include "geo/layer_writer.h"
#include "geo/plots.h"
#include "plots.h"
#include "sunfall/error.h"
#include "terrain.h"

namespace {

using namespace alder_reach;

// Where the farm's south-west corner is put on the map: a real spot to the sun, invented ground.
constexpr double kWest_m = 690900.0;
constexpr double kSouth_m = 5759000.0;

// ETRS89 / UTM zone 31N, EPSG:25831.
constexpr const char* kCrsWkt = R"(PROJCS["ETRS89 / UTM zone 31N",
  GEOGCS["ETRS89", DATUM["European_Terrestrial_Reference_System_1989",
      SPHEROID["GRS 1980", 6378137, 298.257222101, AUTHORITY["EPSG","7019"]], AUTHORITY["EPSG","6258"]],
    PRIMEM["Greenwich", 0, AUTHORITY["EPSG","8901"]],
    UNIT["degree", 0.0174532925199433, AUTHORITY["EPSG","9122"]], AUTHORITY["EPSG","4258"]],
  PROJECTION["Transverse_Mercator"], PARAMETER["latitude_of_origin", 0], PARAMETER["central_meridian", 3],
  PARAMETER["scale_factor", 0.9996], PARAMETER["false_easting", 500000], PARAMETER["false_northing", 0],
  UNIT["metre", 1, AUTHORITY["EPSG","9001"]], AXIS["Easting", EAST], AXIS["Northing", NORTH],
  AUTHORITY["EPSG","25831"]])";

using HeightAt = std::function<double(Point)>;

sunfall::GridFrame frame(Point south_west, int columns, int rows, double cell_m) {
  return {columns, rows, kWest_m + south_west.x, kSouth_m + south_west.y + rows * cell_m, cell_m, kCrsWkt};
}

// Writes the mean of samples × samples heights of each cell.
void write_heights(const std::filesystem::path& folder, const sunfall::LayerSpec& spec,
                   const sunfall::GridFrame& frame, int samples, const HeightAt& height) {
  sunfall::Grid<float> grid(frame);
  for (int row = 0; row < frame.rows; ++row) {
    for (int column = 0; column < frame.columns; ++column) {
      const sunfall::MapPoint centre = frame.centre({column, row});
      double sum = 0.0;
      for (int i = 0; i < samples; ++i) {
        for (int j = 0; j < samples; ++j) {
          const double right = ((i + 0.5) / samples - 0.5) * frame.cell_m;
          const double up = ((j + 0.5) / samples - 0.5) * frame.cell_m;
          sum += height({centre.east + right - kWest_m, centre.north + up - kSouth_m});
        }
      }
      grid.at(column, row) = static_cast<float>(sum / (samples * samples));
    }
  }
  sunfall::LayerWriter writer(folder, spec, frame);
  writer.write({0, 0, frame.columns, frame.rows}, grid.values().data());
  writer.finish();
}

sunfall::LayerSpec layer(const std::string& file_name, const std::string& description) {
  sunfall::LayerSpec spec;
  spec.file_name = file_name;
  spec.description = description;
  spec.unit = "m";
  spec.quantum = 1.0 / 64.0;
  spec.provenance = {{"ORIGIN", "invented: an invented farm, made by make_alder_reach"}};
  return spec;
}

void write_plots(const std::filesystem::path& file, const sunfall::GridFrame& frame) {
  std::vector<sunfall::Plot> plots;
  sunfall::PlotColumn names{"name", {}, {}};
  for (const FarmPlot& plot : farm_plots()) {
    std::vector<sunfall::MapPoint> ring;
    for (const Point& corner : plot.outline) ring.push_back({kWest_m + corner.x, kSouth_m + corner.y});
    plots.push_back({plot.id, plot.crop, {ring}, 0.0});
    names.texts.push_back(plot.name);
  }
  sunfall::write_plots_gpkg(file, plots, {names}, frame);
}

void make_farm(const std::filesystem::path& folder) {
  sunfall::start_geo();
  std::filesystem::create_directories(folder);
  const sunfall::GridFrame farm = frame({0, 0}, 720, 600, 1.0);
  const sunfall::GridFrame county = frame({-3650, -3700}, 320, 320, 25.0);
  const std::vector<Solid> solids = farm_solids();
  write_heights(folder, layer("ground.tif", "Height of the bare ground"), farm, 1, ground_height);
  write_heights(folder, layer("surface.tif", "Height of the top of everything solid"), farm, 1,
                [&](Point point) { return surface_height(point, solids); });
  write_heights(folder, layer("county.tif", "Height of the ground around the farm"), county, 5,
                ground_height);
  write_plots(folder / "plots.gpkg", farm);
}

}  // namespace

int main(int count, char** arguments) {
  if (count != 2) {
    fmt::print(stderr, "usage: make_alder_reach FOLDER\n");
    return 2;
  }
  try {
    make_farm(arguments[1]);
    fmt::print("wrote ground.tif, surface.tif, county.tif and plots.gpkg to {}\n", arguments[1]);
    return 0;
  } catch (const sunfall::Error& error) {
    fmt::print(stderr, "make_alder_reach: {}\n", error.what());
    return sunfall::exit_status(error.kind());
  }
}

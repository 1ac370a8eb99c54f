#include "map/map_run.h"

#include "geo/geodesy.h"
#include "geo/layer_writer.h"

namespace sunfall::testing {

SceneOptions centred(SceneOptions options, int epsg, double longitude_deg, double latitude_deg) {
  start_geo();
  options.epsg = epsg;
  GridFrame frame;
  frame.crs_wkt = crs_wkt_of_epsg(epsg);
  const MapPoint middle = map_point(frame, Angle::degrees(longitude_deg), Angle::degrees(latitude_deg));
  options.west = middle.east - 0.5 * options.columns * options.cell_m;
  options.north = middle.north + 0.5 * options.rows * options.cell_m;
  return options;
}

Plan clear_plan(const Scene& scene, const SceneOptions& options, int year) {
  Plan plan;
  plan.name = "invented ground";
  plan.site.ground = scene.ground_file();
  if (std::filesystem::exists(scene.surface_file())) plan.site.surface = scene.surface_file();
  plan.site.receiver_height_m = options.receiver_height_m;
  plan.site.clock = Clock::parse("+00:00", "test");
  plan.light = ClearSource{};
  plan.light_options.year = year;
  plan.periods = month_periods();
  plan.dome.quality = DomeQuality::draft;
  return plan;
}

PlanLight light_of_plan(const Plan& plan) {
  PlanLight light{open_site(plan), {}};
  light.dome = dome_light_of(plan, light.site);
  return light;
}

MapRun::MapRun(const Plan& plan, const PlanLight& light, const MapOptions& options)
    : folder_(fresh_folder()) {
  SilentProgress quiet;
  result_ = make_maps(plan, light.dome, provenance_of(plan, light.site), folder_, options, quiet);
}

MapRun::~MapRun() {
  std::error_code ignored;
  std::filesystem::remove_all(folder_, ignored);
}

Grid<float> MapRun::layer(const std::string& file_name) const {
  return read_layer(folder_ / file_name, {0, 0, result_.frame.columns, result_.frame.rows});
}

TileShares whole_shares(const Scene& scene, const DomeLight& light, ReceiverPlane plane) {
  const GridFrame& frame = scene.terrain().frame();
  const TileSolver solver(scene.terrain(), light, plane);
  return solver.solve(scene.terrain().tile({0, 0, frame.columns, frame.rows}),
                      geo_place(frame, frame.middle()).convergence);
}

}  // namespace sunfall::testing

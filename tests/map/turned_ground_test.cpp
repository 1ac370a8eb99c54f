// What must not change when the ground is turned, mirrored or laid into another CRS.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "geo/geodesy.h"
#include "map/map_run.h"
#include "shade/rough_ground.h"

namespace sunfall::testing {
namespace {

constexpr int kSide = 120;
constexpr double kCell_m = 3.0;
constexpr double kWithin = 0.005;

// A smooth canyon along an azimuth: 40 m of floor, walls that rise 60 m within 80 m. Linear between
// 3 m cells it errs by at most 3²/8 of its curvature, 0.06 m, seen from the middle below 0.05 degrees.
Height canyon(double grid_azimuth_deg) {
  const Angle a = Angle::degrees(grid_azimuth_deg);
  return [=](double east, double north) {
    const double beside = std::abs((east - 0.5 * kCell_m) * cos(a) - (north + 0.5 * kCell_m) * sin(a));
    const double t = std::clamp((beside - 20.0) / 80.0, 0.0, 1.0);
    return 60.0 * t * t * (3.0 - 2.0 * t);
  };
}

struct CanyonPlace {
  int epsg;
  double longitude_deg;
  double latitude_deg;
};

// Beam share of a month in the canyon's middle, through the whole job.
double beam_share(const CanyonPlace& place, double grid_azimuth_deg, const char* month) {
  SceneOptions options;
  options.columns = options.rows = kSide;
  options.cell_m = kCell_m;
  options = centred(options, place.epsg, place.longitude_deg, place.latitude_deg);
  Scene scene(canyon(grid_azimuth_deg), {}, options);
  Plan plan = clear_plan(scene, options);
  plan.dome.sky = SkyModel::isotropic;
  plan.output.shares = true;
  const PlanLight light = light_of_plan(plan);
  const MapRun run(plan, light);
  return run.layer(std::string("share-beam-") + month + ".tif").at(kSide / 2, kSide / 2);
}

double convergence_deg(const CanyonPlace& place) {
  SceneOptions options = centred({}, place.epsg, place.longitude_deg, place.latitude_deg);
  GridFrame frame;
  frame.columns = options.columns;
  frame.rows = options.rows;
  frame.west = options.west;
  frame.north = options.north;
  frame.crs_wkt = crs_wkt_of_epsg(place.epsg);
  return geo_place(frame, frame.middle()).convergence.degrees();
}

// On the transverse Mercator tan γ = tan Δλ · sin φ (textbook formula for the sphere, from memory; the
// ellipsoid adds 0.002 degrees here), γ the bearing of grid north.
double textbook_convergence_deg(double from_meridian_deg, double latitude_deg) {
  return std::atan(tan(Angle::degrees(from_meridian_deg)) * sin(Angle::degrees(latitude_deg))) * 180.0 /
         std::numbers::pi;
}

// A canyon along the same true azimuth gets the same winter sun in a CRS whose north is true (on its
// central meridian) and where its north is three degrees off. Two cuts of the canyon into cells differ
// by 0.05 degrees of horizon, in a share that changes by 3 % a degree: 0.2 %, and the layers' rounding.
void same_in_both(const CanyonPlace& straight, const CanyonPlace& askew, double true_azimuth_deg,
                  const char* winter) {
  const double gamma =
      textbook_convergence_deg(askew.longitude_deg - straight.longitude_deg, askew.latitude_deg);
  EXPECT_NEAR(std::abs(gamma), 3.0, 0.05);
  EXPECT_NEAR(convergence_deg(straight), 0.0, 0.01);
  EXPECT_NEAR(convergence_deg(askew), gamma, 0.01);
  const double expected = beam_share(straight, true_azimuth_deg, winter);
  const double found = beam_share(askew, true_azimuth_deg - gamma, winter);
  const double unturned = beam_share(askew, true_azimuth_deg, winter);
  EXPECT_NEAR(found, expected, kWithin) << "convergence " << gamma;
  EXPECT_GT(std::abs(unturned - expected), 4.0 * kWithin) << "the canyon must notice three degrees";
}

TEST(TrueNorth, CanyonInTheNorth) { same_in_both({25831, 3.0, 52.0}, {25831, 6.80, 52.0}, 165.0, "12"); }
TEST(TrueNorth, CanyonInTheSouth) { same_in_both({32725, -33.0, -34.0}, {32725, -38.35, -34.0}, 75.0, "06"); }

}  // namespace
}  // namespace sunfall::testing

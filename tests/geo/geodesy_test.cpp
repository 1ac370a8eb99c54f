// Places on the globe and the bearing of grid north, against closed forms and PROJ's own factors.

#include "geo/geodesy.h"

#include <gmock/gmock.h>
#include <proj.h>

#include <cmath>
#include <thread>

#include "geo/geo_support.h"

namespace sunfall::test {
namespace {

constexpr double kPi = std::numbers::pi;
constexpr double kRadian = kPi / 180.0;

GridFrame frame_of(const std::string& crs) { return {1, 1, 0.0, 0.0, 1.0, wkt(crs)}; }

GeoPlace place_at(const std::string& crs, double longitude_deg, double latitude_deg) {
  const GridFrame frame = frame_of(crs);
  return geo_place(frame, map_point(frame, Angle::degrees(longitude_deg), Angle::degrees(latitude_deg)));
}

// Convergence of the transverse Mercator projection of an ellipsoid as a series in the distance
// from the central meridian (Redfearn 1948; Thomas 1952). From memory; agrees with PROJ below.
// The first term left out is below 1e-10 for 3 degrees.
double transverse_mercator_convergence(double longitude_offset, double latitude) {
  constexpr double second_e2 = 0.00673949674228;  // WGS84
  const double c = std::cos(latitude);
  const double eta2 = second_e2 * c * c;
  const double t = std::tan(latitude);
  const double l2c2 = longitude_offset * longitude_offset * c * c;
  return longitude_offset * std::sin(latitude) *
         (1.0 + l2c2 / 3.0 * (1.0 + 3.0 * eta2 + 2.0 * eta2 * eta2) + l2c2 * l2c2 / 15.0 * (2.0 - t * t));
}

struct Spot {
  const char* crs;
  double central_meridian_deg;
  double longitude_deg;
  double latitude_deg;
};

TEST(Geodesy, ConvergenceOfUtmAgreesWithTheSeries) {
  for (const Spot& spot : {Spot{"EPSG:32631", 3, 5.6654, 51.9692}, Spot{"EPSG:32631", 3, 1.0, 45.0},
                           Spot{"EPSG:32760", 177, 174.7648, -36.8767}, Spot{"EPSG:32719", -69, -68.3, -54.8},
                           Spot{"EPSG:32633", 15, 15.0, 69.6}, Spot{"EPSG:32637", 39, 36.8, -1.3}}) {
    const GeoPlace place = place_at(spot.crs, spot.longitude_deg, spot.latitude_deg);
    const double offset = (spot.longitude_deg - spot.central_meridian_deg) * kRadian;
    const double latitude = spot.latitude_deg * kRadian;
    EXPECT_NEAR(place.convergence.radians(), transverse_mercator_convergence(offset, latitude), 1e-8)
        << spot.crs << ' ' << spot.longitude_deg;
    // On a sphere it is exact in closed form; the ellipsoid adds at most eta² of its cubic term:
    // 0.0067 × 0.052³ = 1e-6.
    EXPECT_NEAR(place.convergence.radians(), std::atan(std::tan(offset) * std::sin(latitude)), 1e-6);
  }
}

// East of the central meridian and north of the equator, grid north points east of true north.
TEST(Geodesy, ConvergenceHasTheRightSign) {
  EXPECT_GT(place_at("EPSG:32631", 5.0, 50.0).convergence.degrees(), 1.0);
  EXPECT_LT(place_at("EPSG:32631", 1.0, 50.0).convergence.degrees(), -1.0);
  EXPECT_LT(place_at("EPSG:32731", 5.0, -50.0).convergence.degrees(), -1.0);
  // And so a wall due true north of us stands at a smaller azimuth on the grid.
  const Angle convergence = place_at("EPSG:32631", 5.0, 50.0).convergence;
  EXPECT_NEAR(to_grid({Angle::degrees(90.0)}, convergence).from_grid_north.degrees(),
              90.0 - convergence.degrees(), 1e-12);
}

// Lambert-93: the cone's constant n = 0.7256077650 (IGN, NTG 71); its convergence is n times the
// longitude from 3 degrees east.
TEST(Geodesy, ConvergenceOfAConicMap) {
  const GeoPlace place = place_at("EPSG:2154", 7.75, 48.58);
  EXPECT_NEAR(place.convergence.degrees(), 0.7256077650 * 4.75, 1e-6);
}

// Polar stereographic: convergence is the longitude from the map's central meridian, with its sign
// turned in the south.
TEST(Geodesy, ConvergenceNearThePoles) {
  EXPECT_NEAR(place_at("EPSG:3413", 15.6, 78.2).convergence.degrees(), 60.6, 1e-6);
  EXPECT_NEAR(place_at("EPSG:3031", 166.7, -77.8).convergence.degrees(), -166.7, 1e-6);
}

TEST(Geodesy, MercatorHasNoConvergence) {
  const GeoPlace place = place_at("EPSG:3395", 20.0, 60.0);
  EXPECT_NEAR(place.convergence.degrees(), 0.0, 1e-9);
  // Its scale is the radius of the equator over that of the parallel.
  const double sine = std::sin(60.0 * kRadian);
  const double expected = std::sqrt(1.0 - 6.69437999014e-3 * sine * sine) / std::cos(60.0 * kRadian);
  EXPECT_NEAR(place.scale, expected, 1e-8);
}

TEST(Geodesy, ScaleOfUtmOnItsCentralMeridian) {
  EXPECT_NEAR(place_at("EPSG:32631", 3.0, 52.0).scale, 0.9996, 1e-9);
}

// A second opinion from PROJ's own analytic factors. They are asked of the bare projections: of
// CRS whose axes run north first, as EPSG:3035 and EPSG:2193 do, proj_factors of PROJ 9.1.1 answers
// as if they ran east first.
TEST(Geodesy, AgreesWithProjFactors) {
  PJ_CONTEXT* context = proj_context_create();
  const struct {
    const char* crs;
    const char* projection;
    double longitude_deg;
    double latitude_deg;
  } spots[] = {
      {"EPSG:32631", "+proj=utm +zone=31 +ellps=WGS84", 5.9, 51.9},
      {"EPSG:3035", "+proj=laea +lat_0=52 +lon_0=10 +x_0=4321000 +y_0=3210000 +ellps=GRS80", 24.0, 60.0},
      {"EPSG:2193", "+proj=tmerc +lat_0=0 +lon_0=173 +k=0.9996 +x_0=1600000 +y_0=10000000 +ellps=GRS80",
       175.0, -37.0},
      {"EPSG:3577", "+proj=aea +lat_1=-18 +lat_2=-36 +lat_0=0 +lon_0=132 +ellps=GRS80", 150.0, -30.0},
  };
  for (const auto& spot : spots) {
    PJ* projection = proj_create(context, spot.projection);
    const PJ_FACTORS factors =
        proj_factors(projection, proj_coord(spot.longitude_deg * kRadian, spot.latitude_deg * kRadian, 0, 0));
    const GeoPlace place = place_at(spot.crs, spot.longitude_deg, spot.latitude_deg);
    // GDA94 lies within 2 m of WGS84 here, which turns the meridian by less than 1e-6.
    const double tolerance = std::string(spot.crs) == "EPSG:3577" ? 1e-6 : 1e-8;
    EXPECT_NEAR(place.convergence.radians(), factors.meridian_convergence, tolerance) << spot.crs;
    EXPECT_NEAR(place.scale, std::sqrt(factors.areal_scale), tolerance) << spot.crs;
    proj_destroy(projection);
  }
  proj_context_destroy(context);
}

// Old French maps count from Paris in grads: true north must not depend on that.
TEST(Geodesy, AnotherPrimeMeridianAndUnitOfAngle) {
  const GeoPlace place = place_at("EPSG:27572", 2.33722917, 46.8);
  EXPECT_NEAR(place.convergence.degrees(), 0.0, 0.002);
  EXPECT_NEAR(place.place.longitude.degrees(), 2.33722917, 1e-6);
}

TEST(Geodesy, AxesAreEastThenNorthWhateverTheAuthoritySays) {
  const MapPoint point = map_point(frame_of("EPSG:2193"), Angle::degrees(174.7648), Angle::degrees(-36.8767));
  EXPECT_NEAR(point.east, 1757285.17, 0.01);  // cs2cs of PROJ 9.1.1
  EXPECT_NEAR(point.north, 5917351.67, 0.01);
}

TEST(Geodesy, ThereAndBack) {
  for (const Spot& spot : {Spot{"EPSG:32760", 0, 179.9999, -17.0}, Spot{"EPSG:32701", 0, -179.9999, -17.0},
                           Spot{"EPSG:3832", 0, -179.5, 10.0}, Spot{"EPSG:3413", 0, 180.0, 85.0},
                           Spot{"EPSG:32725", 0, -34.87, -8.0}, Spot{"EPSG:5041", 0, 0.0, 89.9}}) {
    const GeoPlace place = place_at(spot.crs, spot.longitude_deg, spot.latitude_deg);
    EXPECT_NEAR(std::remainder(place.place.longitude.degrees() - spot.longitude_deg, 360.0), 0.0, 1e-9)
        << spot.crs;
    EXPECT_LE(std::abs(place.place.longitude.degrees()), 180.0);
    EXPECT_NEAR(place.place.latitude.degrees(), spot.latitude_deg, 1e-9) << spot.crs;
  }
}

TEST(Geodesy, PointsOffTheMapAreRefused) {
  const GridFrame frame = frame_of("EPSG:32631");
  for (const MapPoint point : {MapPoint{1e9, 5e6}, MapPoint{5e5, 1e8}, MapPoint{NAN, 5e6}}) {
    const Error::Parts parts = refusal(ErrorKind::data, [&] { geo_place(frame, point); });
    EXPECT_THAT(parts.found, testing::HasSubstr("EPSG:32631"));
  }
  // At the pole itself there is no true north.
  refusal(ErrorKind::data, [] { geo_place(frame_of("EPSG:5041"), {2000000.0, 2000000.0}); });
  GridFrame broken = frame;
  broken.crs_wkt = "PROJCRS[nonsense";
  refusal(ErrorKind::data, [&] { geo_place(broken, {5e5, 5e6}); });
}

TEST(Geodesy, NamesForPeople) {
  EXPECT_EQ(crs_name(frame_of("EPSG:25831")), "EPSG:25831");
  EXPECT_EQ(crs_name(GridFrame{}), "a local plane");
  EXPECT_EQ(crs_name(frame_of("+proj=utm +zone=31 +ellps=GRS80 +type=crs")), "'unknown'");
}

TEST(Geodesy, FromManyThreads) {
  const GeoPlace expected = place_at("EPSG:32631", 5.0, 50.0);
  std::vector<std::thread> threads;
  std::vector<double> found(4);
  for (std::size_t i = 0; i < found.size(); ++i) {
    threads.emplace_back([&found, i] { found[i] = place_at("EPSG:32631", 5.0, 50.0).convergence.radians(); });
  }
  for (std::thread& thread : threads) thread.join();
  for (const double value : found) EXPECT_EQ(value, expected.convergence.radians());
}

}  // namespace
}  // namespace sunfall::test

#include "geo/geodesy.h"

#include <proj.h>

#include <cmath>
#include <memory>
#include <numbers>

#include <fmt/format.h>

#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

struct DestroyPj {
  void operator()(PJ* pj) const { proj_destroy(pj); }
};
using Pj = std::unique_ptr<PJ, DestroyPj>;

[[noreturn]] void refuse(const std::string& what, const std::string& found) {
  throw Error(ErrorKind::data,
              {what, "CRS", found, "Use a projected CRS made for this region, such as its UTM zone"});
}

struct DestroyContext {
  void operator()(PJ_CONTEXT* context) const { proj_context_destroy(context); }
};

// PROJ's contexts must not be shared by threads, so each has one, with the transformation that it
// used last: finding one takes some ten milliseconds.
struct ThreadProj {
  std::unique_ptr<PJ_CONTEXT, DestroyContext> context{proj_context_create()};
  std::string map_wkt;
  Pj globe_to_map;

  ThreadProj() {
    proj_context_set_enable_network(context.get(), 0);
    proj_log_level(context.get(), PJ_LOG_NONE);
  }
};

Pj make_globe_to_map(PJ_CONTEXT* context, const GridFrame& frame) {
  const Pj map(proj_create(context, frame.crs_wkt.c_str()));
  const Pj globe(proj_create(context, "EPSG:4326"));
  if (!map || !globe)
    refuse("the coordinate reference system cannot be understood", frame.crs_wkt.substr(0, 80));
  const Pj raw(proj_create_crs_to_crs_from_pj(context, globe.get(), map.get(), nullptr, nullptr));
  Pj ordered(raw ? proj_normalize_for_visualization(context, raw.get()) : nullptr);
  if (!ordered) refuse("no way is known between the map and the globe", crs_name(frame));
  return ordered;
}

// From longitude and latitude on WGS84, in degrees, to the map. Owned by this thread.
PJ* globe_to_map(const GridFrame& frame) {
  thread_local ThreadProj own;
  if (!own.globe_to_map || own.map_wkt != frame.crs_wkt) {
    own.globe_to_map = make_globe_to_map(own.context.get(), frame);
    own.map_wkt = frame.crs_wkt;
  }
  return own.globe_to_map.get();
}

bool is_finite(const PJ_COORD& point) { return std::isfinite(point.xy.x) && std::isfinite(point.xy.y); }

std::string point_text(MapPoint point) { return fmt::format("{} east, {} north", point.east, point.north); }

struct MapSlope {
  double east_m_per_m = 0.0;
  double north_m_per_m = 0.0;
};

// How the map moves per metre on the ellipsoid, from a point towards true north and towards east.
// Central differences over 2e-4 degrees (about 22 m): the third-order term is below 1e-10 and so
// is the rounding of map coordinates, 1e-9 m over 22 m. Taken through the very transformation that
// carries points, it holds for every projection, prime meridian and datum.
struct LocalMap {
  MapSlope northward;
  MapSlope eastward;
};

LocalMap local_map(PJ* to_map, double longitude_deg, double latitude_deg) {
  constexpr double step_deg = 1e-4;
  constexpr double equator_m = 6378137.0;  // WGS84
  constexpr double e2 = 6.69437999014e-3;  // WGS84, first eccentricity squared
  constexpr double radian = std::numbers::pi / 180.0;
  const double sine = std::sin(latitude_deg * radian);
  const double w = std::sqrt(1.0 - e2 * sine * sine);
  const double north_radius_m = equator_m * (1.0 - e2) / (w * w * w);
  const double east_radius_m = equator_m / w * std::cos(latitude_deg * radian);
  const auto at = [&](double longitude, double latitude) {
    return proj_trans(to_map, PJ_FWD, proj_coord(longitude, latitude, 0.0, 0.0)).xy;
  };
  const PJ_XY n = at(longitude_deg, latitude_deg + step_deg);
  const PJ_XY s = at(longitude_deg, latitude_deg - step_deg);
  const PJ_XY e = at(longitude_deg + step_deg, latitude_deg);
  const PJ_XY w_point = at(longitude_deg - step_deg, latitude_deg);
  const double north_m = 2.0 * step_deg * radian * north_radius_m;
  const double east_m = 2.0 * step_deg * radian * east_radius_m;
  return {{(n.x - s.x) / north_m, (n.y - s.y) / north_m},
          {(e.x - w_point.x) / east_m, (e.y - w_point.y) / east_m}};
}

}  // namespace

GeoPlace geo_place(const GridFrame& frame, MapPoint point) {
  PJ* to_map = globe_to_map(frame);
  const PJ_COORD globe = proj_trans(to_map, PJ_INV, proj_coord(point.east, point.north, 0.0, 0.0));
  if (!is_finite(globe) || std::abs(globe.xy.y) > 90.0) {
    refuse("the point has no longitude and latitude", point_text(point) + " in " + crs_name(frame));
  }
  const double longitude_deg = globe.xy.x;
  const double latitude_deg = globe.xy.y;
  // Far outside its region a projection may answer with a place that does not lead back.
  const PJ_COORD back = proj_trans(to_map, PJ_FWD, globe);
  if (!is_finite(back) || std::hypot(back.xy.x - point.east, back.xy.y - point.north) > 1.0) {
    refuse("the point lies outside the region of its CRS", point_text(point) + " in " + crs_name(frame));
  }
  const LocalMap local = local_map(to_map, longitude_deg, latitude_deg);
  const double area = std::abs(local.eastward.east_m_per_m * local.northward.north_m_per_m -
                               local.eastward.north_m_per_m * local.northward.east_m_per_m);
  GeoPlace place;
  place.place.longitude = Angle::degrees(std::remainder(longitude_deg, 360.0));
  place.place.latitude = Angle::degrees(latitude_deg);
  // True north lies at this bearing on the map; grid north lies as far on its other side.
  place.convergence =
      -Angle::radians(std::atan2(local.northward.east_m_per_m, local.northward.north_m_per_m));
  place.scale = std::sqrt(area);
  if (!std::isfinite(place.convergence.radians()) || !std::isfinite(place.scale)) {
    refuse("true north cannot be told here", point_text(point) + " in " + crs_name(frame));
  }
  return place;
}

MapPoint map_point(const GridFrame& frame, Angle longitude, Angle latitude) {
  PJ* to_map = globe_to_map(frame);
  const PJ_COORD map =
      proj_trans(to_map, PJ_FWD, proj_coord(longitude.degrees(), latitude.degrees(), 0.0, 0.0));
  if (!is_finite(map)) {
    refuse("the place is not on the map", fmt::format("longitude {}, latitude {} in {}", longitude.degrees(),
                                                      latitude.degrees(), crs_name(frame)));
  }
  return {map.xy.x, map.xy.y};
}

std::string crs_wkt_of_epsg(int code) {
  GdalGuard guard;
  OGRSpatialReference crs;
  if (crs.importFromEPSG(code) != OGRERR_NONE) {
    guard.fail(ErrorKind::data, "there is no such coordinate reference system",
               "EPSG:" + std::to_string(code), "");
  }
  return wkt_of(crs);
}

std::string crs_name(const GridFrame& frame) {
  if (frame.crs_wkt.empty()) return "a local plane";
  return crs_label(crs_from_wkt(frame.crs_wkt));
}

}  // namespace sunfall

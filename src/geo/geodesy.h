#pragma once
// From map coordinates to the globe.

#include "sunfall/angle.h"
#include "sunfall/grid.h"
#include "sunfall/sun.h"

namespace sunfall {

struct GeoPlace {
  Place place;         // WGS84; height left at 0
  Angle convergence;   // bearing of grid north from true north, clockwise positive
  double scale = 1.0;  // point scale of the map: map metres per metre on the ellipsoid
};

// Throws Error(data) where the point has no longitude and latitude in this CRS.
GeoPlace geo_place(const GridFrame& frame, MapPoint point);

// The other way, from longitude and latitude to the map.
MapPoint map_point(const GridFrame& frame, Angle longitude, Angle latitude);

// The CRS of an EPSG code, for frames that are made and not read. Throws Error(data).
std::string crs_wkt_of_epsg(int code);

// "EPSG:25831" or the CRS's name, for people.
std::string crs_name(const GridFrame& frame);

}  // namespace sunfall

#pragma once
// Coordinate reference systems: parsing, names for people, comparison, transformation. Private to geo.

#include <ogr_spatialref.h>

#include <memory>
#include <string>

#include "sunfall/grid.h"

namespace sunfall {

// East first, then north, whatever the authority says.
OGRSpatialReference crs_from_wkt(const std::string& wkt);

// The plane part only: light is mapped on the ground's plane, and a height part would make PROJ
// shift heights.
OGRSpatialReference plane_part(const OGRSpatialReference& crs);
std::string wkt_of(const OGRSpatialReference& crs);

// "EPSG:25831" where the CRS carries its code, else its name in quotes.
std::string crs_label(const OGRSpatialReference& crs);
// What `gdalwarp -t_srs` takes to get this CRS: its code, else the CRS of the named file.
std::string crs_argument(const OGRSpatialReference& crs, const std::string& file_with_crs);
bool same_crs(const OGRSpatialReference& one, const OGRSpatialReference& other);

// The code of the UTM zone (or polar stereographic CRS) around a longitude and latitude in degrees.
std::string utm_code(double longitude_deg, double latitude_deg);

using Transformation = std::unique_ptr<OGRCoordinateTransformation>;
// One per thread. Throws Error(data) where PROJ knows no way between the two.
Transformation transformation(const OGRSpatialReference& from, const OGRSpatialReference& to,
                              const std::string& where);

}  // namespace sunfall

#include "geo/crs.h"

#include <cpl_conv.h>

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

#include "geo/gdal_guard.h"

namespace sunfall {

OGRSpatialReference crs_from_wkt(const std::string& wkt) {
  GdalGuard guard;
  OGRSpatialReference crs;
  if (crs.importFromWkt(wkt.c_str()) != OGRERR_NONE) {
    guard.fail(ErrorKind::data, "the coordinate reference system cannot be understood", "CRS", "");
  }
  crs.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
  return crs;
}

OGRSpatialReference plane_part(const OGRSpatialReference& crs) {
  OGRSpatialReference plane(crs);
  if (plane.IsCompound()) plane.StripVertical();
  plane.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
  return plane;
}

std::string wkt_of(const OGRSpatialReference& crs) {
  const char* const options[] = {"FORMAT=WKT2_2019", nullptr};
  char* text = nullptr;
  crs.exportToWkt(&text, options);
  std::string wkt = text != nullptr ? text : "";
  CPLFree(text);
  return wkt;
}

namespace {

std::string authority_code(const OGRSpatialReference& crs) {
  const char* authority = crs.GetAuthorityName(nullptr);
  const char* code = crs.GetAuthorityCode(nullptr);
  if (authority == nullptr || code == nullptr) return {};
  return fmt::format("{}:{}", authority, code);
}

}  // namespace

std::string crs_label(const OGRSpatialReference& crs) {
  const std::string code = authority_code(crs);
  if (!code.empty()) return code;
  const char* name = crs.GetName();
  return fmt::format("'{}'", name != nullptr ? name : "unnamed");
}

std::string crs_argument(const OGRSpatialReference& crs, const std::string& file_with_crs) {
  const std::string code = authority_code(crs);
  if (!code.empty()) return code;
  return fmt::format("\"$(gdalsrsinfo -o wkt2 {})\"", file_with_crs);
}

bool same_crs(const OGRSpatialReference& one, const OGRSpatialReference& other) {
  const char* const options[] = {"CRITERION=EQUIVALENT", "IGNORE_DATA_AXIS_TO_SRS_AXIS_MAPPING=YES", nullptr};
  return one.IsSame(&other, options) != 0;
}

std::string utm_code(double longitude_deg, double latitude_deg) {
  // UTM is defined from 80 S to 84 N; beyond lie the two polar stereographic systems.
  if (latitude_deg > 84.0) return "EPSG:5041";
  if (latitude_deg < -80.0) return "EPSG:5042";
  const double turned = longitude_deg - 360.0 * std::floor((longitude_deg + 180.0) / 360.0);
  const int zone = std::clamp(static_cast<int>(std::floor((turned + 180.0) / 6.0)) + 1, 1, 60);
  return fmt::format("EPSG:{}", (latitude_deg < 0.0 ? 32700 : 32600) + zone);
}

Transformation transformation(const OGRSpatialReference& from, const OGRSpatialReference& to,
                              const std::string& where) {
  GdalGuard guard;
  Transformation result(OGRCreateCoordinateTransformation(&from, &to));
  if (!result) {
    guard.fail(ErrorKind::data, fmt::format("no way is known from {} to {}", crs_label(from), crs_label(to)),
               where, "Give it a coordinate reference system with a code, such as a UTM zone");
  }
  return result;
}

}  // namespace sunfall

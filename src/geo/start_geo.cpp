// What GDAL may do in this process. A raster or plan from a stranger must not reach the network or
// other files: a driver that is not registered cannot be fooled, and the settings below close the
// ways that remain (auxiliary .aux.xml and .ovr files, folder listings, remote file systems).

#include <cpl_conv.h>
#include <cpl_http.h>
#include <gdal.h>
#include <gdal_frmts.h>
#include <ogr_srs_api.h>
#include <ogrsf_frmts.h>
#include <proj.h>

#include <csignal>
#include <mutex>
#include <string>

#include <fmt/format.h>

#include "geo/layer_writer.h"

namespace sunfall {
namespace {

constexpr const char* kBlockCacheMegabytes = "256";

// GeoJSON may name its CRS by a link that GDAL would fetch. Nothing is ever fetched.
CPLHTTPResult* refuse_request(const char* url, CSLConstList, GDALProgressFunc, void*, CPLHTTPFetchWriteFunc,
                              void*, void*) {
  auto* result = static_cast<CPLHTTPResult*>(CPLCalloc(1, sizeof(CPLHTTPResult)));
  result->nStatus = 1;
  result->pszErrBuf = CPLStrdup(fmt::format("network use is switched off ({})", url).c_str());
  return result;
}

void close_side_doors() {
  CPLSetConfigOption("GDAL_PAM_ENABLED", "NO");
  CPLSetConfigOption("GDAL_DISABLE_READDIR_ON_OPEN", "EMPTY_DIR");
  CPLSetConfigOption("CPL_VSIL_CURL_ALLOWED_FILENAME", "none-is-allowed");
  CPLSetConfigOption("GDAL_CACHEMAX", kBlockCacheMegabytes);
  // Worker threads would report errors past the guard of the thread that asked.
  CPLSetConfigOption("GDAL_NUM_THREADS", "1");
  // Overviews wait in a temporary file while a COG is made; compressing that is time lost.
  CPLSetConfigOption("COG_TMP_COMPRESSION", "NONE");
  CPLHTTPSetFetchCallback(refuse_request, nullptr);
  OSRSetPROJEnableNetwork(0);
}

void register_drivers() {
  GDALRegister_GTiff();
  GDALRegister_COG();
  GDALRegister_MEM();
  GDALRegister_AAIGrid();
  RegisterOGRGeoPackage();
  RegisterOGRShape();
  RegisterOGRGeoJSON();
  RegisterOGRFlatGeobuf();
  // Gridded weather; opened for that alone (point_series.h).
  GDALRegister_netCDF();
  GDALRegister_GRIB();
}

// A file-size limit should arrive as a failed write, which has a message, not as a signal that
// ends the process. Whoever set a handler keeps it.
void let_size_limits_fail_as_writes() {
  const auto previous = std::signal(SIGXFSZ, SIG_IGN);
  if (previous != SIG_DFL && previous != SIG_ERR) std::signal(SIGXFSZ, previous);
}

}  // namespace

void start_geo() {
  static std::once_flag once;
  std::call_once(once, [] {
    close_side_doors();
    register_drivers();
    let_size_limits_fail_as_writes();
  });
}

std::string geo_versions() {
  PJ_CONTEXT* context = proj_context_create();
  const char* database = proj_context_get_database_metadata(context, "EPSG.VERSION");
  std::string versions = fmt::format("GDAL {}, PROJ {} (database {})", GDALVersionInfo("RELEASE_NAME"),
                                     proj_info().version, database != nullptr ? database : "unknown");
  proj_context_destroy(context);
  return versions;
}

}  // namespace sunfall

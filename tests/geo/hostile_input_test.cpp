// Files from strangers may be refused, never obeyed: no other file is read, no network is used,
// no memory is spent on a header's word.

#include <arpa/inet.h>
#include <gmock/gmock.h>
#include <netinet/in.h>
#include <sys/socket.h>
#include <unistd.h>

#include <cmath>
#include <cstring>

#include <fmt/format.h>

#include "geo/geo_support.h"
#include "geo/layer_writer.h"
#include "geo/plots.h"
#include "geo/raster_source.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

Error::Parts refused(const std::filesystem::path& file) {
  return refusal(ErrorKind::data, [&] {
    const auto source = RasterSource::open(file, "ground");
    source.read({0, 0, 1, 1});
  });
}

TEST(HostileInput, RemoteAndSpecialPathsAreNotTaken) {
  for (const char* path : {"/vsicurl/http://127.0.0.1:9/a.tif", "/vsimem/a.tif", "/vsizip/a.zip/a.tif",
                           "GTIFF_DIR:1:ground.tif", "http://127.0.0.1:9/a.tif", ""}) {
    EXPECT_FALSE(refused(path).what.empty()) << path;
  }
  EXPECT_EQ(refused("/vsimem/a.tif").what, "only plain files are read");
}

TEST(HostileInput, OtherFormatsAreNotOpened) {
  const TempFolder folder;
  make_raster(folder / "secret.tif", {});
  write_text(folder / "ground.tif",
             R"(<VRTDataset rasterXSize="4" rasterYSize="3"><VRTRasterBand dataType="Float32" band="1">)"
             R"(<SimpleSource><SourceFilename relativeToVRT="1">secret.tif</SourceFilename></SimpleSource>)"
             R"(</VRTRasterBand></VRTDataset>)");
  EXPECT_THAT(refused(folder / "ground.tif").what, HasSubstr("not a raster"));
}

TEST(HostileInput, AuxiliaryFilesAreNotObeyed) {
  const TempFolder folder;
  RasterOrder order;
  order.crs = "";
  make_raster(folder / "ground.tif", order);
  // Both would give the raster a CRS or another place, were they read.
  write_text(folder / "ground.tif.aux.xml",
             "<PAMDataset><SRS>" + std::string("EPSG:32631") +
                 "</SRS><PAMRasterBand band=\"1\"><NoDataValue>5</NoDataValue></PAMRasterBand></PAMDataset>");
  write_text(folder / "ground.tfw", "1\n0\n0\n-1\n0\n0\n");
  EXPECT_THAT(refused(folder / "ground.tif").what, HasSubstr("no coordinate reference system"));

  order.crs = "EPSG:32631";
  make_raster(folder / "ground.tif", order);
  write_text(folder / "ground.tif.aux.xml",
             "<PAMDataset><PAMRasterBand band=\"1\"><NoDataValue>5</NoDataValue><Offset>100</Offset>"
             "</PAMRasterBand></PAMDataset>");
  const auto source = RasterSource::open(folder / "ground.tif", "ground");
  EXPECT_EQ(source.frame().west, 600000.0);
  EXPECT_EQ(source.read({0, 1, 1, 1}).at(0, 0), 5.0F);
}

TEST(HostileInput, OverviewsBesideTheFileAreNotObeyed) {
  const TempFolder folder;
  RasterOrder order;
  order.columns = 64;
  order.rows = 64;
  order.values = std::vector<double>(4096, 7.0);
  make_raster(folder / "layer.tif", order);
  order.columns = 32;
  order.rows = 32;
  order.values = std::vector<double>(1024, 99.0);
  make_raster(folder / "layer.tif.ovr", order);
  for (const float value : read_preview(folder / "layer.tif", 32).values()) EXPECT_EQ(value, 7.0F);
}

TEST(HostileInput, HeadersMayNotPromiseMoreThanTheFileHolds) {
  const TempFolder folder;
  RasterOrder order;
  order.columns = 200;
  order.rows = 200;
  make_raster(folder / "ground.tif", order);
  std::filesystem::resize_file(folder / "ground.tif", 100000);
  EXPECT_THAT(refused(folder / "ground.tif").what, HasSubstr("shorter than its header says"));

  write_text(folder / "ground.asc",
             "ncols 100000\nnrows 100000\nxllcorner 0\nyllcorner 0\ncellsize 1\nNODATA_value -9999\n1 2 3\n");
  write_text(folder / "ground.prj", wkt("EPSG:32631"));
  EXPECT_THAT(refused(folder / "ground.asc").what, HasSubstr("shorter than its header says"));
}

// Compressed and sparse, this file is small whatever its header says.
TEST(HostileInput, AbsurdSizesAreRefused) {
  const TempFolder folder;
  CPLStringList options;
  for (const char* option : {"SPARSE_OK=TRUE", "COMPRESS=DEFLATE", "TILED=YES", "BLOCKXSIZE=4096",
                             "BLOCKYSIZE=4096", "BIGTIFF=YES"}) {
    options.AddString(option);
  }
  auto* driver = GetGDALDriverManager()->GetDriverByName("GTiff");
  GDALDatasetUniquePtr(
      driver->Create((folder / "ground.tif").c_str(), 1000000, 100000, 1, GDT_Float32, options.List()));
  EXPECT_THAT(refused(folder / "ground.tif").what, HasSubstr("not believable"));
}

TEST(HostileInput, BlocksTooLargeForMemoryAreRefused) {
  const TempFolder folder;
  CPLStringList options;
  for (const char* option : {"SPARSE_OK=TRUE", "COMPRESS=DEFLATE", "BLOCKYSIZE=30000"})
    options.AddString(option);
  auto* driver = GetGDALDriverManager()->GetDriverByName("GTiff");
  GDALDatasetUniquePtr(
      driver->Create((folder / "ground.tif").c_str(), 30000, 30000, 1, GDT_Float32, options.List()));
  EXPECT_THAT(refused(folder / "ground.tif").what, HasSubstr("blocks too large"));
}

// A door on this machine that counts who knocks.
class Door {
 public:
  Door() : socket_(::socket(AF_INET, SOCK_STREAM | SOCK_NONBLOCK, 0)) {
    sockaddr_in address{};
    address.sin_family = AF_INET;
    address.sin_addr.s_addr = htonl(INADDR_LOOPBACK);
    ::bind(socket_, reinterpret_cast<sockaddr*>(&address), sizeof(address));
    ::listen(socket_, 8);
    socklen_t size = sizeof(address);
    ::getsockname(socket_, reinterpret_cast<sockaddr*>(&address), &size);
    port_ = ntohs(address.sin_port);
  }
  ~Door() { ::close(socket_); }
  Door(const Door&) = delete;
  Door& operator=(const Door&) = delete;
  int port() const { return port_; }
  bool knocked() const { return ::accept(socket_, nullptr, nullptr) >= 0; }

 private:
  int socket_;
  int port_ = 0;
};

TEST(HostileInput, ACrsByLinkIsNotFetched) {
  const TempFolder folder;
  const Door door;
  write_text(
      folder / "plots.geojson",
      fmt::format(R"({{"type":"FeatureCollection","crs":{{"type":"link","properties":)"
                  R"({{"href":"http://127.0.0.1:{}/crs","type":"ogcwkt"}}}},"features":[{{"type":"Feature",)"
                  R"("properties":{{"id":"A"}},"geometry":{{"type":"Polygon","coordinates":)"
                  R"([[[4,52],[4.1,52],[4.1,52.1],[4,52]]]}}}}]}})",
                  door.port()));
  refusal(ErrorKind::data, [&] { read_plots({folder / "plots.geojson", "", "id", {}}, utm_frame(10, 10)); });
  EXPECT_FALSE(door.knocked());
}

}  // namespace
}  // namespace sunfall::test

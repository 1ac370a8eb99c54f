// Plots out: the polygons with their figures as GeoPackage.

#include <cpl_conv.h>
#include <ogrsf_frmts.h>
#include <unistd.h>

#include <cmath>
#include <memory>

#include <fmt/format.h>

#include "core/whole_file.h"
#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "geo/layer_writer.h"
#include "geo/open_dataset.h"
#include "geo/plots.h"

namespace sunfall {
namespace {

constexpr const char* kLayerName = "plots";
// GeoPackage wants the time of the last change. A fixed one keeps equal runs equal byte for byte;
// the run's own time stands in its summary.
constexpr const char* kFixedDate = "1970-01-01T00:00:00.000Z";

// Sets a GDAL option for this thread while it lives.
class ThreadOption {
 public:
  ThreadOption(const char* key, const char* value) : key_(key) { CPLSetThreadLocalConfigOption(key, value); }
  ~ThreadOption() { CPLSetThreadLocalConfigOption(key_, nullptr); }
  ThreadOption(const ThreadOption&) = delete;
  ThreadOption& operator=(const ThreadOption&) = delete;

 private:
  const char* key_;
};

// SQLite keeps a journal beside the file while it writes, and leaves it there where writing fails.
class JournalRemoval {
 public:
  explicit JournalRemoval(const std::filesystem::path& file) : journal_(file.string() + "-journal") {}
  ~JournalRemoval() { ::unlink(journal_.c_str()); }
  JournalRemoval(const JournalRemoval&) = delete;
  JournalRemoval& operator=(const JournalRemoval&) = delete;

 private:
  std::string journal_;
};

bool holds_numbers(const PlotColumn& column) { return !column.numbers.empty(); }

OGRLinearRing to_ring(const std::vector<MapPoint>& points) {
  OGRLinearRing ring;
  for (const MapPoint& point : points) ring.addPoint(point.east, point.north);
  ring.closeRings();
  return ring;
}

// Outer rings run counter-clockwise and each is followed by its holes.
OGRMultiPolygon to_polygons(const Plot& plot) {
  OGRMultiPolygon polygons;
  OGRPolygon polygon;
  const auto flush = [&] {
    if (!polygon.IsEmpty()) polygons.addGeometry(&polygon);
    polygon.empty();
  };
  for (const std::vector<MapPoint>& points : plot.rings) {
    OGRLinearRing ring = to_ring(points);
    if (ring.isClockwise() == 0) flush();
    polygon.addRing(&ring);
  }
  flush();
  return polygons;
}

class PlotsFile {
 public:
  PlotsFile(const std::filesystem::path& temporary, std::string where, const GridFrame& frame);
  void add_fields(const std::vector<PlotColumn>& columns);
  void add(const Plot& plot, const std::vector<PlotColumn>& columns, std::size_t index);
  void close();

 private:
  void check(bool good) const {
    if (!good || guard_.failed()) {
      guard_.fail(ErrorKind::io, "the plots cannot be written", where_,
                  "Make room on the disk or check its permissions");
    }
  }
  void add_field(const std::string& name, OGRFieldType type);

  std::string where_;
  GdalGuard guard_;
  ThreadOption date_{"OGR_CURRENT_DATE", kFixedDate};
  GDALDatasetUniquePtr dataset_;
  OGRLayer* layer_ = nullptr;
};

PlotsFile::PlotsFile(const std::filesystem::path& temporary, std::string where, const GridFrame& frame)
    : where_(std::move(where)) {
  auto* driver = GetGDALDriverManager()->GetDriverByName("GPKG");
  dataset_.reset(driver->Create(temporary.c_str(), 0, 0, 0, GDT_Unknown, nullptr));
  check(dataset_ != nullptr);
  OGRSpatialReference crs = crs_from_wkt(frame.crs_wkt);
  layer_ = dataset_->CreateLayer(kLayerName, &crs, wkbMultiPolygon, nullptr);
  check(layer_ != nullptr && layer_->StartTransaction() == OGRERR_NONE);
}

void PlotsFile::add_field(const std::string& name, OGRFieldType type) {
  OGRFieldDefn field(name.c_str(), type);
  check(layer_->CreateField(&field) == OGRERR_NONE);
}

void PlotsFile::add_fields(const std::vector<PlotColumn>& columns) {
  add_field("id", OFTString);
  add_field("crop", OFTString);
  for (const PlotColumn& column : columns)
    add_field(column.name, holds_numbers(column) ? OFTReal : OFTString);
}

void PlotsFile::add(const Plot& plot, const std::vector<PlotColumn>& columns, std::size_t index) {
  OGRFeature feature(layer_->GetLayerDefn());
  feature.SetField("id", plot.id.c_str());
  if (!plot.crop.empty()) feature.SetField("crop", plot.crop.c_str());
  for (const PlotColumn& column : columns) {
    const int field = feature.GetFieldIndex(column.name.c_str());
    if (!holds_numbers(column)) {
      feature.SetField(field, column.texts.at(index).c_str());
    } else if (std::isnan(column.numbers.at(index))) {
      feature.SetFieldNull(field);
    } else {
      feature.SetField(field, column.numbers.at(index));
    }
  }
  const OGRMultiPolygon polygons = to_polygons(plot);
  check(feature.SetGeometry(&polygons) == OGRERR_NONE && layer_->CreateFeature(&feature) == OGRERR_NONE);
}

void PlotsFile::close() {
  check(layer_->CommitTransaction() == OGRERR_NONE);
  dataset_.reset();
  check(true);
}

// What stands on disk must be as many plots, with the same ids and numbers.
void verify(const std::filesystem::path& temporary, const std::string& where, const std::vector<Plot>& plots,
            const std::vector<PlotColumn>& columns) {
  const GDALDatasetUniquePtr dataset = open_vector(temporary, where);
  OGRLayer* layer = dataset->GetLayerByName(kLayerName);
  bool same = layer != nullptr;
  std::size_t count = 0;
  while (same) {
    const OGRFeatureUniquePtr feature(layer->GetNextFeature());
    if (!feature) break;
    same = count < plots.size() && plots[count].id == feature->GetFieldAsString("id");
    for (const PlotColumn& column : columns) {
      if (!same || !holds_numbers(column) || std::isnan(column.numbers[count])) continue;
      same = feature->GetFieldAsDouble(column.name.c_str()) == column.numbers[count];
    }
    ++count;
  }
  if (same && count == plots.size()) return;
  throw Error(ErrorKind::io, {"the plots on disk differ from what was written", where, "", "Check the disk"});
}

}  // namespace

void write_plots_gpkg(const std::filesystem::path& file, const std::vector<Plot>& plots,
                      const std::vector<PlotColumn>& columns, const GridFrame& frame) {
  start_geo();
  WholeFile whole(file);
  const std::string where = file.string();
  const JournalRemoval journal(whole.temporary());
  // SQLite's driver wants to create its file itself.
  ::unlink(whole.temporary().c_str());
  PlotsFile out(whole.temporary(), where, frame);
  out.add_fields(columns);
  for (std::size_t i = 0; i < plots.size(); ++i) out.add(plots[i], columns, i);
  out.close();
  verify(whole.temporary(), where, plots, columns);
  whole.commit();
}

}  // namespace sunfall

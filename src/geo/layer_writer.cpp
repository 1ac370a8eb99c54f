#include "geo/layer_writer.h"

#include <cpl_string.h>
#include <gdal_priv.h>
#include <unistd.h>

#include <algorithm>
#include <cmath>
#include <utility>
#include <vector>

#include <fmt/format.h>

#include "core/whole_file.h"
#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "geo/layer_file.h"
#include "geo/layer_values.h"
#include "geo/lazy_raster.h"

namespace sunfall {
namespace {

// Rows that pass through memory at a time when a layer is read through.
constexpr int kStripRows = 512;

float rounded(float value, double quantum) {
  if (quantum <= 0.0) return value;
  return static_cast<float>(std::nearbyint(static_cast<double>(value) / quantum) * quantum);
}

struct Statistics {
  double least = HUGE_VAL;
  double most = -HUGE_VAL;
  double mean = 0.0;
  double deviation = 0.0;
  std::uint64_t valid = 0;
};

// Row by row from the top, so that the order of tiles cannot show in the last digits.
Statistics statistics_of(const LayerFile& file) {
  Statistics result;
  double sum = 0.0;
  double squares = 0.0;
  std::vector<float> strip(static_cast<std::size_t>(file.columns()) * std::min(kStripRows, file.rows()));
  // Squares are of the distance to the first value, which keeps their digits.
  double origin = 0.0;
  for (int row = 0; row < file.rows(); row += kStripRows) {
    const CellWindow window{0, row, file.columns(), std::min(kStripRows, file.rows() - row)};
    file.read(window, strip.data(), file.columns());
    const std::size_t cells = static_cast<std::size_t>(window.columns) * window.rows;
    for (std::size_t i = 0; i < cells; ++i) {
      if (strip[i] == kLayerNodata) continue;
      const double value = strip[i];
      if (result.valid++ == 0) origin = value;
      result.least = std::min(result.least, value);
      result.most = std::max(result.most, value);
      sum += value - origin;
      squares += (value - origin) * (value - origin);
    }
  }
  if (result.valid == 0) return result;
  const auto count = static_cast<double>(result.valid);
  result.mean = origin + sum / count;
  result.deviation = std::sqrt(std::max(0.0, squares / count - (sum / count) * (sum / count)));
  return result;
}

void describe(LazyRaster& raster, const LayerSpec& spec, const Statistics& statistics, std::uint64_t cells) {
  GDALRasterBand& band = *raster.GetRasterBand(1);
  band.SetDescription(spec.description.c_str());
  for (const auto& [key, value] : spec.provenance) raster.SetMetadataItem(key.c_str(), value.c_str());
  raster.SetMetadataItem(kValuesKey, spec.integers ? kClassValues : kAmountValues);
  if (spec.quantum > 0.0) raster.SetMetadataItem("ROUNDED_TO", fmt::format("{}", spec.quantum).c_str());
  if (statistics.valid == 0) return;
  const auto set = [&](const char* key, double value) {
    band.SetMetadataItem(key, fmt::format("{:.14g}", value).c_str());
  };
  set("STATISTICS_MINIMUM", statistics.least);
  set("STATISTICS_MAXIMUM", statistics.most);
  set("STATISTICS_MEAN", statistics.mean);
  set("STATISTICS_STDDEV", statistics.deviation);
  set("STATISTICS_VALID_PERCENT", 100.0 * static_cast<double>(statistics.valid) / static_cast<double>(cells));
}

CPLStringList cog_options(const LayerSpec& spec) {
  CPLStringList options;
  options.SetNameValue("COMPRESS", "DEFLATE");
  options.SetNameValue("LEVEL", "1");
  options.SetNameValue("PREDICTOR", "STANDARD");  // TIFF's predictor 2, which every reader knows
  options.SetNameValue("BLOCKSIZE", "512");
  options.SetNameValue("BIGTIFF", "IF_SAFER");
  // The default, cubic, overshoots: overviews would show light that is nowhere.
  options.SetNameValue("OVERVIEW_RESAMPLING", spec.integers ? "NEAREST" : "AVERAGE");
  options.SetNameValue("NUM_THREADS", "1");
  return options;
}

}  // namespace

struct LayerWriter::State {
  LayerSpec spec;
  GridFrame frame;
  std::filesystem::path final_path;
  std::unique_ptr<LayerFile> file;
  std::vector<float> rounded_values;

  std::string where() const { return final_path.string(); }
  void make_copy(const std::filesystem::path& copy_path) const;
  void verify_copy(const std::filesystem::path& copy_path) const;
};

void LayerWriter::State::make_copy(const std::filesystem::path& copy_path) const {
  LazyRasterSpec raster_spec;
  raster_spec.columns = frame.columns;
  raster_spec.rows = frame.rows;
  raster_spec.transform = {frame.west, frame.cell_m, 0.0, frame.north, 0.0, -frame.cell_m};
  if (!frame.crs_wkt.empty()) raster_spec.crs = crs_from_wkt(frame.crs_wkt);
  raster_spec.nodata = kLayerNodata;
  raster_spec.unit = spec.unit;
  raster_spec.read = [this](const CellWindow& window, float* values, int stride) {
    file->read(window, values, static_cast<std::size_t>(stride));
  };
  LazyRaster source(std::move(raster_spec));
  describe(source, spec, statistics_of(*file), file->written().cells());

  GdalGuard guard;
  auto* driver = GetGDALDriverManager()->GetDriverByName("COG");
  const CPLStringList options = cog_options(spec);
  GDALDatasetUniquePtr copy(
      driver->CreateCopy(copy_path.c_str(), &source, FALSE, options.List(), GDALDummyProgress, nullptr));
  source.rethrow();
  // Closing returns nothing and may be where the last blocks fail to be written.
  const bool made = copy != nullptr;
  copy.reset();
  // The driver collects overviews in a file of its own, and leaves it behind where it fails.
  for (const char* ending : {".ovr.tmp", ".msk.ovr.tmp"}) ::unlink((copy_path.string() + ending).c_str());
  if (!made || guard.failed()) {
    guard.fail(ErrorKind::io, "the layer cannot be written", where(),
               "Make room on the disk or check its limits");
  }
}

// The file on disk, decoded again, must hold exactly what was handed over.
void LayerWriter::State::verify_copy(const std::filesystem::path& copy_path) const {
  GdalGuard guard;
  const GDALDatasetUniquePtr copy = open_layer(copy_path);
  CellSum found;
  std::vector<float> strip(static_cast<std::size_t>(frame.columns) * std::min(kStripRows, frame.rows));
  for (int row = 0; row < frame.rows; row += kStripRows) {
    const int rows = std::min(kStripRows, frame.rows - row);
    if (copy->GetRasterBand(1)->RasterIO(GF_Read, 0, row, frame.columns, rows, strip.data(), frame.columns,
                                         rows, GDT_Float32, 0, 0, nullptr) != CE_None) {
      guard.fail(ErrorKind::io, "the layer cannot be read back", where(), "Check the disk");
    }
    found.add(static_cast<std::uint64_t>(row) * frame.columns, strip.data(),
              static_cast<std::size_t>(frame.columns) * rows);
  }
  if (found == file->written()) return;
  throw Error(ErrorKind::io,
              {"the layer on disk differs from what was written", where(), "", "Check the disk"});
}

LayerWriter::LayerWriter(const std::filesystem::path& folder, LayerSpec spec, const GridFrame& frame)
    : state_(std::make_unique<State>()) {
  start_geo();
  state_->spec = std::move(spec);
  state_->frame = frame;
  state_->final_path = folder / state_->spec.file_name;
  state_->file = std::make_unique<LayerFile>(state_->final_path, frame.columns, frame.rows);
}

LayerWriter::LayerWriter(LayerWriter&&) noexcept = default;
LayerWriter& LayerWriter::operator=(LayerWriter&&) noexcept = default;
LayerWriter::~LayerWriter() = default;

const LayerSpec& LayerWriter::spec() const { return state_->spec; }
const std::filesystem::path& LayerWriter::final_path() const { return state_->final_path; }

void LayerWriter::write(const CellWindow& window, const float* values) {
  std::vector<float>& buffer = state_->rounded_values;
  const double quantum = state_->spec.quantum;
  const std::size_t cells = static_cast<std::size_t>(window.columns) * static_cast<std::size_t>(window.rows);
  buffer.resize(cells);
  for (std::size_t i = 0; i < cells; ++i) {
    buffer[i] = std::isnan(values[i]) ? kLayerNodata : rounded(values[i], quantum);
  }
  state_->file->write(window, buffer.data(), static_cast<std::size_t>(window.columns));
}

void LayerWriter::finish() {
  const std::uint64_t written = state_->file->written().cells();
  if (written != state_->frame.size()) {
    throw Error(ErrorKind::internal,
                {"a layer was finished before each cell was written once", state_->where(),
                 fmt::format("{} of {} cells", written, state_->frame.size()), ""});
  }
  WholeFile whole(state_->final_path);
  state_->make_copy(whole.temporary());
  state_->verify_copy(whole.temporary());
  whole.commit();
  state_->file.reset();
}

}  // namespace sunfall

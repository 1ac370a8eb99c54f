#include "geo/height_raster.h"

#include <cpl_string.h>

#include <algorithm>
#include <cctype>
#include <cmath>
#include <cstdint>
#include <fstream>
#include <limits>
#include <string_view>
#include <type_traits>
#include <vector>

#include <fmt/format.h>

#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "geo/open_dataset.h"

namespace sunfall {
namespace {

constexpr int kBufferCells = 4'000'000;
constexpr std::size_t kLongestProjection_bytes = 65536;

bool is_metre(std::string unit) {
  std::transform(unit.begin(), unit.end(), unit.begin(),
                 [](unsigned char letter) { return std::tolower(letter); });
  return unit.empty() || unit == "m" || unit == "metre" || unit == "meter" || unit == "metres" ||
         unit == "meters";
}

void check_height_unit(GDALDataset& dataset, const std::string& where) {
  std::string unit = dataset.GetRasterBand(1)->GetUnitType();
  const OGRSpatialReference* crs = dataset.GetSpatialRef();
  if (is_metre(unit) && crs != nullptr && crs->IsVertical()) {
    const char* name = nullptr;
    if (crs->GetTargetLinearUnits("VERT_CS", &name) != 1.0 && name != nullptr) unit = name;
  }
  if (is_metre(unit)) return;
  throw Error(ErrorKind::data, {"heights must be in metres", where, fmt::format("heights in '{}'", unit),
                                "Convert them, for feet: gdal_calc.py -A IN.tif --calc=A*0.3048 "
                                "--outfile OUT.tif, and declare the unit: gdal_edit.py -units m OUT.tif"});
}

// An ASCII grid's CRS stands in a .prj file beside it. GDAL looks for that only together with the
// side-car files that it must not look for, so it is read here.
std::optional<OGRSpatialReference> crs_of(GDALDataset& dataset, const std::filesystem::path& file) {
  const OGRSpatialReference* own = dataset.GetSpatialRef();
  if (own != nullptr && !own->IsEmpty()) return plane_part(*own);
  if (std::string_view(dataset.GetDriverName()) != "AAIGrid") return std::nullopt;
  std::filesystem::path projection = file;
  std::ifstream in(projection.replace_extension(".prj"), std::ios::binary);
  std::string text(kLongestProjection_bytes, '\0');
  in.read(text.data(), static_cast<std::streamsize>(text.size()));
  text.resize(static_cast<std::size_t>(in.gcount()));
  OGRSpatialReference crs;
  CPLStringList lines(CSLTokenizeString2(text.c_str(), "\r\n", 0));
  if (crs.importFromWkt(text.c_str()) != OGRERR_NONE && crs.importFromESRI(lines.List()) != OGRERR_NONE) {
    return std::nullopt;
  }
  return plane_part(crs);
}

HeightCoding coding_of(GDALRasterBand& band) {
  HeightCoding coding;
  int present = 0;
  if (band.GetRasterDataType() == GDT_Int64) {
    const auto nodata = band.GetNoDataValueAsInt64(&present);
    if (present != 0) coding.nodata = static_cast<double>(nodata);
  } else if (band.GetRasterDataType() == GDT_UInt64) {
    const auto nodata = band.GetNoDataValueAsUInt64(&present);
    if (present != 0) coding.nodata = static_cast<double>(nodata);
  } else {
    const double nodata = band.GetNoDataValue(&present);
    if (present != 0) coding.nodata = nodata;
  }
  const double scale = band.GetScale(&present);
  if (present != 0) coding.scale = scale;
  const double offset = band.GetOffset(&present);
  if (present != 0) coding.offset_m = offset;
  return coding;
}

// Whether a float holds every value of the type exactly, so that it may be read as float.
bool fits_float(GDALDataType type) {
  return type == GDT_Byte || type == GDT_Int16 || type == GDT_UInt16 || type == GDT_Float32;
}

// The declared nodata as the cells store it: files often print FLT_MAX with too few digits, which
// reads back beyond the range of float.
template <typename Stored>
Stored stored_nodata(double nodata) {
  if constexpr (std::is_same_v<Stored, float>) {
    if (std::isfinite(nodata)) {
      constexpr double largest = std::numeric_limits<float>::max();
      return static_cast<float>(std::clamp(nodata, -largest, largest));
    }
  }
  return static_cast<Stored>(nodata);
}

// Decodes stored numbers of one type. Both loops are branchless, so that the compiler vectorises
// them; the cell at fault is looked for only when there is one.
template <typename Stored>
class Decoder {
 public:
  Decoder(const HeightCoding& coding, const RasterMeaning& meaning)
      : nan_is_missing_(coding.nodata && std::isnan(*coding.nodata)),
        has_nodata_(coding.nodata && !nan_is_missing_),
        nodata_(has_nodata_ ? stored_nodata<Stored>(*coding.nodata) : Stored{}),
        scale_(static_cast<Stored>(coding.scale)),
        offset_(static_cast<Stored>(coding.offset_m)),
        least_(static_cast<Stored>(meaning.least)),
        most_(static_cast<Stored>(meaning.most)) {}

  // The first column whose height cannot be, if any.
  std::optional<int> first_wrong(const Stored* stored, int columns) const {
    unsigned wrong = 0;
    for (int i = 0; i < columns; ++i) wrong |= static_cast<unsigned>(is_wrong(stored[i]));
    if (wrong == 0) return std::nullopt;
    return static_cast<int>(std::find_if(stored, stored + columns, [&](Stored v) { return is_wrong(v); }) -
                            stored);
  }

  // `heights` may be `stored` itself.
  void decode(const Stored* stored, float* heights, int columns) const {
    for (int i = 0; i < columns; ++i) {
      const Stored value = stored[i];
      heights[i] = is_missing(value) ? kMissing : static_cast<float>(height(value));
    }
  }

  Stored height(Stored value) const { return value * scale_ + offset_; }

 private:
  bool is_missing(Stored value) const {
    return (has_nodata_ & (value == nodata_)) | (nan_is_missing_ & (value != value));
  }
  bool is_wrong(Stored value) const {
    const Stored h = height(value);
    const bool believable = (h >= least_) & (h <= most_);
    return !is_missing(value) & !believable;
  }

  bool nan_is_missing_;
  bool has_nodata_;
  Stored nodata_;
  Stored scale_;
  Stored offset_;
  Stored least_;
  Stored most_;
};

}  // namespace

std::string raster_where(const std::filesystem::path& file, const std::string& role) {
  return fmt::format("{} ({})", file.string(), role);
}

HeightRaster::HeightRaster(const std::filesystem::path& file, const std::string& role, RasterMeaning meaning)
    : where_(raster_where(file, role)),
      meaning_(meaning),
      dataset_(open_raster(file, where_)),
      band_(dataset_->GetRasterBand(1)),
      coding_(coding_of(*band_)) {
  GdalGuard guard;
  if (meaning_.is_height) check_height_unit(*dataset_, where_);
  crs_ = crs_of(*dataset_, file);
  std::array<double, 6> transform{};
  if (dataset_->GetGeoTransform(transform.data()) == CE_None) transform_ = transform;
}

void HeightRaster::require_place() const {
  if (crs_ && transform_) return;
  throw Error(ErrorKind::data,
              {"the raster does not say where on the map it lies", where_,
               crs_ ? "no corners" : "no coordinate reference system",
               "Declare what is missing: gdal_edit.py -a_srs EPSG:CODE -a_ullr WEST NORTH EAST SOUTH FILE"});
}

void HeightRaster::read(const CellWindow& window, float* heights, std::size_t stride) const {
  if (fits_float(band_->GetRasterDataType())) {
    read_as<float>(window, heights, stride);
  } else {
    read_as<double>(window, heights, stride);
  }
  if ((band_->GetMaskFlags() & GMF_PER_DATASET) != 0) apply_mask(window, heights, stride);
}

template <typename Stored>
void HeightRaster::read_as(const CellWindow& window, float* heights, std::size_t stride) const {
  constexpr bool in_place = std::is_same_v<Stored, float>;
  const Decoder<Stored> decoder(coding_, meaning_);
  // Floats are decoded where they land, in one go; wider types pass through a buffer of some rows.
  const int rows_at_once = in_place ? window.rows : std::clamp(kBufferCells / window.columns, 1, window.rows);
  std::vector<Stored> buffer(in_place ? 0 : static_cast<std::size_t>(rows_at_once) * window.columns);
  for (int first = 0; first < window.rows; first += rows_at_once) {
    const CellWindow part{window.column, window.row + first, window.columns,
                          std::min(rows_at_once, window.rows - first)};
    float* decoded = heights + first * stride;
    Stored* stored = buffer.data();
    std::size_t stored_stride = window.columns;
    if constexpr (in_place) {
      stored = decoded;
      stored_stride = stride;
    }
    fetch(part, stored, stored_stride);
    for (int row = 0; row < part.rows; ++row) {
      const Stored* line = stored + row * stored_stride;
      if (const auto wrong = decoder.first_wrong(line, part.columns)) {
        refuse({part.column + *wrong, part.row + row}, static_cast<double>(decoder.height(line[*wrong])));
      }
      decoder.decode(line, decoded + row * stride, part.columns);
    }
  }
}

template <typename Stored>
void HeightRaster::fetch(const CellWindow& window, Stored* values, std::size_t stride) const {
  constexpr GDALDataType type = std::is_same_v<Stored, std::uint8_t> ? GDT_Byte
                                : std::is_same_v<Stored, float>      ? GDT_Float32
                                                                     : GDT_Float64;
  GDALRasterBand* band = type == GDT_Byte ? band_->GetMaskBand() : band_;
  GdalGuard guard;
  const CPLErr result = band->RasterIO(GF_Read, window.column, window.row, window.columns, window.rows,
                                       values, window.columns, window.rows, type, sizeof(Stored),
                                       static_cast<GSpacing>(stride * sizeof(Stored)), nullptr);
  if (result != CE_None) {
    guard.fail(ErrorKind::io, "the raster cannot be read to its end", where_,
               "Copy the file again; it may be damaged");
  }
}

// A mask inside the file marks missing cells too.
void HeightRaster::apply_mask(const CellWindow& window, float* heights, std::size_t stride) const {
  std::vector<std::uint8_t> mask(window.columns);
  for (int row = 0; row < window.rows; ++row) {
    fetch<std::uint8_t>({window.column, window.row + row, window.columns, 1}, mask.data(), mask.size());
    float* line = heights + row * stride;
    for (int i = 0; i < window.columns; ++i) line[i] = mask[i] == 0 ? kMissing : line[i];
  }
}

void HeightRaster::refuse(CellIndex cell, double height_m) const {
  std::string place = fmt::format("column {}, row {}", cell.column, cell.row);
  if (transform_) {
    const std::array<double, 6>& t = *transform_;
    const double x = cell.column + 0.5;
    const double y = cell.row + 0.5;
    place += fmt::format(", centre {:.3f}, {:.3f}", t[0] + x * t[1] + y * t[2], t[3] + x * t[4] + y * t[5]);
  }
  throw Error(
      ErrorKind::data,
      {std::isnan(height_m) ? fmt::format("a {} is NaN, which is not declared as nodata", meaning_.value)
                            : fmt::format("a {} cannot be", meaning_.value),
       fmt::format("{}, {}", where_, place), fmt::format("{}{}", height_m, meaning_.unit),
       fmt::format("{} lie within {} to {}{}; is nodata set? Declare it: gdal_edit.py -a_nodata {} FILE",
                   meaning_.values, meaning_.least, meaning_.most, meaning_.unit, height_m)});
}

}  // namespace sunfall

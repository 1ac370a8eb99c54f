#include "geo/table_reading.h"

#include <gdal_priv.h>
#include <ogrsf_frmts.h>

#include <cstring>
#include <stdexcept>

namespace sunfall {

TableSums read_table_by_ogr(const std::filesystem::path& file) {
  GDALAllRegister();
  const char* const drivers[] = {"CSV", nullptr};
  const GDALDatasetUniquePtr data(GDALDataset::Open(file.c_str(), GDAL_OF_VECTOR, drivers));
  if (!data || data->GetLayerCount() != 1) throw std::runtime_error("OGR does not open " + file.string());
  OGRLayer& layer = *data->GetLayer(0);
  const int fields = layer.GetLayerDefn()->GetFieldCount();
  TableSums sums;
  for (const OGRFeatureUniquePtr& row : layer) {
    ++sums.rows;
    sums.letters += static_cast<long>(std::strlen(row->GetFieldAsString(0)));
    for (int field = 1; field < fields; ++field) sums.sum += row->GetFieldAsDouble(field);
  }
  return sums;
}

}  // namespace sunfall

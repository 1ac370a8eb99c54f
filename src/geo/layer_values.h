#pragma once
// What our own layers hold, shared by their writer and their reader. Private to geo.

#include <gdal_priv.h>

#include <filesystem>

namespace sunfall {

inline constexpr float kLayerNodata = -9999.0F;

// Metadata item that tells amounts, which may be averaged, from classes such as months.
inline constexpr const char* kValuesKey = "VALUES";
inline constexpr const char* kAmountValues = "amounts";
inline constexpr const char* kClassValues = "classes";

// Opens a layer that we wrote. Throws Error(io).
GDALDatasetUniquePtr open_layer(const std::filesystem::path& layer);

}  // namespace sunfall

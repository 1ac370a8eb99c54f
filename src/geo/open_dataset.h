#pragma once
// Opening files that strangers made. Private to geo.

#include <gdal_priv.h>

#include <filesystem>
#include <string>

namespace sunfall {

// The file under its absolute name, so that no name is taken for one of GDAL's own syntaxes.
// Throws Error(data) where there is no such file, Error(io) where it may not be read.
std::string checked_file(const std::filesystem::path& file, const std::string& where);

// A raster with one band of real numbers and a believable size. Throws Error(data).
GDALDatasetUniquePtr open_raster(const std::filesystem::path& file, const std::string& where);

// Throws Error(data).
GDALDatasetUniquePtr open_vector(const std::filesystem::path& file, const std::string& where);

}  // namespace sunfall

#pragma once
// The hidden file that collects a layer's tiles: plain floats, row by row. Writing past GDAL has
// two gains: a full disk is known at once and by the thread that met it, and the sum kept here is
// of what was handed over, so that it convicts any later loss. Private to geo.

#include <cstdint>
#include <filesystem>

#include "sunfall/grid.h"

namespace sunfall {

// A sum over cells that does not depend on their order, yet changes when any value or place does.
class CellSum {
 public:
  void add(std::uint64_t first_index, const float* values, std::size_t count);
  std::uint64_t cells() const { return cells_; }
  bool operator==(const CellSum&) const = default;

 private:
  std::uint64_t sum_ = 0;
  std::uint64_t cells_ = 0;
};

class LayerFile {
 public:
  // Creates the file at its full size beside `layer`, without a name: even a killed run leaves
  // nothing of it. Throws Error(io), at once where the disk has no room.
  LayerFile(std::filesystem::path layer, int columns, int rows);
  ~LayerFile();
  LayerFile(const LayerFile&) = delete;
  LayerFile& operator=(const LayerFile&) = delete;

  // Values of a window inside the layer, `stride` floats from row to row. Both throw Error(io).
  void write(const CellWindow& window, const float* values, std::size_t stride);
  void read(const CellWindow& window, float* values, std::size_t stride) const;

  const CellSum& written() const { return written_; }
  int columns() const { return columns_; }
  int rows() const { return rows_; }

 private:
  std::uint64_t index(int column, int row) const {
    return static_cast<std::uint64_t>(row) * static_cast<std::uint64_t>(columns_) +
           static_cast<std::uint64_t>(column);
  }
  std::filesystem::path layer_;  // for messages
  int descriptor_ = -1;
  int columns_;
  int rows_;
  CellSum written_;
};

}  // namespace sunfall

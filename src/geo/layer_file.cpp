#include "geo/layer_file.h"

#include <fcntl.h>
#include <unistd.h>

#include <bit>
#include <cerrno>
#include <cstring>
#include <utility>

#include "core/whole_file.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

[[noreturn]] void fail(const char* what, const std::filesystem::path& path, int fault) {
  throw Error(ErrorKind::io,
              {what, path.string(), std::strerror(fault), "Make room on the disk or check its limits"});
}

// Runs `transfer(done)` until all bytes are through; a short transfer is not yet a fault.
template <typename Transfer>
int transfer_all(std::size_t bytes, Transfer transfer) {
  std::size_t done = 0;
  while (done < bytes) {
    const ssize_t now = transfer(done);
    if (now < 0 && errno == EINTR) continue;
    if (now < 0) return errno;
    if (now == 0) return EIO;
    done += static_cast<std::size_t>(now);
  }
  return 0;
}

}  // namespace

void CellSum::add(std::uint64_t first_index, const float* values, std::size_t count) {
  std::uint64_t sum = 0;
  for (std::size_t i = 0; i < count; ++i) {
    // Place and value mixed as in common 64-bit hash finalisers: odd multipliers and shifts.
    std::uint64_t mark = (first_index + i) * 0x9E3779B97F4A7C15ULL + std::bit_cast<std::uint32_t>(values[i]);
    mark = (mark ^ (mark >> 32U)) * 0xD6E8FEB86659FD93ULL;
    sum += mark ^ (mark >> 32U);
  }
  sum_ += sum;
  cells_ += count;
}

LayerFile::LayerFile(std::filesystem::path layer, int columns, int rows)
    : layer_(std::move(layer)), columns_(columns), rows_(rows) {
  const WholeFile reserved(layer_);  // takes the name away again at the end of this scope
  descriptor_ = ::open(reserved.temporary().c_str(), O_RDWR | O_CLOEXEC);
  if (descriptor_ < 0) fail("the layer's temporary file cannot be opened", layer_, errno);
  const auto bytes = static_cast<off_t>(index(0, rows_) * sizeof(float));
  // Reserving tells of a full disk before the work. File systems that cannot reserve get a size.
  int fault = ::fallocate(descriptor_, 0, 0, bytes) == 0 ? 0 : errno;
  if (fault == EOPNOTSUPP || fault == ENOSYS) fault = ::ftruncate(descriptor_, bytes) == 0 ? 0 : errno;
  if (fault != 0) {
    ::close(descriptor_);
    fail("there is no room for the layer", layer_, fault);
  }
}

LayerFile::~LayerFile() { ::close(descriptor_); }

void LayerFile::write(const CellWindow& window, const float* values, std::size_t stride) {
  const std::size_t bytes = static_cast<std::size_t>(window.columns) * sizeof(float);
  for (int row = 0; row < window.rows; ++row) {
    const float* line = values + row * stride;
    const std::uint64_t first = index(window.column, window.row + row);
    const int fault = transfer_all(bytes, [&](std::size_t done) {
      return ::pwrite(descriptor_, reinterpret_cast<const char*>(line) + done, bytes - done,
                      static_cast<off_t>(first * sizeof(float) + done));
    });
    if (fault != 0) fail("the layer cannot be written", layer_, fault);
    written_.add(first, line, static_cast<std::size_t>(window.columns));
  }
}

void LayerFile::read(const CellWindow& window, float* values, std::size_t stride) const {
  const std::size_t bytes = static_cast<std::size_t>(window.columns) * sizeof(float);
  for (int row = 0; row < window.rows; ++row) {
    float* line = values + row * stride;
    const std::uint64_t first = index(window.column, window.row + row);
    const int fault = transfer_all(bytes, [&](std::size_t done) {
      return ::pread(descriptor_, reinterpret_cast<char*>(line) + done, bytes - done,
                     static_cast<off_t>(first * sizeof(float) + done));
    });
    if (fault != 0) fail("the layer's temporary file cannot be read back", layer_, fault);
  }
}

}  // namespace sunfall

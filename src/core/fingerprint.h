#pragma once
// What a file held when it was read or written: its size and SHA-256.

#include <cstdint>
#include <filesystem>
#include <string>

namespace sunfall {

struct Fingerprint {
  std::uintmax_t size = 0;  // bytes
  std::string sha256;       // 64 lower-case hexadecimal digits
  bool operator==(const Fingerprint&) const = default;
};

// Reads the file in pieces, whatever its size. Throws Error(io).
Fingerprint fingerprint(const std::filesystem::path& file);

}  // namespace sunfall

#pragma once

namespace sunfall {

// Kept equal to the version of the CMake project (tests/core checks it).
inline constexpr const char* kVersion = "0.1.0";

}  // namespace sunfall

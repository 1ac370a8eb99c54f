#pragma once
// Files that appear whole or not at all: made under a hidden name in the same folder, flushed to
// disk, renamed. Private to geo.

#include <filesystem>

namespace sunfall {

// ".dli-01.tif.part" beside dli-01.tif. The name is the same in every run, so that what a killed
// run left is overwritten by the next.
std::filesystem::path hidden_name(const std::filesystem::path& final_path, const std::string& ending);

// Flushes `hidden` and its folder to disk and gives it its final name. Throws Error(io).
void publish(const std::filesystem::path& hidden, const std::filesystem::path& final_path);

// Removes a file if it is there; never throws.
void discard(const std::filesystem::path& file) noexcept;

// Throws Error(io) unless `folder` is a folder that can be written to.
void require_writable(const std::filesystem::path& folder);

}  // namespace sunfall

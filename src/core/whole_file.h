#pragma once
// Files that appear whole under their name or not at all: a reader, or a run that goes on after a
// crash, never meets half a file.

#include <filesystem>
#include <string_view>

namespace sunfall {

// Reserves a hidden temporary name in the file's own folder (so that the rename cannot cross
// disks). Whoever fills it calls `commit`; without that the temporary file is removed and whatever
// stood under the final name stays as it was.
class WholeFile {
 public:
  // Throws Error(io) where the folder cannot be written or `file` is something other than an
  // ordinary file (a folder, a device).
  explicit WholeFile(std::filesystem::path file);
  WholeFile(const WholeFile&) = delete;
  WholeFile& operator=(const WholeFile&) = delete;
  ~WholeFile();

  // An empty file that already exists, to be opened for writing and closed again before `commit`.
  const std::filesystem::path& temporary() const { return temporary_; }
  // Flushes to disk, renames, flushes the folder. Throws Error(io).
  void commit();

 private:
  std::filesystem::path file_;
  std::filesystem::path temporary_;
  bool committed_ = false;
};

// Throws Error(io), for instance when the disk is full.
void write_whole_file(const std::filesystem::path& file, std::string_view content);

}  // namespace sunfall

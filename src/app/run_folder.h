#pragma once
// A run's folder on disk. Files are made in a hidden folder inside it and moved to their names
// together, the summary last, so that a summary never speaks of layers that are not there.

#include <filesystem>
#include <string>

namespace sunfall {

class RunFolder {
 public:
  // Makes the folder and takes hold of it. Throws Error(io) where it cannot be written, or another
  // run holds it.
  explicit RunFolder(std::filesystem::path folder);
  RunFolder(const RunFolder&) = delete;
  RunFolder& operator=(const RunFolder&) = delete;
  // Lets go; what was not published is removed.
  ~RunFolder();

  // Where to write.
  const std::filesystem::path& staging() const { return staging_; }
  const std::filesystem::path& folder() const { return folder_; }
  // Moves everything to its final name, `last` at the end. An earlier run's file of that name goes
  // first. Throws Error(io).
  void publish(const std::string& last);

 private:
  std::filesystem::path folder_;
  std::filesystem::path staging_;
  int lock_ = -1;
  bool made_folder_ = false;
};

}  // namespace sunfall

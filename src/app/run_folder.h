#pragma once
// A run's folder on disk. Files are made in a hidden folder inside it and moved to their names
// together, the summary last, so that a summary never speaks of layers that are not there.

#include <filesystem>
#include <string>
#include <vector>

namespace sunfall {

class RunFolder {
 public:
  // Makes the folder and takes hold of it. Throws Error(io) where it cannot be written, or another
  // run holds it.
  explicit RunFolder(std::filesystem::path folder);
  RunFolder(const RunFolder&) = delete;
  RunFolder& operator=(const RunFolder&) = delete;
  // Lets go; what was not published is removed, with the folders made for it.
  ~RunFolder();

  // Where to write.
  const std::filesystem::path& staging() const { return staging_; }
  const std::filesystem::path& folder() const { return folder_; }
  // Moves everything to its final name, `last` at the end. An earlier run's file of that name goes
  // first, and then those of `outdated` that this run does not make. Throws Error(io).
  void publish(const std::string& last, const std::vector<std::string>& outdated = {});

 private:
  RunFolder() = default;
  void make_folder();
  void take_hold();
  bool holds_what_stands_there() const;

  std::filesystem::path folder_;
  std::filesystem::path staging_;
  std::filesystem::path topmost_made_;  // empty where every folder stood before
  int lock_ = -1;
};

}  // namespace sunfall

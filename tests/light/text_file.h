#pragma once
// A text file of its own folder for a test.

#include <unistd.h>

#include <atomic>
#include <filesystem>
#include <fstream>
#include <string>

namespace sunfall {

class TextFile {
 public:
  explicit TextFile(const std::string& content) {
    static std::atomic<int> counter{0};
    path_ = std::filesystem::temp_directory_path() /
            ("sunfall-light-" + std::to_string(::getpid()) + "-" + std::to_string(counter++) + ".csv");
    std::ofstream(path_, std::ios::binary) << content;
  }
  TextFile(const TextFile&) = delete;
  TextFile& operator=(const TextFile&) = delete;
  ~TextFile() {
    std::error_code ignored;
    std::filesystem::remove(path_, ignored);
  }
  const std::filesystem::path& path() const { return path_; }

 private:
  std::filesystem::path path_;
};

}  // namespace sunfall

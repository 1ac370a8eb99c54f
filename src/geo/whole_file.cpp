#include "geo/whole_file.h"

#include <fcntl.h>
#include <unistd.h>

#include <cerrno>
#include <cstdio>
#include <cstring>
#include <string>

#include "sunfall/error.h"

namespace sunfall {
namespace {

[[noreturn]] void fail(const char* what, const std::filesystem::path& where) {
  throw Error(ErrorKind::io,
              {what, where.string(), std::strerror(errno), "Check the disk's space and permissions"});
}

void flush(const std::filesystem::path& path, int flags) {
  const int descriptor = ::open(path.c_str(), flags | O_CLOEXEC);
  if (descriptor < 0) fail("the file cannot be opened to flush it", path);
  const int result = ::fsync(descriptor);
  const int fault = errno;
  ::close(descriptor);
  errno = fault;
  // Some file systems cannot flush folders, and say so by EINVAL.
  if (result != 0 && fault != EINVAL) fail("the file cannot be flushed to disk", path);
}

std::filesystem::path folder_of(const std::filesystem::path& file) {
  return file.has_parent_path() ? file.parent_path() : std::filesystem::path(".");
}

}  // namespace

std::filesystem::path hidden_name(const std::filesystem::path& final_path, const std::string& ending) {
  std::string name = ".";
  name += final_path.filename().string();
  name += ending;
  return folder_of(final_path) / name;
}

void publish(const std::filesystem::path& hidden, const std::filesystem::path& final_path) {
  flush(hidden, O_RDONLY);
  if (std::rename(hidden.c_str(), final_path.c_str()) != 0)
    fail("the file cannot be given its final name", final_path);
  try {
    flush(folder_of(final_path), O_RDONLY | O_DIRECTORY);
  } catch (...) {
    discard(final_path);
    throw;
  }
}

void discard(const std::filesystem::path& file) noexcept {
  if (!file.empty()) ::unlink(file.c_str());
}

void require_writable(const std::filesystem::path& folder) {
  std::error_code fault;
  if (!std::filesystem::is_directory(folder, fault)) {
    throw Error(ErrorKind::io,
                {"there is no such folder to write to", folder.string(), "", "Create it first"});
  }
  if (::access(folder.c_str(), W_OK | X_OK) != 0) fail("the folder may not be written to", folder);
}

}  // namespace sunfall

#include "app/run_folder.h"

#include <fcntl.h>
#include <sys/file.h>
#include <sys/stat.h>
#include <unistd.h>

#include <algorithm>
#include <cerrno>
#include <system_error>
#include <utility>

#include "sunfall/error.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;
constexpr const char* kLockName = ".sunfall-lock";
constexpr const char* kStagingName = ".sunfall-making";
constexpr const char* kElsewhere = "Choose a folder that you may write with -o";
constexpr int kHoldAttempts = 20;

[[noreturn]] void fail(const std::string& what, const fs::path& where, const std::error_code& code,
                       const std::string& remedy) {
  throw Error(ErrorKind::io, {what, where.string(), code.message(), remedy});
}

std::error_code last_error() { return {errno, std::generic_category()}; }

void flush_folder(const fs::path& folder) {
  const int descriptor = open(folder.c_str(), O_RDONLY | O_DIRECTORY | O_CLOEXEC);
  if (descriptor < 0) return;
  fsync(descriptor);
  close(descriptor);
}

// The first of the folders on the way to `folder` that is not there yet; empty where all are.
fs::path topmost_missing(const fs::path& folder) {
  fs::path missing;
  std::error_code ignored;
  for (fs::path at = folder; !at.empty() && !fs::exists(at, ignored); at = at.parent_path()) missing = at;
  return missing;
}

std::vector<fs::path> names_in(const fs::path& folder) {
  std::error_code code;
  std::vector<fs::path> names;
  for (fs::directory_iterator entry(folder, code); !code && entry != fs::directory_iterator();
       entry.increment(code)) {
    names.push_back(entry->path().filename());
  }
  if (code) fail("the run's files cannot be listed", folder, code, "Run again");
  return names;
}

}  // namespace

// Delegates, so that the destructor tidies up where the body throws.
RunFolder::RunFolder(fs::path folder) : RunFolder() {
  folder_ = (std::move(folder) / "").parent_path();  // without a slash at its end
  staging_ = folder_ / kStagingName;
  take_hold();
  std::error_code code;
  // What a killed run left behind is of no use: nobody vouches for it.
  fs::remove_all(staging_, code);
  if (!code) fs::create_directory(staging_, code);
  if (code) fail("the run's folder cannot be written", folder_, code, kElsewhere);
}

void RunFolder::make_folder() {
  const fs::path missing = topmost_missing(folder_);
  if (topmost_made_.empty()) topmost_made_ = missing;
  std::error_code code;
  fs::create_directories(folder_, code);
  if (code) fail("the run's folder cannot be made", folder_, code, kElsewhere);
}

// A run that ends takes its lock file away, and a new folder with it; whoever opened the file just
// before holds a file without a name, and tries again.
void RunFolder::take_hold() {
  for (int attempt = 0; attempt < kHoldAttempts; ++attempt) {
    make_folder();
    lock_ = open((folder_ / kLockName).c_str(), O_CREAT | O_RDWR | O_CLOEXEC | O_NOFOLLOW, 0644);
    if (lock_ < 0 && errno == ENOENT) continue;
    if (lock_ < 0) fail("the run's folder cannot be written", folder_, last_error(), kElsewhere);
    const bool held = flock(lock_, LOCK_EX | LOCK_NB) == 0;
    if (held && holds_what_stands_there()) return;
    const std::error_code reason = last_error();
    close(std::exchange(lock_, -1));
    if (!held) {
      fail("another run is writing into this folder", folder_, reason,
           "Wait for it, or give this run a folder of its own with -o");
    }
  }
  fail("other runs keep taking this folder", folder_, {}, "Give this run a folder of its own with -o");
}

bool RunFolder::holds_what_stands_there() const {
  struct stat held {};
  struct stat standing {};
  return fstat(lock_, &held) == 0 && lstat((folder_ / kLockName).c_str(), &standing) == 0 &&
         held.st_ino == standing.st_ino && held.st_dev == standing.st_dev;
}

RunFolder::~RunFolder() {
  std::error_code ignored;
  if (lock_ >= 0) {
    fs::remove_all(staging_, ignored);
    fs::remove(folder_ / kLockName, ignored);
    close(lock_);
  }
  if (topmost_made_.empty()) return;
  // Only empty folders go, from the innermost outwards.
  for (fs::path at = folder_;; at = at.parent_path()) {
    ::rmdir(at.c_str());
    if (at == topmost_made_ || !at.has_relative_path()) return;
  }
}

void RunFolder::publish(const std::string& last, const std::vector<std::string>& outdated) {
  std::error_code code;
  const std::vector<fs::path> files = names_in(staging_);
  fs::remove(folder_ / last, code);
  if (code)
    fail("the former summary cannot be removed", folder_ / last, code, "Check the folder's permissions");
  flush_folder(folder_);
  for (const std::string& name : outdated) {
    if (std::find(files.begin(), files.end(), name) == files.end()) fs::remove(folder_ / name, code);
    if (code)
      fail("a former run's file cannot be removed", folder_ / name, code, "Check the folder's permissions");
  }
  const auto move = [&](const fs::path& name) {
    fs::rename(staging_ / name, folder_ / name, code);
    if (code)
      fail("a finished file cannot be moved to its place", folder_ / name, code,
           "Check the folder's permissions");
  };
  for (const fs::path& name : files) {
    if (name != last) move(name);
  }
  flush_folder(folder_);
  move(last);
  flush_folder(folder_);
}

}  // namespace sunfall

#include "app/run_folder.h"

#include <fcntl.h>
#include <sys/file.h>
#include <unistd.h>

#include <cerrno>
#include <system_error>
#include <vector>

#include "sunfall/error.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;
constexpr const char* kLockName = ".sunfall-lock";
constexpr const char* kStagingName = ".sunfall-making";

[[noreturn]] void fail(const std::string& what, const fs::path& where, const std::error_code& code,
                       const std::string& remedy) {
  throw Error(ErrorKind::io, {what, where.string(), code.message(), remedy});
}

std::error_code last_error() { return {errno, std::generic_category()}; }

void flush_folder(const fs::path& folder) {
  const int descriptor = open(folder.c_str(), O_RDONLY | O_DIRECTORY);
  if (descriptor < 0) return;
  fsync(descriptor);
  close(descriptor);
}

}  // namespace

RunFolder::RunFolder(fs::path folder) : folder_(std::move(folder)), staging_(folder_ / kStagingName) {
  std::error_code code;
  made_folder_ = fs::create_directories(folder_, code);
  if (code)
    fail("the run's folder cannot be made", folder_, code, "Choose a folder that you may write with -o");
  lock_ = open((folder_ / kLockName).c_str(), O_CREAT | O_RDWR | O_CLOEXEC | O_NOFOLLOW, 0644);
  if (lock_ < 0)
    fail("the run's folder cannot be written", folder_, last_error(),
         "Choose a folder that you may write with -o");
  if (flock(lock_, LOCK_EX | LOCK_NB) != 0) {
    const std::error_code reason = last_error();
    close(lock_);
    lock_ = -1;
    fail("another run is writing into this folder", folder_, reason,
         "Wait for it, or give this run a folder of its own with -o");
  }
  // What a killed run left behind is of no use: nobody vouches for it.
  fs::remove_all(staging_, code);
  fs::create_directory(staging_, code);
  if (code) {
    close(lock_);
    lock_ = -1;
    fail("the run's folder cannot be written", folder_, code, "Choose a folder that you may write with -o");
  }
}

RunFolder::~RunFolder() {
  std::error_code ignored;
  fs::remove_all(staging_, ignored);
  fs::remove(folder_ / kLockName, ignored);
  if (made_folder_) fs::remove(folder_, ignored);  // only an empty folder goes
  if (lock_ >= 0) close(lock_);
}

void RunFolder::publish(const std::string& last) {
  std::error_code code;
  std::vector<fs::path> files;
  for (const fs::directory_entry& entry : fs::directory_iterator(staging_, code))
    files.push_back(entry.path().filename());
  if (code) fail("the run's files cannot be listed", staging_, code, "Run again");
  fs::remove(folder_ / last, code);
  if (code)
    fail("the former summary cannot be removed", folder_ / last, code, "Check the folder's permissions");
  flush_folder(folder_);
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

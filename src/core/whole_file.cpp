#include "core/whole_file.h"

#include <fcntl.h>
#include <unistd.h>

#include <atomic>
#include <cerrno>
#include <string>
#include <system_error>
#include <utility>

#include "sunfall/error.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;

[[noreturn]] void fail(const std::string& what, const fs::path& file, int error_number) {
  throw Error(ErrorKind::io, {what, file.string(), std::generic_category().message(error_number),
                              "check the disk's free space and the folder's permissions"});
}

// A POSIX file descriptor that closes itself.
class Descriptor {
 public:
  Descriptor(const fs::path& file, int flags) : number_(::open(file.c_str(), flags | O_CLOEXEC, 0666)) {}
  Descriptor(const Descriptor&) = delete;
  Descriptor& operator=(const Descriptor&) = delete;
  ~Descriptor() {
    if (number_ >= 0) ::close(number_);
  }
  int number() const { return number_; }
  bool valid() const { return number_ >= 0; }
  // Some file systems tell of a failed write only here.
  bool close() { return ::close(std::exchange(number_, -1)) == 0; }

 private:
  int number_;
};

fs::path folder_of(const fs::path& file) {
  return file.has_parent_path() ? file.parent_path() : fs::path(".");
}

void flush_to_disk(const fs::path& path, int flags, const fs::path& named) {
  Descriptor opened(path, flags);
  if (!opened.valid()) fail("cannot be opened to flush it", named, errno);
  // EINVAL: a file system that cannot flush a folder.
  if (::fsync(opened.number()) != 0 && errno != EINVAL) fail("cannot be flushed to disk", named, errno);
}

// The name does not hold the file's own name, which may already be as long as the system allows.
fs::path reserve_temporary(const fs::path& file) {
  static std::atomic<unsigned> counter{0};
  for (int attempt = 0; attempt < 1000; ++attempt) {
    const std::string name =
        ".sunfall-" + std::to_string(::getpid()) + "-" + std::to_string(counter++) + ".part";
    const fs::path temporary = folder_of(file) / name;
    const Descriptor created(temporary, O_WRONLY | O_CREAT | O_EXCL);
    if (created.valid()) return temporary;
    if (errno != EEXIST) fail("cannot be written", file, errno);
  }
  fail("cannot be written: every temporary name is taken", file, EEXIST);
}

}  // namespace

WholeFile::WholeFile(fs::path file) : file_(std::move(file)) {
  // Renaming over a device (/dev/null) would replace the device itself.
  std::error_code error;
  const fs::file_status status = fs::status(file_, error);
  if (fs::exists(status) && !fs::is_regular_file(status)) {
    throw Error(ErrorKind::io,
                {"is not an ordinary file, so it is not replaced", file_.string(), "", "give another name"});
  }
  temporary_ = reserve_temporary(file_);
}

WholeFile::~WholeFile() {
  if (!committed_) ::unlink(temporary_.c_str());
}

void WholeFile::commit() {
  flush_to_disk(temporary_, O_RDONLY, file_);
  if (::rename(temporary_.c_str(), file_.c_str()) != 0) fail("cannot be put in place", file_, errno);
  committed_ = true;
  flush_to_disk(folder_of(file_), O_RDONLY | O_DIRECTORY, file_);
}

void write_whole_file(const fs::path& file, std::string_view content) {
  WholeFile whole(file);
  Descriptor out(whole.temporary(), O_WRONLY | O_TRUNC);
  if (!out.valid()) fail("cannot be written", file, errno);
  while (!content.empty()) {
    const ssize_t written = ::write(out.number(), content.data(), content.size());
    if (written < 0 && errno == EINTR) continue;
    if (written < 0) fail("cannot be written", file, errno);
    content.remove_prefix(static_cast<std::size_t>(written));
  }
  if (!out.close()) fail("cannot be written", file, errno);
  whole.commit();
}

}  // namespace sunfall

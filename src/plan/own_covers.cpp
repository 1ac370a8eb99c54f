#include <system_error>

#include "sunfall/covers.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;

// Whoever moves an installed tree moves program and table together.
fs::path beside_program() {
  std::error_code error;
  const fs::path program = fs::read_symlink("/proc/self/exe", error);
  return error ? fs::path() : program.parent_path().parent_path() / "share" / "sunfall";
}

}  // namespace

fs::path own_covers() {
  std::string looked;
  for (const fs::path& folder : {beside_program(), fs::path(SUNFALL_SOURCE_DATA), fs::path(SUNFALL_DATA)}) {
    if (folder.empty()) continue;
    const fs::path file = folder / "covers.toml";
    std::error_code error;
    if (fs::is_regular_file(file, error)) return file;
    looked += (looked.empty() ? "" : ", ") + folder.string();
  }
  throw Error(ErrorKind::io, {"the table of covers that comes along is not there", "covers.toml",
                              "looked in " + looked, "Install it again"});
}

}  // namespace sunfall

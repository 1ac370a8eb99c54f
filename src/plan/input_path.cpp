#include "plan/input_path.h"

#include <algorithm>
#include <cctype>
#include <vector>

#include "core/nearest.h"
#include "plan/words.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;

// A folder with more names than this gets a hint from the first ones only.
constexpr std::size_t kMostNamesCompared = 5000;

// GDAL reads archives, memory and the network through names that begin so.
bool is_virtual(const std::string& path) {
  std::string start = path.substr(0, 4);
  std::transform(start.begin(), start.end(), start.begin(),
                 [](unsigned char letter) { return static_cast<char>(std::tolower(letter)); });
  return start == "/vsi";
}

bool has_control(const std::string& path) {
  return std::any_of(path.begin(), path.end(),
                     [](unsigned char letter) { return letter < 0x20 || letter == 0x7F; });
}

// The fault in the path's form, or nothing.
std::string form_fault(const std::string& written, const fs::path& resolved) {
  if (written.empty()) return "the path is empty";
  if (has_control(written)) return "the path holds a control character";
  if (written.find("://") != std::string::npos) return "a network address is not read";
  if (is_virtual(written) || is_virtual(resolved.lexically_normal().string())) {
    return "a virtual path is not read";
  }
  return "";
}

std::string in_folder(const fs::path& folder) {
  return folder.empty() ? "the current folder" : in_quotes(folder.string());
}

}  // namespace

std::string similar_file_hint(const fs::path& missing) {
  const fs::path folder = missing.parent_path();
  std::error_code error;
  fs::directory_iterator entries(folder.empty() ? fs::path(".") : folder, error);
  if (error) return "There is no folder " + in_folder(folder);
  std::vector<std::string> names;
  for (; entries != fs::directory_iterator() && names.size() < kMostNamesCompared; entries.increment(error)) {
    if (error) break;
    if (!entries->is_directory(error)) names.push_back(entries->path().filename().string());
  }
  std::sort(names.begin(), names.end());  // folders list in any order; the hint must not
  const std::string wanted = missing.filename().string();
  const std::string nearest = wanted.size() > 255 ? std::string() : nearest_name(wanted, names);
  if (nearest.empty()) return "No file in " + in_folder(folder) + " has a similar name";
  return "Perhaps " + in_quotes(nearest) + " is meant";
}

fs::path input_path(const PlanFile& file, const std::string& written, const std::string& where) {
  const fs::path resolved = file.folder() / written;
  const std::string fault = form_fault(written, resolved);
  if (!fault.empty()) {
    throw Error(ErrorKind::plan, {fault, where, in_quotes(written),
                                  "Name a file on disk, relative to " + file.called + "'s folder"});
  }
  std::error_code error;
  const fs::file_status status = fs::status(resolved, error);
  if (status.type() == fs::file_type::none) {  // no permission, a name too long, a circle of links
    throw Error(ErrorKind::data,
                {"the file cannot be reached", where, in_quotes(written) + ", " + error.message(), ""});
  }
  if (!fs::exists(status)) {
    std::string remedy = similar_file_hint(resolved);
    if (written.find('\\') != std::string::npos) remedy = "Write / between folders";
    throw Error(ErrorKind::data, {"the file does not exist", where, in_quotes(written), remedy});
  }
  if (!fs::is_regular_file(status)) {
    throw Error(ErrorKind::data,
                {fs::is_directory(status) ? "a folder stands where a file is needed"
                                          : "a device or pipe stands where a file is needed",
                 where, in_quotes(written), "Name a file, relative to " + file.called + "'s folder"});
  }
  return resolved;
}

}  // namespace sunfall

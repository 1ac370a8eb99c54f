#pragma once
// The order of the folders of src/ and what each may include: the arrows that point down only.

#include <optional>
#include <set>
#include <string>
#include <vector>

namespace sunfall::architecture {

struct FolderRule {
  std::string folder;
  std::set<std::string> may_use;  // besides itself and core
};

// Lowest first; a folder's `may_use` names only folders above it in this list.
const std::vector<FolderRule>& folder_rules();

// The folder whose contract a header of include/sunfall is: that of the same name, else core.
std::string owner_of_public_header(const std::string& file_name);

// The file named by an #include line, without its brackets or quotes; nothing on other lines.
std::optional<std::string> included_file(const std::string& line);

// The reason why a file of src/<folder> (or the public header of that folder) may not include
// `target`; nothing where it may.
std::optional<std::string> include_fault(const std::string& folder, const std::string& target);

// The same for a file of tests/<folder>: tests may include anything of ours, and a library that a
// single folder keeps to itself only in that folder's tests.
std::optional<std::string> test_include_fault(const std::string& folder, const std::string& target);

}  // namespace sunfall::architecture

// The tree as it stands, held against the rules: who includes whom, how long files are, and that
// nothing committed remembers the machine it was written on.

#include <gtest/gtest.h>

#include <algorithm>
#include <filesystem>
#include <fstream>
#include <string>
#include <vector>

#include "architecture/include_rules.h"

namespace sunfall::architecture {
namespace {

namespace fs = std::filesystem;

const fs::path kTree = SUNFALL_TREE;
constexpr std::size_t kLongestFile_lines = 600;

std::vector<std::string> lines_of(const fs::path& file) {
  std::ifstream stream(file);
  std::vector<std::string> lines;
  for (std::string line; std::getline(stream, line);) lines.push_back(line);
  return lines;
}

// Files below `folder` with one of the endings, in a fixed order.
std::vector<fs::path> files_below(const fs::path& folder, const std::vector<std::string>& endings) {
  std::vector<fs::path> files;
  if (!fs::exists(folder)) return files;
  for (const fs::directory_entry& entry : fs::recursive_directory_iterator(folder)) {
    const std::string ending = entry.path().extension().string();
    if (entry.is_regular_file() && std::find(endings.begin(), endings.end(), ending) != endings.end()) {
      files.push_back(entry.path());
    }
  }
  std::sort(files.begin(), files.end());
  return files;
}

const std::vector<std::string> kCodeEndings = {".h", ".cpp"};

std::vector<fs::path> code_below(const std::vector<std::string>& folders) {
  std::vector<fs::path> files;
  for (const std::string& folder : folders) {
    const std::vector<fs::path> more = files_below(kTree / folder, kCodeEndings);
    files.insert(files.end(), more.begin(), more.end());
  }
  return files;
}

// The first folder below `top` that the file lies in: "geo" for src/geo/detail/a.h.
std::string folder_below(const fs::path& file, const std::string& top) {
  return file.lexically_relative(kTree / top).begin()->string();
}

using FaultOf = std::optional<std::string> (*)(const std::string& folder, const std::string& target);

void expect_clean_includes(const fs::path& file, const std::string& folder, FaultOf fault_of) {
  const std::vector<std::string> lines = lines_of(file);
  for (std::size_t i = 0; i < lines.size(); ++i) {
    const std::optional<std::string> target = included_file(lines[i]);
    if (!target) continue;
    const std::optional<std::string> fault = fault_of(folder, *target);
    EXPECT_FALSE(fault) << file.string() << ":" << i + 1 << " includes " << *target << ": " << *fault;
  }
}

TEST(Tree, IncludesPointDown) {
  const std::vector<fs::path> sources = files_below(kTree / "src", kCodeEndings);
  ASSERT_FALSE(sources.empty());
  for (const fs::path& file : sources) expect_clean_includes(file, folder_below(file, "src"), include_fault);
}

TEST(Tree, PublicHeadersStandOnTheirOwn) {
  const std::vector<fs::path> headers = files_below(kTree / "include", kCodeEndings);
  ASSERT_FALSE(headers.empty());
  for (const fs::path& file : headers) {
    expect_clean_includes(file, owner_of_public_header(file.filename().string()), include_fault);
    for (const std::string& line : lines_of(file)) {
      const std::optional<std::string> target = included_file(line);
      if (!target || line.find('"') == std::string::npos) continue;
      EXPECT_EQ(target->rfind("sunfall/", 0), 0u) << file.string() << " includes the private " << *target;
    }
  }
}

TEST(Tree, TestsLeaveMapLibrariesToGeo) {
  for (const fs::path& file : files_below(kTree / "tests", kCodeEndings)) {
    expect_clean_includes(file, folder_below(file, "tests"), test_include_fault);
  }
}

TEST(Tree, FilesAreShort) {
  for (const fs::path& file : code_below({"src", "include", "tests", "fields"})) {
    const std::size_t lines = lines_of(file).size();
    EXPECT_LE(lines, kLongestFile_lines) << file.string() << ": split it";
  }
}

// But for bodies, which are there to be included once per instruction set or type.
TEST(Tree, HeadersAreGuarded) {
  for (const fs::path& file : code_below({"src", "include", "tests", "fields"})) {
    const bool is_body = file.stem().string().ends_with("_body");
    if (file.extension() != ".h" || is_body) continue;
    const std::vector<std::string> lines = lines_of(file);
    EXPECT_EQ(std::count(lines.begin(), lines.end(), "#pragma once"), 1) << file.string();
  }
}

// Spelt in halves, so that this file does not accuse itself.
const std::vector<std::string> kMachinePaths = {std::string("/wo") + "rk/", std::string("/ho") + "me/",
                                                std::string("/ro") + "ot/", std::string("/tm") + "p/",
                                                std::string("/Us") + "ers/"};

TEST(Tree, NamesNoMachine) {
  const std::vector<std::string> endings = {".h",    ".cpp",  ".txt",  ".cmake", ".in",  ".md",
                                            ".toml", ".json", ".html", ".sld",   ".csv", ".sh"};
  std::vector<fs::path> files = {kTree / "dev",           kTree / "CMakeLists.txt",    kTree / "README.md",
                                 kTree / "DEVELOPERS.md", kTree / "CMakePresets.json", kTree / ".ci/run"};
  for (const char* folder : {"src", "include", "tests", "fields", "docs"}) {
    const std::vector<fs::path> more = files_below(kTree / folder, endings);
    files.insert(files.end(), more.begin(), more.end());
  }
  for (const fs::path& file : files) {
    ASSERT_TRUE(fs::exists(file)) << file.string();
    const std::vector<std::string> lines = lines_of(file);
    for (std::size_t i = 0; i < lines.size(); ++i) {
      for (const std::string& path : kMachinePaths) {
        EXPECT_EQ(lines[i].find(path), std::string::npos)
            << file.string() << ":" << i + 1 << ": " << lines[i];
      }
    }
  }
}

}  // namespace
}  // namespace sunfall::architecture

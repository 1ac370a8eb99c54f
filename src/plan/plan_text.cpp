#include "plan/plan_text.h"

#include <fmt/format.h>
#include <algorithm>
#include <fstream>

#include "core/utf8.h"
#include "plan/input_path.h"
#include "plan/words.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;

// The TOML library frees nested tables by recursion; hundreds of thousands of them would use up
// the stack. These limits allow a few thousand at most and lie far above any real plan.
constexpr int kDeepestBrackets = 16;
constexpr int kMostDotsInLine = 200;

[[noreturn]] void refuse(const PlanFile& file, long line, Error::Parts parts) {
  parts.where = file.where(line, "");
  throw Error(ErrorKind::plan, std::move(parts));
}

long line_of(std::string_view text, std::size_t at) {
  return 1 + std::count(text.begin(), text.begin() + static_cast<std::ptrdiff_t>(at), '\n');
}

void refuse_what_is_no_file(const PlanFile& file) {
  std::error_code error;
  const fs::file_status status = fs::status(file.path, error);
  if (!fs::exists(status)) {
    const fs::path with_ending = file.path.string() + ".toml";
    refuse(file, 0,
           {file.called + " does not exist", "", "",
            fs::exists(with_ending, error)
                ? "Perhaps " + in_quotes(with_ending.filename().string()) + " is meant"
                : similar_file_hint(file.path)});
  }
  if (fs::is_directory(status)) {
    refuse(file, 0, {file.called + " is a folder", "", "", "Give the .toml file inside it"});
  }
  if (!fs::is_regular_file(status)) {
    refuse(file, 0,
           {file.called + " is not a plain file", "", "a device or pipe", "Give a .toml file on disk"});
  }
}

// One step past the string that begins at `at`. A single-line string also ends at a line's end,
// where the parser will stop as well.
std::size_t past_string(std::string_view text, std::size_t at) {
  const char quote = text[at];
  const bool is_long = text.substr(at, 3) == std::string(3, quote);
  std::size_t i = at + (is_long ? 3 : 1);
  for (; i < text.size(); ++i) {
    if (text[i] == '\\' && quote == '"') {
      ++i;
    } else if (is_long && text.substr(i, 3) == std::string(3, quote)) {
      i += 3;
      while (i < text.size() && text[i] == quote) ++i;  // up to two quotes may end the text itself
      return i;
    } else if (!is_long && (text[i] == quote || text[i] == '\n')) {
      return text[i] == quote ? i + 1 : i;
    }
  }
  return text.size();
}

}  // namespace

void refuse_broken_utf8(std::string_view text, const PlanFile& file) {
  for (std::size_t i = 0; i < text.size();) {
    const std::size_t length = utf8_length(text, i);
    if (length == 0) {
      refuse(file, line_of(text, i),
             {file.called + " is not UTF-8 text", "",
              fmt::format("byte 0x{:02X}", static_cast<unsigned char>(text[i])), "Save it as UTF-8"});
    }
    i += length;
  }
}

void refuse_deep_nesting(std::string_view text, const PlanFile& file) {
  int brackets = 0;
  int dots = 0;
  for (std::size_t i = 0; i < text.size();) {
    const char letter = text[i];
    if (letter == '"' || letter == '\'') {
      i = past_string(text, i);
      continue;
    }
    if (letter == '#') {
      i = std::min(text.find('\n', i), text.size());
      continue;
    }
    if (letter == '\n') dots = 0;
    if (letter == '.') ++dots;
    if (letter == '[' || letter == '{') ++brackets;
    if ((letter == ']' || letter == '}') && brackets > 0) --brackets;
    if (brackets > kDeepestBrackets || dots > kMostDotsInLine) {
      refuse(file, line_of(text, i),
             {file.called + " is nested too deeply", "",
              brackets > kDeepestBrackets ? fmt::format("more than {} brackets open", kDeepestBrackets)
                                          : fmt::format("more than {} dots in a line", kMostDotsInLine),
              "Write tables as " + file.page + " shows them"});
    }
    ++i;
  }
}

std::string read_plan_text(const PlanFile& file) {
  refuse_what_is_no_file(file);
  std::ifstream stream(file.path, std::ios::binary);
  std::string text(kLargestPlan_bytes + 1, '\0');
  stream.read(text.data(), static_cast<std::streamsize>(text.size()));
  if (stream.bad() || (stream.fail() && !stream.eof())) {
    throw Error(ErrorKind::io,
                {file.called + " cannot be read", file.where(0, ""), "", "Check its permissions"});
  }
  text.resize(static_cast<std::size_t>(stream.gcount()));
  if (text.size() > kLargestPlan_bytes) {
    refuse(file, 0,
           {file.called + " is larger than 1 MB", "", "", "Give " + file.called + ", not one of its inputs"});
  }
  refuse_broken_utf8(text, file);
  refuse_deep_nesting(text, file);
  return text;
}

}  // namespace sunfall

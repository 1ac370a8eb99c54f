#include "plan/words.h"

#include <fmt/format.h>

#include "core/nearest.h"
#include "core/utf8.h"

namespace sunfall {
namespace {

unsigned byte_at(std::string_view text, std::size_t at) { return static_cast<unsigned char>(text[at]); }

bool is_control(std::string_view text, std::size_t at, std::size_t length) {
  const unsigned lead = byte_at(text, at);
  if (length == 1) return lead < 0x20 || lead == 0x7F;
  return lead == 0xC2 && byte_at(text, at + 1) < 0xA0;  // U+0080 to U+009F
}

}  // namespace

std::string harmless(std::string_view text, std::size_t longest) {
  std::string shown;
  for (std::size_t i = 0; i < text.size();) {
    if (i >= longest) return shown + "…";
    const std::size_t length = utf8_length(text, i);
    const std::size_t step = length == 0 ? 1 : length;
    if (length == 0 || is_control(text, i, length)) {
      for (std::size_t k = 0; k < step; ++k) shown += fmt::format("\\x{:02X}", byte_at(text, i + k));
    } else {
      shown += text.substr(i, step);
    }
    i += step;
  }
  return shown;
}

std::string in_quotes(std::string_view text) { return fmt::format("\"{}\"", harmless(text, kLongestShown)); }

std::string listed(const std::vector<std::string>& names) {
  constexpr std::size_t most = 12;
  std::string text;
  const std::size_t count = names.size() < most ? names.size() : most;
  for (std::size_t i = 0; i < count; ++i) {
    if (i > 0) text += i + 1 == names.size() ? " or " : ", ";
    text += names[i];
  }
  return names.size() > most ? text + ", …" : text;
}

std::string did_you_mean(const std::string& name, const std::vector<std::string>& known) {
  // The distance costs time and memory with the name's length, and a stranger chose the name.
  const std::string nearest = name.size() > kLongestShown ? std::string() : nearest_name(name, known);
  if (nearest.empty()) return "Known here: " + listed(known);
  return fmt::format("Perhaps {} is meant", in_quotes(nearest));
}

std::string plain(double value) { return fmt::format("{}", value); }

}  // namespace sunfall

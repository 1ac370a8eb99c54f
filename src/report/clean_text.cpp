#include <string>

#include "core/utf8.h"
#include "report/canvas.h"

namespace sunfall {

std::string clean_text(const std::string& text) {
  std::string clean;
  for (std::size_t at = 0; at < text.size();) {
    const std::size_t length = utf8_length(text, at);
    const auto first = static_cast<unsigned char>(text[at]);
    if (length == 0) {
      clean += "\xEF\xBF\xBD";
    } else if (first < 0x20U || first == 0x7FU) {
      clean += ' ';
    } else {
      clean.append(text, at, length);
    }
    at += length == 0 ? 1 : length;
  }
  return clean;
}

}  // namespace sunfall

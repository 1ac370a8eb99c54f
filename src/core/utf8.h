#pragma once
// Telling UTF-8 from other bytes.

#include <cstddef>
#include <string_view>

namespace sunfall {

// The length in bytes of the character that begins at `at` (inside the text), or 0 where none does.
// RFC 3629 §4: the lead byte fixes the length and which second bytes may follow, so that there are
// no overlong forms, no surrogates and nothing above U+10FFFF.
inline std::size_t utf8_length(std::string_view text, std::size_t at) {
  const auto byte = [&](std::size_t i) -> unsigned {
    return i < text.size() ? static_cast<unsigned char>(text[i]) : 0U;  // 0 never continues
  };
  const unsigned lead = byte(at);
  if (lead < 0x80U) return 1;
  if (lead < 0xC2U || lead > 0xF4U) return 0;
  const std::size_t length = lead < 0xE0U ? 2 : lead < 0xF0U ? 3 : 4;
  const unsigned least = lead == 0xE0U ? 0xA0U : lead == 0xF0U ? 0x90U : 0x80U;
  const unsigned most = lead == 0xEDU ? 0x9FU : lead == 0xF4U ? 0x8FU : 0xBFU;
  if (byte(at + 1) < least || byte(at + 1) > most) return 0;
  for (std::size_t i = 2; i < length; ++i) {
    if ((byte(at + i) & 0xC0U) != 0x80U) return 0;
  }
  return length;
}

}  // namespace sunfall

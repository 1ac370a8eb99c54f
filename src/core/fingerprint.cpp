#include "core/fingerprint.h"

#include <openssl/evp.h>

#include <array>
#include <fstream>
#include <memory>
#include <string_view>
#include <vector>

#include "sunfall/error.h"

namespace sunfall {
namespace {

// Hides OpenSSL's three steps; any of them fails only when the library itself is broken.
class Sha256 {
 public:
  Sha256() : context_(EVP_MD_CTX_new(), EVP_MD_CTX_free) {
    require(context_ && EVP_DigestInit_ex(context_.get(), EVP_sha256(), nullptr) == 1);
  }
  void add(std::string_view bytes) {
    require(EVP_DigestUpdate(context_.get(), bytes.data(), bytes.size()) == 1);
  }
  std::string hexadecimal() {
    std::array<unsigned char, EVP_MAX_MD_SIZE> digest{};
    unsigned int length = 0;
    require(EVP_DigestFinal_ex(context_.get(), digest.data(), &length) == 1);
    constexpr std::string_view kDigits = "0123456789abcdef";
    std::string text;
    for (unsigned int i = 0; i < length; ++i) {
      text += kDigits[digest[i] >> 4U];
      text += kDigits[digest[i] & 15U];
    }
    return text;
  }

 private:
  static void require(bool good) {
    if (!good) throw Error(ErrorKind::internal, {"SHA-256 is not available from OpenSSL", "", "", ""});
  }
  std::unique_ptr<EVP_MD_CTX, decltype(&EVP_MD_CTX_free)> context_;
};

}  // namespace

Fingerprint fingerprint(const std::filesystem::path& file) {
  const auto fail = [&](const std::string& what) {
    throw Error(ErrorKind::io, {what, file.string(), "", "check that the file exists and may be read"});
  };
  std::ifstream in(file, std::ios::binary);
  if (!in) fail("cannot be opened");
  Sha256 hash;
  Fingerprint print;
  std::vector<char> piece(std::size_t{1} << 20U);
  while (in) {
    in.read(piece.data(), static_cast<std::streamsize>(piece.size()));
    hash.add({piece.data(), static_cast<std::size_t>(in.gcount())});
    print.size += static_cast<std::uintmax_t>(in.gcount());
  }
  if (in.bad()) fail("cannot be read to its end");
  print.sha256 = hash.hexadecimal();
  return print;
}

}  // namespace sunfall

// SPDX-License-Identifier: Apache-2.0
// SHA-256 by OpenSSL's digest interface.
#include "plate/sha256.h"

#include <openssl/evp.h>

#include <array>
#include <stdexcept>

namespace whorl::plate {

std::string sha256_hex(std::string_view bytes) {
  std::array<unsigned char, EVP_MAX_MD_SIZE> digest{};
  unsigned int length = 0;
  if (EVP_Digest(bytes.data(), bytes.size(), digest.data(), &length, EVP_sha256(), nullptr) != 1)
    throw std::runtime_error("the crypto library cannot compute SHA-256");
  constexpr std::string_view kDigits = "0123456789abcdef";
  std::string hex;
  for (unsigned int i = 0; i < length; ++i) {
    hex += kDigits[digest[i] >> 4];
    hex += kDigits[digest[i] & 15u];
  }
  return hex;
}

}  // namespace whorl::plate

// SPDX-License-Identifier: Apache-2.0
// SHA-256 against the standard's own examples.
#include "plate/sha256.h"

#include "support/catch.h"

#include <string>

namespace whorl::plate {

TEST_CASE("SHA-256 gives the digests of the standard's examples", "[plate][sha256]") {
  // NIST, Secure Hash Standard examples, SHA-256: "abc", the 448-bit message, a million times "a"; and the empty message.
  CHECK(sha256_hex("abc") == "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
  CHECK(sha256_hex("abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq") ==
        "248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1");
  CHECK(sha256_hex(std::string(1000000, 'a')) == "cdc76e5c9914fb9281a1c7e284d73e67f1809a48a497200e046d39ccc7112cd0");
  CHECK(sha256_hex("") == "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855");
}

}  // namespace whorl::plate

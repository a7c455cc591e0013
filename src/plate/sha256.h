// SPDX-License-Identifier: Apache-2.0
// The fingerprint of a scene file in the record.
#pragma once

#include <string>
#include <string_view>

namespace whorl::plate {

/// SHA-256 (FIPS 180-4) in 64 lower-case hexadecimal digits.
std::string sha256_hex(std::string_view bytes);

}  // namespace whorl::plate

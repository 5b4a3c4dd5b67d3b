// Fingerprint of a model's text, so that a result names exactly what it came from.
#pragma once

#include <string>

namespace annulet {

/// SHA-256 [FIPS180] of the bytes, 64 lower-case hexadecimal digits.
std::string sha256(const std::string& bytes);

}  // namespace annulet

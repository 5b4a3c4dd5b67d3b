#include <annulet/core/diagnostics.hpp>
#include <annulet/io/sha256.hpp>

#include <fmt/format.h>
#include <openssl/evp.h>

#include <array>

namespace annulet {

std::string sha256(const std::string& bytes) {
    std::array<unsigned char, EVP_MAX_MD_SIZE> digest{};
    unsigned int length = 0;
    if (EVP_Digest(bytes.data(), bytes.size(), digest.data(), &length, EVP_sha256(), nullptr) != 1)
        throw NumericalError("SHA-256 is not available in this system's cryptographic library");
    std::string text;
    for (unsigned int i = 0; i < length; ++i) text += fmt::format("{:02x}", digest[i]);
    return text;
}

}  // namespace annulet

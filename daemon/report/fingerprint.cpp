#include "daemon/report/fingerprint.hpp"

#include <fmt/format.h>
#include <openssl/evp.h>

#include <array>
#include <stdexcept>

namespace slipledger::report {

std::string fingerprint(std::string_view text) {
    std::array<unsigned char, EVP_MAX_MD_SIZE> digest{};
    unsigned int length = 0;
    if (EVP_Digest(text.data(), text.size(), digest.data(), &length, EVP_sha256(), nullptr) != 1)
        throw std::runtime_error("OpenSSL cannot make a SHA-256 digest");
    std::string digits;
    for (std::size_t i = 0; i < 16; ++i) digits += fmt::format("{:02x}", digest[i]);
    return digits;
}

}  // namespace slipledger::report

#include "daemon/intake/sha256.hpp"

#include <array>
#include <stdexcept>

#include <openssl/evp.h>

namespace slipledger::intake {

struct Sha256::Context {
    EVP_MD_CTX* md = EVP_MD_CTX_new();
    ~Context() { EVP_MD_CTX_free(md); }
};

Sha256::Sha256() : context_(std::make_unique<Context>()) {
    if (EVP_DigestInit_ex(context_->md, EVP_sha256(), nullptr) != 1) throw std::runtime_error("SHA-256 is not available");
}

Sha256::~Sha256() = default;

void Sha256::add(std::span<const char> bytes) { EVP_DigestUpdate(context_->md, bytes.data(), bytes.size()); }

std::string Sha256::digest() {
    std::array<unsigned char, EVP_MAX_MD_SIZE> bytes{};
    unsigned size = 0;
    EVP_DigestFinal_ex(context_->md, bytes.data(), &size);
    constexpr std::string_view digits = "0123456789abcdef";
    std::string text;
    for (unsigned i = 0; i < size; ++i) {
        text += digits[bytes[i] >> 4];
        text += digits[bytes[i] & 15];
    }
    return text;
}

}  // namespace slipledger::intake

// Bytes out and bytes in for the hour block: whole numbers of variable length, and arrays whose bytes of equal weight
// stand side by side so that zstd sees them together. Reading past the end throws, never overruns.
#pragma once

#include <cstddef>
#include <cstdint>
#include <span>
#include <vector>

namespace slipledger::ledger {

// Threads: one at a time.
class ByteWriter {
public:
    void clear() { bytes_.clear(); }
    void byte(std::uint8_t value) { bytes_.push_back(std::byte{value}); }
    void varint(std::uint64_t value);                                    // 7 bits a byte, lowest first
    void planes(std::span<const std::uint64_t> values, unsigned width);  // width bytes of each, lowest plane first
    void bits(std::span<const std::uint8_t> flags);                      // 8 flags a byte, lowest bit first
    std::span<const std::byte> bytes() const { return bytes_; }

private:
    std::vector<std::byte> bytes_;
};

// Threads: one at a time. Throws BlockDamaged at the end of the bytes.
class ByteReader {
public:
    explicit ByteReader(std::span<const std::byte> bytes) : bytes_(bytes) {}

    std::uint8_t byte();
    std::uint64_t varint();
    void planes(std::span<std::uint64_t> values, unsigned width);
    void bits(std::span<std::uint8_t> flags);
    bool at_end() const { return bytes_.empty(); }

private:
    std::span<const std::byte> take(std::size_t count);

    std::span<const std::byte> bytes_;
};

// Bytes needed for the value: 0 for 0, up to 8.
constexpr unsigned width_of(std::uint64_t value) {
    unsigned width = 0;
    for (; value != 0; value >>= 8U) ++width;
    return width;
}

// Small for small distances of either sign.
constexpr std::uint64_t zigzag(std::int64_t value) {
    return (static_cast<std::uint64_t>(value) << 1U) ^ static_cast<std::uint64_t>(value >> 63);
}
constexpr std::int64_t unzigzag(std::uint64_t value) {
    return static_cast<std::int64_t>(value >> 1U) ^ -static_cast<std::int64_t>(value & 1U);
}

}  // namespace slipledger::ledger

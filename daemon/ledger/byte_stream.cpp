#include "daemon/ledger/byte_stream.hpp"

#include "daemon/ledger/block_format.hpp"

namespace slipledger::ledger {

void ByteWriter::varint(std::uint64_t value) {
    for (; value >= 0x80U; value >>= 7U) byte(static_cast<std::uint8_t>(value | 0x80U));
    byte(static_cast<std::uint8_t>(value));
}

void ByteWriter::planes(std::span<const std::uint64_t> values, unsigned width) {
    std::size_t at = bytes_.size();
    bytes_.resize(at + width * values.size());
    for (unsigned plane = 0; plane < width; ++plane)
        for (const std::uint64_t value : values) bytes_[at++] = static_cast<std::byte>(value >> (8U * plane));
}

void ByteWriter::bits(std::span<const std::uint8_t> flags) {
    const std::size_t at = bytes_.size();
    bytes_.resize(at + (flags.size() + 7) / 8);
    for (std::size_t i = 0; i < flags.size(); ++i)
        if (flags[i] != 0) bytes_[at + i / 8] |= std::byte{1} << static_cast<int>(i % 8);
}

std::span<const std::byte> ByteReader::take(std::size_t count) {
    if (count > bytes_.size()) throw BlockDamaged("hour block ends too early");
    const auto taken = bytes_.first(count);
    bytes_ = bytes_.subspan(count);
    return taken;
}

std::uint8_t ByteReader::byte() { return static_cast<std::uint8_t>(take(1)[0]); }

std::uint64_t ByteReader::varint() {
    std::uint64_t value = 0;
    for (unsigned shift = 0; shift < 64; shift += 7) {
        const std::uint8_t next = byte();
        value |= static_cast<std::uint64_t>(next & 0x7FU) << shift;
        if ((next & 0x80U) == 0) return value;
    }
    throw BlockDamaged("hour block holds a number that does not end");
}

void ByteReader::planes(std::span<std::uint64_t> values, unsigned width) {
    if (width > 8) throw BlockDamaged("hour block holds numbers of more than 8 bytes");
    const auto bytes = take(width * values.size());
    for (std::uint64_t& value : values) value = 0;
    for (unsigned plane = 0; plane < width; ++plane) {
        const std::byte* from = bytes.data() + plane * values.size();
        for (std::size_t i = 0; i < values.size(); ++i) values[i] |= static_cast<std::uint64_t>(from[i]) << (8U * plane);
    }
}

void ByteReader::bits(std::span<std::uint8_t> flags) {
    const auto bytes = take((flags.size() + 7) / 8);
    for (std::size_t i = 0; i < flags.size(); ++i)
        flags[i] = (static_cast<unsigned>(bytes[i / 8]) >> (i % 8) & 1U) != 0 ? 1 : 0;
}

}  // namespace slipledger::ledger

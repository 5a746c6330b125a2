// An hour of one point as bytes: times as steps, values as whole numbers of their last decimal where that is exact, bytes of
// equal weight side by side, then zstd. Described byte by byte in schema/README.md, "The hour block"; a change of the
// layout is a new version byte, and versions once written are read for ever.
#pragma once

#include <cstddef>
#include <cstdint>
#include <memory>
#include <span>
#include <vector>

#include "daemon/ledger/hour_cells.hpp"
#include "daemon/ledger/ledger.hpp"

namespace slipledger::ledger {

inline constexpr std::uint8_t block_version = 1;

// Bytes that are no hour block, or of a later version. Thrown by this room only.
class BlockDamaged : public LedgerFailure {
public:
    using LedgerFailure::LedgerFailure;
};

// Keeps its zstd context and buffers from block to block. Threads: one at a time; one each for writer and readers.
class BlockCodec {
public:
    BlockCodec();
    ~BlockCodec();
    BlockCodec(BlockCodec&&) noexcept;
    BlockCodec& operator=(BlockCodec&&) noexcept;

    // The bytes stand until the next call.
    std::span<const std::byte> encode(const HourCells& cells);

    // Fills `cells`, which the caller has cleared for the hour. Throws BlockDamaged; what is in `cells` then is no hour.
    void decode(std::span<const std::byte> bytes, HourCells& cells);

private:
    struct Inside;
    std::unique_ptr<Inside> inside_;
};

}  // namespace slipledger::ledger

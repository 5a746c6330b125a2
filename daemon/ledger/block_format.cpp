#include "daemon/ledger/block_format.hpp"

#include <zstd.h>

#include <algorithm>
#include <bit>
#include <cmath>
#include <numeric>
#include <string>

#include "daemon/ledger/byte_stream.hpp"

namespace slipledger::ledger {
namespace {

using analytics::quantity_count;

constexpr std::size_t most_rows = 3'600'000;  // one a millisecond
constexpr int most_digits = 12;
constexpr std::uint8_t raw_doubles = 15;  // in place of the number of decimals
constexpr int compression_level = 1;      // 3 wins under 1 % on shuffled readings and costs twice the time

enum ColumnFlag : std::uint8_t { sparse = 0x10, with_disputes = 0x20, feed_per_cell = 0x40, as_steps = 0x80 };

constexpr std::array<double, most_digits + 1> powers{1e0, 1e1, 1e2, 1e3, 1e4,  1e5, 1e6,
                                                     1e7, 1e8, 1e9, 1e10, 1e11, 1e12};

bool exact(double value, int digits, std::int64_t& scaled) {
    const double product = value * powers[static_cast<std::size_t>(digits)];
    if (!(std::abs(product) < 4.0e15)) return false;
    scaled = static_cast<std::int64_t>(product + (product < 0 ? -0.5 : 0.5));
    return static_cast<double>(scaled) / powers[static_cast<std::size_t>(digits)] == value;
}

// Decimals all values can be written with, and the values so written; raw_doubles if there is no such number.
std::uint8_t scale(std::span<const double> values, std::vector<std::int64_t>& scaled) {
    scaled.resize(values.size());
    int digits = 0;
    std::int64_t ignored = 0;
    for (const double value : values)
        while (!exact(value, digits, ignored))
            if (++digits > most_digits) return raw_doubles;
    for (std::size_t i = 0; i < values.size(); ++i)
        if (!exact(values[i], digits, scaled[i])) return raw_doubles;
    return static_cast<std::uint8_t>(digits);
}

// Steps from value to value are worth it where values wander rather than scatter.
bool wanders(std::span<const std::int64_t> values) {
    std::uint64_t steps = 0;
    std::uint64_t spread = 0;
    const std::int64_t middle = std::midpoint(*std::ranges::min_element(values), *std::ranges::max_element(values));
    for (std::size_t i = 1; i < values.size(); ++i) {
        steps += static_cast<std::uint64_t>(std::abs(values[i] - values[i - 1]));
        spread += static_cast<std::uint64_t>(std::abs(values[i] - middle));
    }
    return 2 * steps < spread;
}

void write_width_and_planes(ByteWriter& out, std::span<const std::uint64_t> numbers) {
    const unsigned width = numbers.empty() ? 0 : width_of(*std::ranges::max_element(numbers));
    out.byte(static_cast<std::uint8_t>(width));
    out.planes(numbers, width);
}

void read_width_and_planes(ByteReader& in, std::span<std::uint64_t> numbers) {
    const unsigned width = in.byte();
    in.planes(numbers, width);
}

void require(bool fine, const char* what) {
    if (!fine) throw BlockDamaged(std::string("hour block: ") + what);
}

}  // namespace

// Threads: one at a time.
struct BlockCodec::Inside {
    std::unique_ptr<ZSTD_CCtx, decltype(&ZSTD_freeCCtx)> press{ZSTD_createCCtx(), ZSTD_freeCCtx};
    std::unique_ptr<ZSTD_DCtx, decltype(&ZSTD_freeDCtx)> unpress{ZSTD_createDCtx(), ZSTD_freeDCtx};
    ByteWriter out;
    std::vector<std::byte> bytes;
    std::vector<double> values;
    std::vector<std::int64_t> scaled;
    std::vector<std::uint64_t> numbers;
    std::vector<std::uint8_t> flags;
    std::vector<std::uint16_t> feeds;

    void write_times(std::span<const std::int32_t> offsets);
    void write_column(const HourCells::Column& column);
    void write_values(std::uint8_t digits, bool steps);
    void write_feeds(const HourCells::Column& column, bool per_cell);
    std::span<const std::byte> pack();

    void read_times(ByteReader& in, std::vector<std::int32_t>& offsets);
    void read_column(ByteReader& in, std::size_t rows, HourCells::Column& column);
    void read_sparse_column(ByteReader& in, std::uint8_t head, HourCells::Column& column);
    void read_values(ByteReader& in, std::uint8_t head, std::span<double> into);
    void read_feeds(ByteReader& in, bool per_cell, std::span<std::uint16_t> into);
    std::span<const std::byte> unpack(std::span<const std::byte> packed);
};

BlockCodec::BlockCodec() : inside_(std::make_unique<Inside>()) {}
BlockCodec::~BlockCodec() = default;
BlockCodec::BlockCodec(BlockCodec&&) noexcept = default;
BlockCodec& BlockCodec::operator=(BlockCodec&&) noexcept = default;

// Number of rows, first offset, unit of the steps; then the steps in units, as bytes side by side.
void BlockCodec::Inside::write_times(std::span<const std::int32_t> offsets) {
    out.varint(offsets.size());
    if (offsets.empty()) return;
    out.varint(static_cast<std::uint64_t>(offsets.front()));
    numbers.clear();
    std::uint64_t unit = 0;
    for (std::size_t i = 1; i < offsets.size(); ++i) {
        numbers.push_back(static_cast<std::uint64_t>(offsets[i] - offsets[i - 1]));
        unit = std::gcd(unit, numbers.back());
    }
    out.varint(unit);
    for (std::uint64_t& step : numbers) step = step / unit - 1;  // all equal steps become nought bytes
    write_width_and_planes(out, numbers);
}

void BlockCodec::Inside::read_times(ByteReader& in, std::vector<std::int32_t>& offsets) {
    const std::uint64_t rows = in.varint();
    require(rows <= most_rows, "too many rows");
    offsets.resize(rows);
    if (rows == 0) return;
    std::uint64_t at = in.varint();
    const std::uint64_t unit = in.varint();
    require(at < hour_ms && unit < hour_ms, "time outside the hour");
    numbers.resize(rows - 1);
    read_width_and_planes(in, numbers);
    offsets[0] = static_cast<std::int32_t>(at);
    for (std::size_t i = 1; i < rows; ++i) {
        require(unit > 0 && numbers[i - 1] < hour_ms, "times do not ascend");
        at += (numbers[i - 1] + 1) * unit;
        require(at < hour_ms, "time outside the hour");
        offsets[i] = static_cast<std::int32_t>(at);
    }
}

void BlockCodec::Inside::write_column(const HourCells::Column& column) {
    values.clear();
    for (const double value : column.values)
        if (!std::isnan(value)) values.push_back(value);
    const bool full = values.size() == column.values.size();
    const bool disputed = std::ranges::find(column.disputed, std::uint8_t{1}) != column.disputed.end();
    const std::uint16_t feed = *std::ranges::max_element(column.feeds);
    bool one_feed = true;
    for (std::size_t i = 0; i < column.values.size(); ++i)
        one_feed = one_feed && (column.feeds[i] == feed || std::isnan(column.values[i]));
    const std::uint8_t digits = scale(values, scaled);
    const bool steps = digits != raw_doubles && values.size() > 1 && wanders(scaled);
    out.byte(static_cast<std::uint8_t>(digits | (full ? 0 : sparse) | (disputed ? with_disputes : 0) |
                                       (one_feed ? 0 : feed_per_cell) | (steps ? as_steps : 0)));
    if (!full) {
        flags.clear();
        for (const double value : column.values) flags.push_back(std::isnan(value) ? 0 : 1);
        out.bits(flags);
    }
    if (disputed) out.bits(column.disputed);
    write_feeds(column, !one_feed);
    write_values(digits, steps);
}

void BlockCodec::Inside::write_feeds(const HourCells::Column& column, bool per_cell) {
    if (!per_cell) return out.varint(*std::ranges::max_element(column.feeds));
    numbers.clear();
    for (std::size_t i = 0; i < column.values.size(); ++i)
        if (!std::isnan(column.values[i])) numbers.push_back(column.feeds[i]);
    write_width_and_planes(out, numbers);
}

void BlockCodec::Inside::write_values(std::uint8_t digits, bool steps) {
    if (values.empty()) return;
    numbers.clear();
    if (digits == raw_doubles) {
        for (const double value : values) numbers.push_back(std::bit_cast<std::uint64_t>(value));
        return out.planes(numbers, 8);
    }
    const std::int64_t base = steps ? scaled.front() : *std::ranges::min_element(scaled);
    out.varint(zigzag(base));
    std::int64_t before = base;
    for (const std::int64_t value : scaled) {
        numbers.push_back(steps ? zigzag(value - before) : static_cast<std::uint64_t>(value - base));
        before = value;
    }
    write_width_and_planes(out, numbers);
}

void BlockCodec::Inside::read_column(ByteReader& in, std::size_t rows, HourCells::Column& column) {
    const std::uint8_t head = in.byte();
    column.values.resize(rows);
    column.feeds.resize(rows);
    column.disputed.clear();
    if ((head & (sparse | with_disputes)) != 0) return read_sparse_column(in, head, column);
    read_feeds(in, (head & feed_per_cell) != 0, column.feeds);
    read_values(in, head, column.values);
}

void BlockCodec::Inside::read_sparse_column(ByteReader& in, std::uint8_t head, HourCells::Column& column) {
    const std::size_t rows = column.values.size();
    flags.assign(rows, 1);
    if ((head & sparse) != 0) in.bits(flags);
    if ((head & with_disputes) != 0) {
        column.disputed.resize(rows);
        in.bits(column.disputed);
    }
    const auto filled = static_cast<std::size_t>(std::ranges::count(flags, std::uint8_t{1}));
    feeds.resize(filled);
    values.resize(filled);
    read_feeds(in, (head & feed_per_cell) != 0, feeds);
    read_values(in, head, values);
    for (std::size_t i = 0, from = 0; i < rows; ++i) {
        column.values[i] = flags[i] != 0 ? values[from] : std::numeric_limits<double>::quiet_NaN();
        column.feeds[i] = flags[i] != 0 ? feeds[from] : std::uint16_t{0};
        from += flags[i];
    }
}

void BlockCodec::Inside::read_feeds(ByteReader& in, bool per_cell, std::span<std::uint16_t> into) {
    if (!per_cell) {
        std::ranges::fill(into, static_cast<std::uint16_t>(in.varint()));
        return;
    }
    numbers.resize(into.size());
    read_width_and_planes(in, numbers);
    std::ranges::transform(numbers, into.begin(), [](std::uint64_t feed) { return static_cast<std::uint16_t>(feed); });
}

void BlockCodec::Inside::read_values(ByteReader& in, std::uint8_t head, std::span<double> into) {
    if (into.empty()) return;
    numbers.resize(into.size());
    const std::uint8_t digits = head & 0x0FU;
    if (digits == raw_doubles) {
        in.planes(numbers, 8);
        for (std::size_t i = 0; i < into.size(); ++i) into[i] = std::bit_cast<double>(numbers[i]);
        return;
    }
    require(digits <= most_digits, "too many decimals");
    const std::uint64_t base = static_cast<std::uint64_t>(unzigzag(in.varint()));
    read_width_and_planes(in, numbers);
    const double divisor = powers[digits];
    std::uint64_t at = base;
    for (std::size_t i = 0; i < into.size(); ++i) {  // unsigned: damaged bytes may wrap round
        at = (head & as_steps) != 0 ? at + static_cast<std::uint64_t>(unzigzag(numbers[i])) : base + numbers[i];
        into[i] = static_cast<double>(static_cast<std::int64_t>(at)) / divisor;
    }
}

// Version, length before compression, then one zstd frame; or the bytes as they are where that is shorter.
std::span<const std::byte> BlockCodec::Inside::pack() {
    const auto plain = out.bytes();
    ByteWriter head;
    head.byte(block_version);
    head.varint(plain.size());
    const std::size_t start = head.bytes().size();
    bytes.resize(start + std::max(ZSTD_compressBound(plain.size()), plain.size()));
    std::ranges::copy(head.bytes(), bytes.begin());
    const std::size_t size = ZSTD_compressCCtx(press.get(), bytes.data() + start, bytes.size() - start, plain.data(),
                                               plain.size(), compression_level);
    if (ZSTD_isError(size) == 0 && size < plain.size()) return std::span(bytes).first(start + size);
    std::ranges::copy(plain, bytes.begin() + static_cast<std::ptrdiff_t>(start));
    return std::span(bytes).first(start + plain.size());
}

std::span<const std::byte> BlockCodec::Inside::unpack(std::span<const std::byte> packed) {
    ByteReader head(packed);
    const std::uint8_t version = head.byte();
    require(version == block_version, "of another version than this program reads");
    const std::uint64_t size = head.varint();
    require(size <= most_rows * 128, "too long");
    const auto body = packed.subspan(1 + (size < 0x80 ? 1 : (std::bit_width(size) + 6U) / 7U));
    if (body.size() == size) return body;
    bytes.resize(size);
    const std::size_t got = ZSTD_decompressDCtx(unpress.get(), bytes.data(), size, body.data(), body.size());
    require(ZSTD_isError(got) == 0 && got == size, "does not unpack");
    return bytes;
}

std::span<const std::byte> BlockCodec::encode(const HourCells& cells) {
    ByteWriter& out = inside_->out;
    out.clear();
    inside_->write_times(cells.offsets());
    std::uint64_t used = 0;
    for (std::size_t q = 0; q < quantity_count; ++q)
        if (!cells.column(q).values.empty()) used |= std::uint64_t{1} << q;
    out.varint(used);
    for (std::size_t q = 0; q < quantity_count; ++q)
        if ((used >> q & 1U) != 0) inside_->write_column(cells.column(q));
    return inside_->pack();
}

void BlockCodec::decode(std::span<const std::byte> bytes, HourCells& cells) {
    ByteReader in(inside_->unpack(bytes));
    const HourCells::Parts parts = cells.parts();
    inside_->read_times(in, parts.offsets);
    const std::uint64_t used = in.varint();
    require(used >> quantity_count == 0, "holds quantities this program does not know");
    for (std::size_t q = 0; q < quantity_count; ++q)
        if ((used >> q & 1U) != 0) inside_->read_column(in, parts.offsets.size(), parts.columns[q]);
    require(in.at_end(), "goes on after its end");
}

}  // namespace slipledger::ledger

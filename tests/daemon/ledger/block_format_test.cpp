// The bytes of an hour block, as schema/README.md tells them.

#include "daemon/ledger/block_format.hpp"

#include <gmock/gmock.h>

#include <cmath>
#include <random>

#include "tests/daemon/ledger/ledger_fixture.hpp"

namespace slipledger::ledger {
namespace {

const std::int64_t hour = day_one.time_since_epoch().count();
const AddDisputed no_dispute = [](const DisputedValue&) { return true; };

HourCells cells_of(const std::vector<Row>& rows) {
    HourCells cells(hour);
    std::vector<const Row*> told;
    for (const Row& row : rows) told.push_back(&row);
    std::vector<Change> changes(rows.size());
    cells.merge(told, changes, no_dispute);
    return cells;
}

std::string hex(std::span<const std::byte> bytes) {
    std::string text;
    for (const std::byte byte : bytes) {
        text += "0123456789abcdef"[static_cast<unsigned>(byte) >> 4U];
        text += "0123456789abcdef"[static_cast<unsigned>(byte) & 15U];
    }
    return text;
}

void expect_same(const HourCells& a, const HourCells& b) {
    EXPECT_EQ(a.offsets(), b.offsets());
    EXPECT_EQ(a.readings(), b.readings());
    for (std::size_t q = 0; q < analytics::quantity_count; ++q) {
        ASSERT_EQ(a.column(q).values.size(), b.column(q).values.size()) << q;
        EXPECT_EQ(a.column(q).feeds, b.column(q).feeds) << q;
        EXPECT_EQ(a.column(q).disputed, b.column(q).disputed) << q;
        for (std::size_t i = 0; i < a.column(q).values.size(); ++i) {
            const double left = a.column(q).values[i];
            const double right = b.column(q).values[i];
            EXPECT_TRUE(left == right || (std::isnan(left) && std::isnan(right))) << left << " " << right;
        }
    }
}

HourCells decode(BlockCodec& codec, std::span<const std::byte> bytes) {
    HourCells cells(hour);
    codec.decode(bytes, cells);
    return cells;
}

HourCells there_and_back(const HourCells& cells) {
    BlockCodec codec;
    const auto bytes = codec.encode(cells);
    const std::vector<std::byte> kept(bytes.begin(), bytes.end());
    BlockCodec another;
    return decode(another, kept);
}

// The example of schema/README.md: 00:00:10, 00:00:20 and 00:00:40; pressure 181.2, 181.4, 180.9 by feed 1; one temperature
// by feed 2.
TEST(BlockFormat, HasTheBytesOfTheExampleInItsDescription) {
    HourCells cells = cells_of({row_of(PointId{1}, day_one + 10s, {{Quantity::outlet_pressure, 181.2}}),
                                row_of(PointId{1}, day_one + 20s, {{Quantity::outlet_pressure, 181.4}}),
                                row_of(PointId{1}, day_one + 40s, {{Quantity::outlet_pressure, 180.9}}),
                                row_of(PointId{1}, day_one + 20s, {{Quantity::fluid_temperature, 48.0}}, FeedId{2})});
    BlockCodec codec;
    EXPECT_EQ(hex(codec.encode(cells)),
              "01" "16"        // version 1, 22 bytes, not compressed
              "03"             // three rows
              "904e" "904e"    // the first at 10000 ms, steps in units of 10000 ms
              "01" "0001"      // one byte each: steps of 1 and 2 units, less one
              "09"             // quantities 0 and 3
              "01" "01"        // pressure: one decimal, all cells filled; by feed 1
              "a21c" "01" "030500"  // 1809 and one byte each: 3, 5 and 0 more
              "10" "02" "02"   // temperature: no decimal, sparse; the second of the rows; by feed 2
              "60" "00");      // 48, and nothing more
    expect_same(cells, there_and_back(cells));
}

TEST(BlockFormat, KeepsEveryDoubleExactly) {
    std::mt19937_64 random(5);
    std::vector<Row> rows;
    for (int i = 0; i < 600; ++i) {
        const double any = static_cast<double>(random() % 1'000'003) / 999'983.0;
        rows.push_back(row_of(PointId{1}, day_one + std::chrono::milliseconds(i * 5000 + static_cast<int>(random() % 900)),
                              {{Quantity::outlet_pressure, any},
                               {Quantity::shaft_speed, std::round(any * 1e7) / 1e4},
                               {Quantity::case_drain_flow, i % 7 == 0 ? 1e-300 : 1e300 * any},
                               {Quantity::hour_meter, 12040.5 + i},
                               {Quantity::inlet_pressure, -0.1 * (i % 3)},
                               {Quantity::running, 1.0}}));
        if (i % 3 == 0) rows.back().present = static_cast<std::uint16_t>(rows.back().present & ~1U);
        if (i % 5 == 0) rows.back().feed = FeedId{300};
    }
    const HourCells cells = cells_of(rows);
    expect_same(cells, there_and_back(cells));
}

TEST(BlockFormat, KeepsDisputedCellsWithoutAValue) {
    const HourCells cells = cells_of({row_of(PointId{1}, day_one, {{Quantity::outlet_pressure, 1.0}}),
                                      row_of(PointId{1}, day_one + 1s, {{Quantity::outlet_pressure, 3.0}}),
                                      row_of(PointId{1}, day_one, {{Quantity::outlet_pressure, 2.0}})});
    EXPECT_EQ(cells.disputed(), 1U);
    expect_same(cells, there_and_back(cells));
}

TEST(BlockFormat, OfADamagedBlockIsRefusedAndNeverOverruns) {
    std::vector<Row> rows;
    for (int i = 0; i < 200; ++i)
        rows.push_back(row_of(PointId{1}, day_one + i * 7s, {{Quantity::outlet_pressure, 180.0 + i % 9 * 0.1}}));
    BlockCodec codec;
    const HourCells cells = cells_of(rows);
    const auto encoded = codec.encode(cells);
    const std::vector<std::byte> good(encoded.begin(), encoded.end());
    for (std::size_t size = 0; size < good.size(); ++size)
        EXPECT_THROW(decode(codec, std::span(good).first(size)), BlockDamaged) << size;
    std::mt19937 random(7);
    for (int i = 0; i < 20'000; ++i) {
        std::vector<std::byte> bad = good;
        bad[random() % bad.size()] = static_cast<std::byte>(random());
        try {
            decode(codec, bad);
        } catch (const BlockDamaged&) {
        }
    }
    std::vector<std::byte> later = good;
    later[0] = std::byte{2};
    EXPECT_THROW(decode(codec, later), BlockDamaged);
}

// The design's aim: at most 12 bytes for a row of four values at a reading a second.
TEST(BlockFormat, TakesAtMostTwelveBytesForAFourValueRowASecond) {
    std::mt19937 random(3);
    std::normal_distribution<double> noise(0.0, 1.0);
    const auto rounded = [&](double value, double sd, double steps) {
        return std::round((value + sd * noise(random)) * steps) / steps;
    };
    std::vector<Row> rows;
    for (int i = 0; i < 3600; ++i)
        rows.push_back(row_of(PointId{1}, day_one + i * 1s,
                              {{Quantity::outlet_pressure, rounded(180.0 + 40.0 * std::sin(i / 50.0), 2.0, 1e4)},
                               {Quantity::shaft_speed, rounded(1480.0, 3.0, 1e3)},
                               {Quantity::case_drain_flow, rounded(3.0, 0.05, 1e4)},
                               {Quantity::fluid_temperature, rounded(48.0 + i / 1000.0, 0.1, 1e4)}}));
    BlockCodec codec;
    const HourCells cells = cells_of(rows);
    EXPECT_LE(codec.encode(cells).size(), rows.size() * 12);
}

}  // namespace
}  // namespace slipledger::ledger

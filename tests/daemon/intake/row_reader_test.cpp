#include "daemon/intake/row_reader.hpp"

#include <string>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "tests/daemon/intake/mill.hpp"

namespace slipledger::intake {
namespace {

using analytics::index_of;
using analytics::Quantity;
using mill::read_all;
using testing::HasSubstr;

double value(const ledger::Row& row, Quantity quantity) { return row.value[index_of(quantity)]; }
bool has(const ledger::Row& row, Quantity quantity) { return (row.present >> index_of(quantity) & 1) != 0; }

// The speed is the shaft's, though the row names a section of a double pump.
TEST(RowReader, ReadsAnNdjsonRowByQuantityNames) {
    const auto read = read_all(mill::ndjson_feed(),
                               R"({"time":"2026-03-01T06:00:00Z","pump":"press-2","section":"A","outlet_pressure":182.4,)"
                               R"("shaft_speed":1482})"
                               "\n");
    ASSERT_EQ(read.batch.rows.size(), 2U);
    const ledger::Row& of_section = read.batch.rows[0];
    const ledger::Row& of_shaft = read.batch.rows[1];
    EXPECT_EQ(of_section.time.time_since_epoch().count(), 1772344800000);
    EXPECT_EQ(of_section.point, mill::press_2_a);
    EXPECT_EQ(of_section.feed, ledger::FeedId{7});
    EXPECT_EQ(value(of_section, Quantity::outlet_pressure), 182.4);
    EXPECT_FALSE(has(of_section, Quantity::case_drain_flow));
    EXPECT_EQ(of_shaft.point, mill::press_2);
    EXPECT_EQ(of_shaft.source, of_section.source);
    EXPECT_EQ(value(of_shaft, Quantity::shaft_speed), 1482.0);
    EXPECT_EQ(read.batch.sources, 1U);
    EXPECT_TRUE(read.batch.refused.empty());
}

TEST(RowReader, ReadsAnNdjsonRowByTag) {
    config::Feed feed = mill::ndjson_feed();
    feed.tags["HPU2.PT1"] = mill::target(Quantity::outlet_pressure, "psi");
    feed.tags["HPU2.PT1"].pump = "press-2";
    feed.tags["HPU2.PT1"].section = "B";
    const auto read = read_all(feed, R"({"time":"2026-03-01T06:00:00Z","tag":"HPU2.PT1","value":3000})");
    ASSERT_EQ(read.batch.rows.size(), 1U);
    EXPECT_EQ(read.batch.rows[0].point, mill::press_2_b);
    EXPECT_EQ(value(read.batch.rows[0], Quantity::outlet_pressure), 206.8427);  // 3000 psi = 206.84272 bar
}

TEST(RowReader, ReadsWideCsvWithItsHeader) {
    const auto read = read_all(mill::csv_feed(),
                               "time,pump,outlet_pressure,shaft_speed\r\n"
                               "2026-03-01T06:00:00Z,press-1,182.4,1482\r\n"
                               "2026-03-01T06:01:00Z,press-2,,1481\r\n");
    ASSERT_EQ(read.batch.rows.size(), 2U);
    EXPECT_EQ(read.batch.rows[0].point, mill::press_1);
    EXPECT_EQ(read.batch.rows[1].point, mill::press_2);
    EXPECT_FALSE(has(read.batch.rows[1], Quantity::outlet_pressure));
    EXPECT_EQ(read.batch.rows[1].source, 1U);
    EXPECT_EQ(read.account.through, 3U);
}

TEST(RowReader, ReadsTallCsvWithItsOwnDelimiterDecimalSignPatternAndZone) {
    config::Feed feed = mill::csv_feed();
    feed.layout = config::CsvLayout::tall;
    feed.delimiter = ';';
    feed.decimal = ',';
    feed.time.column = "Zeit";
    feed.time.pattern = "%d.%m.%Y %H:%M:%S";
    feed.time.zone = "Europe/Berlin";
    feed.tag_column = "Messstelle";
    feed.value_column = "Wert";
    feed.tags["T1"] = mill::target(Quantity::fluid_temperature);
    feed.tags["T1"].reservoir = "tank";
    const auto read = read_all(feed, "Messstelle;Zeit;Wert\nT1;01.03.2026 07:00:00;48,25\n");
    ASSERT_EQ(read.batch.rows.size(), 1U);
    EXPECT_EQ(read.batch.rows[0].time.time_since_epoch().count(), 1772344800000);
    EXPECT_EQ(read.batch.rows[0].point, mill::tank);
    EXPECT_EQ(value(read.batch.rows[0], Quantity::fluid_temperature), 48.25);
}

TEST(RowReader, SpreadsOneRowOverThePointsItsColumnsBelongTo) {
    config::Feed feed = mill::csv_feed();
    feed.pump = "press-2";
    feed.columns["PA"] = mill::target(Quantity::outlet_pressure);
    feed.columns["PA"].section = "A";
    feed.columns["PB"] = mill::target(Quantity::outlet_pressure);
    feed.columns["PB"].section = "B";
    feed.columns["n"] = mill::target(Quantity::shaft_speed);
    feed.columns["TT"] = mill::target(Quantity::fluid_temperature);
    feed.columns["TT"].reservoir = "tank";
    const auto read = read_all(feed, "time,PA,PB,n,TT\n2026-03-01T06:00:00Z,180,90,1480,48\n");
    ASSERT_EQ(read.batch.rows.size(), 4U);
    EXPECT_EQ(read.batch.sources, 1U);
    EXPECT_EQ(read.batch.rows[0].point, mill::press_2_a);
    EXPECT_EQ(read.batch.rows[1].point, mill::press_2_b);
    EXPECT_EQ(read.batch.rows[2].point, mill::press_2);
    EXPECT_EQ(read.batch.rows[3].point, mill::tank);
    for (const auto& row : read.batch.rows) EXPECT_EQ(row.source, 0U);
}

TEST(RowReader, HandsTwoColumnsOfOneCellOnAsTwoValues) {
    config::Feed feed = mill::csv_feed();
    feed.columns["P1"] = feed.columns["P2"] = mill::target(Quantity::outlet_pressure);
    const auto read = read_all(feed, "time,pump,P1,P2\n2026-03-01T06:00:00Z,press-1,180,181\n");
    ASSERT_EQ(read.batch.rows.size(), 2U);
    EXPECT_EQ(value(read.batch.rows[0], Quantity::outlet_pressure), 180.0);
    EXPECT_EQ(value(read.batch.rows[1], Quantity::outlet_pressure), 181.0);
}

TEST(RowReader, RoundsToSevenDigits) {
    const auto read = read_all(mill::csv_feed(), "time,pump,outlet_pressure\n2026-03-01T06:00:00Z,press-1,182.12345678\n");
    ASSERT_EQ(read.batch.rows.size(), 1U);
    EXPECT_EQ(value(read.batch.rows[0], Quantity::outlet_pressure), 182.1235);
}

TEST(RowReader, ReadsRowsWithoutHeaderByTheNamesOfTheFeed) {
    config::Feed feed = mill::csv_feed();
    feed.header = false;
    feed.header_names = {"time", "pump", "case_drain_flow"};
    const auto read = read_all(feed, "2026-03-01T06:00:00Z,press-1,3.1\n");
    ASSERT_EQ(read.batch.rows.size(), 1U);
    EXPECT_EQ(value(read.batch.rows[0], Quantity::case_drain_flow), 3.1);
}

TEST(RowReader, PassesOverTheHeaderOfAFileLaidBehindAnother) {
    const auto read = read_all(mill::csv_feed(),
                               "time,pump,shaft_speed\n2026-03-01T06:00:00Z,press-1,1\n"
                               "time,pump,shaft_speed\n2026-03-01T06:01:00Z,press-1,2\n");
    EXPECT_EQ(read.batch.rows.size(), 2U);
    EXPECT_TRUE(read.batch.refused.empty());
}

struct RefusedRow {
    std::string name;
    std::string row;
    std::string code;
};

class RowReaderRefusesTheRow : public testing::TestWithParam<RefusedRow> {};

TEST_P(RowReaderRefusesTheRow, WithItsCodePlaceAndTextAndReadsOn) {
    const std::string good = "2026-03-01T06:00:00Z,press-1,A,180\n";
    const auto read = read_all(mill::csv_feed(), "time,pump,section,outlet_pressure\n" + GetParam().row + "\n" + good);
    ASSERT_EQ(read.batch.refused.size(), 1U);
    EXPECT_EQ(read.batch.refused[0].code, GetParam().code) << read.batch.refused[0].message;
    EXPECT_EQ(read.batch.refused[0].place, "line 2");
    EXPECT_EQ(read.batch.refused[0].text, GetParam().row.substr(0, 1024));
    EXPECT_EQ(read.account.refused, 1U);
    EXPECT_EQ(read.batch.rows.size(), 1U);
    ASSERT_EQ(read.account.faults.size(), 1U);
    EXPECT_EQ(read.account.faults[0].line, 2U);
}

INSTANTIATE_TEST_SUITE_P(
    Rows, RowReaderRefusesTheRow,
    testing::Values(RefusedRow{"BadTime", "soon,press-1,A,180", "bad-time"},
                    RefusedRow{"NoTime", ",press-1,A,180", "missing-time"},
                    RefusedRow{"UnknownPump", "2026-03-01T06:00:00Z,press-3,A,180", "unknown-pump"},
                    RefusedRow{"NoPump", "2026-03-01T06:00:00Z,,A,180", "missing-pump"},
                    RefusedRow{"UnknownSection", "2026-03-01T06:00:00Z,press-1,C,180", "unknown-section"},
                    RefusedRow{"TooFewFields", "2026-03-01T06:00:00Z,press-1,A", "wrong-field-count"},
                    RefusedRow{"TooManyFields", "2026-03-01T06:00:00Z,press-1,A,180,5", "wrong-field-count"},
                    RefusedRow{"OpenQuote", "2026-03-01T06:00:00Z,press-1,A,\"180", "bad-quote"},
                    RefusedRow{"NothingInIt", "2026-03-01T06:00:00Z,press-1,A,", "no-value"},
                    RefusedRow{"OnlyCellIsBad", "2026-03-01T06:00:00Z,press-1,A,18l.2", "bad-number"},
                    RefusedRow{"NoPumpCanBeThere", "2026-03-01T06:00:00Z,press-1,A,1e6", "out-of-range"},
                    RefusedRow{"BeyondTheInstrument", "2026-03-01T06:00:00Z,press-1,A,270", "out-of-range"},
                    RefusedRow{"Future", "2026-03-01T12:15:01Z,press-1,A,180", "future"},
                    RefusedRow{"TooLong", std::string(70000, 'x'), "line-too-long"}),
    [](const auto& each) { return each.param.name; });

TEST(RowReader, TakesAReadingAsFarAheadAsAllowed) {
    EXPECT_EQ(read_all(mill::csv_feed(), "time,pump,shaft_speed\n2026-03-01T12:15:00Z,press-1,1480\n").batch.rows.size(), 1U);
}

TEST(RowReader, RefusesABadCellAndTakesTheRestOfTheRow) {
    const auto read = read_all(mill::csv_feed(), "time,pump,outlet_pressure,shaft_speed\n2026-03-01T06:00:00Z,press-1,18l.2,1482\n");
    ASSERT_EQ(read.batch.rows.size(), 1U);
    EXPECT_FALSE(has(read.batch.rows[0], Quantity::outlet_pressure));
    ASSERT_EQ(read.batch.refused.size(), 1U);
    EXPECT_EQ(read.batch.refused[0].message,
              "outlet_pressure \"18l.2\" is not a number; wanted bar, e.g. 181.2 (bad-number)");
    EXPECT_EQ(read.account.refused, 0U);
    EXPECT_EQ(read.account.faults.size(), 1U);
}

TEST(RowReader, SaysOnceThatAColumnIsNotRead) {
    const auto read = read_all(mill::csv_feed(),
                               "time,pump,shaft_sped,outlet_pressure\n2026-03-01T06:00:00Z,press-1,1482,180\n"
                               "2026-03-01T06:01:00Z,press-1,1482,180\n");
    ASSERT_EQ(read.batch.refused.size(), 1U);
    EXPECT_EQ(read.batch.refused[0].code, "unknown-column");
    EXPECT_THAT(read.batch.refused[0].message, HasSubstr("perhaps \"shaft_speed\""));
    EXPECT_EQ(read.batch.rows.size(), 2U);
    EXPECT_EQ(read.account.refused, 0U);
}

TEST(RowReader, SaysOnceThatAKeyIsNotRead) {
    const std::string row = R"({"time":"2026-03-01T06:00:00Z","pump":"press-1","shaft_speed":1482,"site":4})";
    const auto read = read_all(mill::ndjson_feed(), row + "\n" + row + "\n");
    ASSERT_EQ(read.batch.refused.size(), 1U);
    EXPECT_EQ(read.batch.refused[0].code, "unknown-column");
    EXPECT_EQ(read.batch.rows.size(), 2U);
}

TEST(RowReader, RefusesAnUnknownTagWithTheNearest) {
    config::Feed feed = mill::ndjson_feed();
    feed.tags["HPU2.PT1"] = mill::target(Quantity::outlet_pressure);
    const auto read = read_all(feed, R"({"time":"2026-03-01T06:00:00Z","pump":"press-1","tag":"HPU2.PT7","value":3})");
    ASSERT_EQ(read.batch.refused.size(), 1U);
    EXPECT_EQ(read.batch.refused[0].code, "unknown-tag");
    EXPECT_THAT(read.batch.refused[0].message, HasSubstr("perhaps \"HPU2.PT1\""));
}

TEST(RowReader, RefusesATextWhereANumberIsWanted) {
    const auto read = read_all(mill::ndjson_feed(), R"({"time":"2026-03-01T06:00:00Z","pump":"press-1","shaft_speed":"1482"})");
    ASSERT_EQ(read.batch.refused.size(), 1U);
    EXPECT_EQ(read.batch.refused[0].code, "bad-number");
}

TEST(RowReader, GivesUpBelowAHeaderThatNamesNoTime) {
    const auto plant = mill::pumps();
    const Mapping mapping(mill::csv_feed(), mill::directory(), plant);
    RowReader reader(mapping, ReadOptions{});
    std::string_view bytes = "pump,shaft_speed\npress-1,3\npress-1,4\n";
    reader.read(bytes, mill::noon());
    EXPECT_TRUE(reader.hopeless());
    const auto read = reader.take();
    ASSERT_EQ(read.batch.refused.size(), 1U);
    EXPECT_EQ(read.batch.refused[0].code, "bad-header");
    EXPECT_TRUE(read.batch.rows.empty());
}

TEST(RowReader, RefusesALineThatTheConnectionCutOffAndDoesNotCountIt) {
    const auto plant = mill::pumps();
    const Mapping mapping(mill::ndjson_feed(), mill::directory(), plant);
    ReadOptions options;
    options.unfinished_counts = false;
    RowReader reader(mapping, options);
    std::string_view bytes = "{\"time\":\"2026-03-01T06:00:00Z\",\"pump\":\"press-1\",\"shaft_speed\":1482}\n{\"time\":";
    reader.read(bytes, mill::noon());
    reader.finish(mill::noon());
    const auto read = reader.take();
    EXPECT_EQ(read.account.through, 1U);
    ASSERT_EQ(read.batch.refused.size(), 1U);
    EXPECT_EQ(read.batch.refused[0].code, "unfinished-line");
}

TEST(RowReader, StopsAtAFullBatchAndGoesOnFromThere) {
    const auto plant = mill::pumps();
    const Mapping mapping(mill::csv_feed(), mill::directory(), plant);
    ReadOptions options;
    options.most_rows = 2;
    RowReader reader(mapping, options);
    const std::string text =
        "time,pump,shaft_speed\n2026-03-01T06:00:00Z,press-1,1\n2026-03-01T06:01:00Z,press-1,2\n2026-03-01T06:02:00Z,press-1,3\n";
    std::string_view bytes = text;
    reader.read(bytes, mill::noon());
    EXPECT_TRUE(reader.full());
    EXPECT_FALSE(bytes.empty());
    EXPECT_EQ(reader.take().account.through, 3U);
    reader.read(bytes, mill::noon());
    const auto rest = reader.take();
    EXPECT_EQ(rest.batch.rows.size(), 1U);
    EXPECT_EQ(rest.batch.rows[0].source, 0U);
    EXPECT_EQ(rest.account.through, 4U);
}

TEST(RowReader, KeepsLittleOfARowWithManyBadCells) {
    config::Feed feed = mill::ndjson_feed();
    std::string row = R"({"time":"2026-03-01T06:00:00Z","pump":"press-1")";
    for (int i = 0; i < 200; ++i) {
        const std::string name = "c" + std::to_string(i);
        feed.columns[name] = mill::target(Quantity::outlet_pressure);
        row += ",\"" + name + "\":\"x\"";
    }
    const auto read = read_all(feed, row + "}\n");
    EXPECT_EQ(read.batch.refused.size(), BatchBuilder::most_refused_cells);
    EXPECT_EQ(read.account.faults.size() + read.account.more_faults, 200U);
    EXPECT_EQ(read.account.refused, 1U);
}

}  // namespace
}  // namespace slipledger::intake

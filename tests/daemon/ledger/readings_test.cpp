// Readings in and out of the ledger: what is stored comes back exactly, and neither order nor repeats nor batches can be told.

#include <gmock/gmock.h>

#include <SQLiteCpp/SQLiteCpp.h>
#include <cmath>
#include <cstdlib>
#include <set>

#include "tests/daemon/ledger/ledger_fixture.hpp"

namespace slipledger::ledger {
namespace {

using ::testing::ElementsAre;

const std::vector<double>& column(const PointRows& rows, Quantity quantity) {
    return rows.columns[analytics::index_of(quantity)];
}

class Readings : public LedgerTest {};

TEST_F(Readings, ComeBackAsTheyWereToldBeforeTheirHourCloses) {
    store({row_of(point("press-1"), day_one + 1min, {{Quantity::outlet_pressure, 182.4}, {Quantity::shaft_speed, 1482.0}}),
           row_of(point("press-1"), day_one + 2min, {{Quantity::outlet_pressure, 183.1}})});
    const PointRows rows = reader().rows(point("press-1"), day_one, day_one + 1h);
    EXPECT_THAT(rows.times, ElementsAre(day_one + 1min, day_one + 2min));
    EXPECT_THAT(column(rows, Quantity::outlet_pressure), ElementsAre(182.4, 183.1));
    EXPECT_EQ(column(rows, Quantity::shaft_speed)[0], 1482.0);
    EXPECT_TRUE(std::isnan(column(rows, Quantity::shaft_speed)[1]));
    EXPECT_TRUE(column(rows, Quantity::case_drain_flow).empty());
}

TEST_F(Readings, ComeBackTheSameAfterTheirHourIsMovedToABlock) {
    const double third = std::nextafter(1.0 / 3.0, 1.0);  // no decimal: the block must keep it all the same
    for (int minute = 0; minute < 150; ++minute)
        store({row_of(point("lathe"), day_one + std::chrono::minutes(minute), {{Quantity::case_drain_flow, third * minute}})});
    const PointRows before = reader().rows(point("lathe"), day_one, day_one + 3h);
    close_all_hours();
    const PointRows after = reader().rows(point("lathe"), day_one, day_one + 3h);
    EXPECT_EQ(before.times, after.times);
    EXPECT_EQ(column(before, Quantity::case_drain_flow), column(after, Quantity::case_drain_flow));
    EXPECT_EQ(after.times.size(), 150U);
    EXPECT_EQ(reader().last_row(point("lathe")).times.front(), day_one + 149min);
}

TEST_F(Readings, ThatAreRepeatedAddNothing) {
    const Row row = row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 182.4}});
    EXPECT_EQ(store({row}).stored, 1U);
    const IntakeOutcome again = store({row, row});
    EXPECT_EQ(again.stored, 0U);
    EXPECT_EQ(again.repeated, 2U);
    EXPECT_EQ(reader().count(point("press-1")).readings, 1U);
}

TEST_F(Readings, AreDisputedByASecondValueAndAThirdIsKeptToo) {
    const auto tell = [&](double value) {
        return store({row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, value}})}).stored;
    };
    EXPECT_EQ(tell(180.0), 1U);
    EXPECT_EQ(tell(181.0), 1U);
    EXPECT_EQ(tell(182.0), 1U);
    for (const double value : {180.0, 181.0, 182.0}) EXPECT_EQ(tell(value), 0U) << value;
    EXPECT_EQ(reader().count(point("press-1")).disputed, 1U);
    EXPECT_TRUE(column(reader().rows(point("press-1"), day_one, day_one + 1h), Quantity::outlet_pressure).empty());
    store({row_of(point("press-1"), day_one + 3h, {{Quantity::outlet_pressure, 1.0}})});
    close_all_hours();
    EXPECT_EQ(tell(181.0), 0U);
    EXPECT_EQ(tell(183.0), 1U);
    EXPECT_EQ(reader().count(point("press-1")).disputed, 1U);
}

TEST_F(Readings, OfACorrectingFeedSettleTheDispute) {
    plant_.feeds[1].corrects = "plc";
    const FeedId lab = ledger().directory().feeds.at("lab");
    store({row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 181.0}}, lab)});
    store({row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 170.0}}, ledger().directory().feeds.at("plc"))});
    EXPECT_THAT(column(reader().rows(point("press-1"), day_one, day_one + 1h), Quantity::outlet_pressure),
                ElementsAre(181.0));
}

// What somebody settled holds whichever came first, the readings or the word, and in whatever order the readings came.
class SettledReadings : public Readings {
protected:
    SettledReadings() { plant_.reservoirs.push_back({.id = "tank-2", .name = "Tank 2", .fluid = {}, .volume_l = {}}); }

    FeedId feed(const std::string& id) { return ledger().directory().feeds.at(id); }
    void tell(PointId at, Instant time, Quantity quantity, double value, const std::string& by) {
        store({row_of(at, time, {{quantity, value}}, feed(by))});
    }
    void settle(const std::string& pump, Instant from, Instant to, const std::string& more, const std::string& section = "") {
        Event event;
        event.pump = pump;
        event.section = section;
        event.kind = "settled";
        event.at = from;
        event.body = R"({"to_ms":)" + std::to_string(to.time_since_epoch().count()) + "," + more + "}";
        ledger().store(event);
    }
    double pressure(PointId at, Instant time) {
        const PointRows rows = reader().rows(at, time, time + 1ms);
        const auto& values = column(rows, Quantity::outlet_pressure);
        return values.empty() ? std::numeric_limits<double>::quiet_NaN() : values.front();
    }
};

TEST_F(SettledReadings, AreThoseOfTheFeedThatIsBelieved) {
    const PointId press = point("press-1");
    for (const int minute : {0, 30, 60}) {
        tell(press, day_one + std::chrono::minutes(minute), Quantity::outlet_pressure, 170.0 + minute, "plc");
        tell(press, day_one + std::chrono::minutes(minute), Quantity::outlet_pressure, 180.0 + minute, "lab");
    }
    EXPECT_EQ(reader().count(press).disputed, 3U);
    settle("press-1", day_one, day_one + 30min, R"("believe":"lab")");
    EXPECT_EQ(pressure(press, day_one), 180.0);
    EXPECT_EQ(pressure(press, day_one + 30min), 210.0) << "both ends of the span are in it";
    EXPECT_TRUE(std::isnan(pressure(press, day_one + 60min)));
    EXPECT_EQ(reader().count(press).disputed, 1U);
    store({row_of(press, day_one + 3h, {{Quantity::outlet_pressure, 1.0}})});
    close_all_hours();
    EXPECT_EQ(pressure(press, day_one), 180.0) << "in a block as in `recent`";
    EXPECT_EQ(reader().count(press).disputed, 1U);
}

TEST_F(SettledReadings, AreTheSameInWhateverOrderTheyAndTheWordCame) {
    const auto way = [&](bool word_first, bool lab_first) {
        const PointId at = point(word_first ? (lab_first ? "press-1" : "press-2") : (lab_first ? "lathe" : "double"));
        const std::string pump = word_first ? (lab_first ? "press-1" : "press-2") : (lab_first ? "lathe" : "double");
        if (word_first) settle(pump, day_one, day_one + 1h, R"("believe":"plc","quantity":"outlet_pressure")");
        for (const std::string by : {lab_first ? "lab" : "plc", lab_first ? "plc" : "lab"})
            tell(at, day_one, Quantity::outlet_pressure, by == "plc" ? 170.0 : 180.0, by);
        if (!word_first) settle(pump, day_one, day_one + 1h, R"("believe":"plc","quantity":"outlet_pressure")");
        return pressure(at, day_one);
    };
    for (const bool word_first : {true, false})
        for (const bool lab_first : {true, false}) EXPECT_EQ(way(word_first, lab_first), 170.0);
}

TEST_F(SettledReadings, GoByTheNewestWordAndByAPersonBeforeAPlantFile) {
    plant_.feeds[1].corrects = "plc";
    const PointId press = point("press-1");
    tell(press, day_one, Quantity::outlet_pressure, 170.0, "plc");
    tell(press, day_one, Quantity::outlet_pressure, 180.0, "lab");
    EXPECT_EQ(pressure(press, day_one), 180.0) << "lab corrects plc";
    settle("press-1", day_one, day_one, R"("believe":"plc")");
    EXPECT_EQ(pressure(press, day_one), 170.0);
    settle("press-1", day_one, day_one, R"("believe":"lab")");
    EXPECT_EQ(pressure(press, day_one), 180.0);
    settle("press-1", day_one, day_one, R"("believe":"command")");  // has told nothing here
    EXPECT_EQ(pressure(press, day_one), 180.0);
    settle("press-1", day_one, day_one, R"("believe":"nobody")");
    EXPECT_EQ(pressure(press, day_one), 180.0);
}

TEST_F(SettledReadings, AreOfTheirQuantityAndSectionAloneWhereOneIsNamed) {
    const PointId one = point("double", "P1");
    const PointId other = point("double", "P2");
    const PointId shaft = point("double");
    for (const PointId at : {one, other, shaft})
        for (const auto& [by, value] : {std::pair("plc", 170.0), std::pair("lab", 180.0)}) {
            tell(at, day_one, Quantity::outlet_pressure, value, by);
            tell(at, day_one, Quantity::case_drain_flow, value, by);
        }
    settle("double", day_one, day_one, R"("believe":"lab","quantity":"outlet_pressure")", "P2");
    EXPECT_TRUE(std::isnan(pressure(one, day_one)));
    EXPECT_EQ(pressure(other, day_one), 180.0);
    EXPECT_TRUE(column(reader().rows(other, day_one, day_one + 1ms), Quantity::case_drain_flow).empty());
    settle("double", day_one, day_one, R"("believe":"plc")");
    for (const PointId at : {one, other, shaft}) EXPECT_EQ(pressure(at, day_one), 170.0);
    EXPECT_EQ(column(reader().rows(other, day_one, day_one + 1ms), Quantity::case_drain_flow).front(), 170.0);
}

TEST_F(SettledReadings, OfAReservoirAreSettledByItsName) {
    const PointId tank = ledger().directory().reservoirs.at("tank-1");
    for (const auto& [by, value] : {std::pair("plc", 41.0), std::pair("lab", 45.0)})
        tell(tank, day_one, Quantity::fluid_temperature, value, by);
    settle("", day_one, day_one, R"("believe":"lab","reservoir":"tank-2")");
    EXPECT_TRUE(column(reader().rows(tank, day_one, day_one + 1ms), Quantity::fluid_temperature).empty());
    settle("", day_one, day_one, R"("believe":"lab","reservoir":"tank-1")");
    EXPECT_EQ(column(reader().rows(tank, day_one, day_one + 1ms), Quantity::fluid_temperature).front(), 45.0);
}

TEST_F(SettledReadings, StayDisputedWhereTheBelievedFeedContradictsItself) {
    const PointId press = point("press-1");
    for (const double value : {180.0, 181.0}) tell(press, day_one, Quantity::outlet_pressure, value, "lab");
    settle("press-1", day_one, day_one, R"("believe":"lab")");
    EXPECT_TRUE(std::isnan(pressure(press, day_one)));
    EXPECT_EQ(reader().count(press).disputed, 1U);
}

// 20 rows a second for an hour and a half are more than `recent` may hold: the watermark moves within the hour, and what is
// told late, again or otherwise meets a block that has begun.
TEST_F(Readings, OfACrowdedHourAreMovedBeforeItEndsAndComeBackTheSame) {
    const PointId lathe = point("lathe");
    const int all = 20 * 90 * 60;
    const auto told = [&](int i) {
        return row_of(lathe, day_one + i * 50ms, {{Quantity::outlet_pressure, 100.0 + i % 977 / 10.0}});
    };
    std::set<std::int64_t> watermarks;
    for (int from = 0; from < all; from += 6000) {
        std::vector<Row> rows;
        for (int i = from; i < from + 6000; ++i)
            if (i != 7) rows.push_back(told(i));
        EXPECT_EQ(store(std::move(rows)).repeated, 0U);
        close_all_hours();
        watermarks.insert(SQLite::Database(plant_.store.path, SQLite::OPEN_READONLY)
                              .execAndGet("SELECT coalesce(max(moved_until), 0) FROM point")
                              .getInt64());
    }
    EXPECT_GT(watermarks.size(), 2U) << "or this tests nothing";
    EXPECT_EQ(store({told(7)}).stored, 1U);
    EXPECT_EQ(store({told(8)}).repeated, 1U);
    EXPECT_EQ(store({row_of(lathe, day_one + 9 * 50ms, {{Quantity::outlet_pressure, 1.0}})}).stored, 1U);
    close();
    const PointRows rows = reader().rows(lathe, day_one, day_one + 2h);
    ASSERT_THAT(rows.times, ::testing::SizeIs(all));
    const auto& pressure = column(rows, Quantity::outlet_pressure);
    for (int i = 0; i < all; ++i) {
        if (i == 9)
            EXPECT_TRUE(std::isnan(pressure[9]));
        else
            ASSERT_EQ(pressure[static_cast<std::size_t>(i)], 100.0 + i % 977 / 10.0) << i;
    }
    EXPECT_EQ(reader().count(lathe).readings, static_cast<std::uint64_t>(all));
    EXPECT_EQ(reader().count(lathe).disputed, 1U);
}

TEST_F(Readings, ThatStillFillTheirHourCanBeHadForAllPointsAtOnce) {
    for (const char* id : {"press-1", "lathe"})
        store({row_of(point(id), day_one, {{Quantity::outlet_pressure, 180.0}}),
               row_of(point(id), day_one + 2h, {{Quantity::outlet_pressure, 181.0}})});
    close_all_hours();
    const auto filling = reader().filling(day_one, day_one + 24h);
    ASSERT_THAT(filling, ::testing::SizeIs(2));
    EXPECT_THAT(filling.at(point("lathe")).times, ElementsAre(day_one + 2h));
    EXPECT_THAT(column(filling.at(point("press-1")), Quantity::outlet_pressure), ElementsAre(181.0));
}

// What a laggard left in `recent` is neither lost nor kept from being moved when others' ghosts are deleted.
TEST_F(Readings, OfAPumpThatFellSilentOutliveTheDeletionOfOthers) {
    store({row_of(point("press-2"), day_one + 30min, {{Quantity::outlet_pressure, 90.0}})});
    for (int hour = 0; hour < 8; ++hour) {
        std::vector<Row> rows;
        for (int i = 0; i < 3600; ++i)
            rows.push_back(row_of(point("lathe"), day_one + hour * 1h + i * 1s, {{Quantity::outlet_pressure, 180.0}}));
        for (std::size_t from = 0; from < rows.size(); from += 400)
            store({rows.begin() + static_cast<std::ptrdiff_t>(from), rows.begin() + static_cast<std::ptrdiff_t>(from) + 400});
        close_all_hours();
    }
    EXPECT_EQ(reader().count(point("press-2")).readings, 1U);
    EXPECT_EQ(reader().count(point("lathe")).readings, 8U * 3600U);
    SQLite::Database database(plant_.store.path, SQLite::OPEN_READONLY);
    EXPECT_LT(database.execAndGet("SELECT count(*) FROM recent").getInt(), 3 * 3600) << "ghosts are deleted";
    store({row_of(point("press-2"), day_one + 9h, {{Quantity::outlet_pressure, 91.0}})});
    close_all_hours();
    EXPECT_THAT(column(reader().rows(point("press-2"), day_one, day_one + 24h), Quantity::outlet_pressure),
                ElementsAre(90.0, 91.0));
}

TEST_F(Readings, OfOnePumpWithOneSectionLieAtOnePoint) {
    EXPECT_EQ(point("press-1"), point("press-1", "A"));
    EXPECT_NE(point("double", "P1"), point("double", "P2"));
    EXPECT_NE(point("double"), point("double", "P1"));
}

// All that can be seen of a point, as text of exact numbers.
std::string seen(const Reader& reader, PointId point) {
    const PointRows rows = reader.rows(point, day_one - 24h * 400, day_one + 24h * 400);
    std::string text;
    char number[64];
    for (std::size_t i = 0; i < rows.times.size(); ++i) {
        text += std::to_string(rows.times[i].time_since_epoch().count());
        for (const auto& values : rows.columns) {
            std::snprintf(number, sizeof number, " %a", values.empty() ? std::nan("") : values[i]);
            text += number;
        }
        text += '\n';
    }
    const StoredCount count = reader.count(point);
    return text + std::to_string(count.readings) + " " + std::to_string(count.disputed);
}

class AnyOrder : public Readings, public ::testing::WithParamInterface<unsigned> {
protected:
    static unsigned seed() {
        const char* given = std::getenv("SLIPLEDGER_SEED");
        return given != nullptr ? static_cast<unsigned>(std::atoi(given)) : 20260105U;
    }

    std::vector<Row> rows_with_disputes(std::mt19937& random) {
        std::vector<Row> rows;
        for (int minute = 0; minute < 24 * 60; ++minute)
            for (const char* id : {"press-1", "press-2", "lathe"}) {
                const double value = std::round(1000.0 * static_cast<double>(random() % 2000)) / 10000.0;
                Row row = row_of(point(id), day_one + std::chrono::minutes(minute),
                                 {{Quantity::outlet_pressure, 100.0 + value}, {Quantity::case_drain_flow, value / 10.0}});
                rows.push_back(row);
                if (random() % 100 != 0) continue;
                row.feed = FeedId{2};
                row.value[analytics::index_of(Quantity::outlet_pressure)] += static_cast<double>(random() % 3);
                rows.push_back(row);
            }
        return rows;
    }

    std::string seen_after(const std::vector<Row>& rows, std::mt19937& random) {
        close();
        std::filesystem::remove_all(folder_.path());
        std::filesystem::create_directory(folder_.path());
        for (std::size_t from = 0; from < rows.size();) {
            const std::size_t size = std::min<std::size_t>(1 + random() % 900, rows.size() - from);
            store({rows.begin() + static_cast<std::ptrdiff_t>(from), rows.begin() + static_cast<std::ptrdiff_t>(from + size)});
            if (random() % 3 == 0) close_all_hours();
            if (random() % 16 == 0) close();
            from += size;
        }
        close_all_hours();
        std::string all;
        for (const char* id : {"press-1", "press-2", "lathe"}) all += seen(reader(), point(id));
        return all;
    }
};

TEST_P(AnyOrder, OfTheSameRowsIsSeenAsTheSameReadings) {
    std::mt19937 random(seed() + GetParam());
    SCOPED_TRACE("SLIPLEDGER_SEED=" + std::to_string(seed()));
    std::vector<Row> rows = rows_with_disputes(random);
    const std::string tidy = seen_after(rows, random);
    std::vector<Row> twice = rows;
    twice.insert(twice.end(), rows.begin(), rows.end());
    EXPECT_EQ(tidy, seen_after(twice, random));
    std::ranges::reverse(rows);
    EXPECT_EQ(tidy, seen_after(rows, random));
    std::ranges::shuffle(twice, random);
    EXPECT_EQ(tidy, seen_after(twice, random));
    EXPECT_NE(tidy.find('\n'), std::string::npos);
}

INSTANTIATE_TEST_SUITE_P(Seeds, AnyOrder, ::testing::Range(0U, 3U));

}  // namespace
}  // namespace slipledger::ledger

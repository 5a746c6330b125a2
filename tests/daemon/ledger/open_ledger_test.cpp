// Opening: one writer, no later schema, no migration changed, and a copy made beside the running ledger.

#include <gmock/gmock.h>
#include <openssl/sha.h>

#include "daemon/ledger/database.hpp"
#include "daemon/ledger/registry.hpp"
#include "tests/daemon/ledger/ledger_fixture.hpp"

namespace slipledger::ledger {
namespace {

using ::testing::HasSubstr;
using ::testing::SizeIs;

std::string sha256(std::string_view text) {
    std::array<unsigned char, SHA256_DIGEST_LENGTH> digest{};
    SHA256(reinterpret_cast<const unsigned char*>(text.data()), text.size(), digest.data());
    std::string hex;
    for (const unsigned byte : digest) {
        hex += "0123456789abcdef"[byte >> 4U];
        hex += "0123456789abcdef"[byte & 15U];
    }
    return hex;
}

template <typename Call>
std::string failure_of(Call&& call) {
    try {
        call();
    } catch (const LedgerFailure& failure) {
        return failure.what();
    }
    return "no failure";
}

class OpenLedger : public LedgerTest {};

// A ledger in the field has run these texts; whoever wants another schema writes the next number. Filled in at release.
TEST_F(OpenLedger, KnowsEachReleasedMigrationByItsHash) {
    const std::vector<std::pair<std::string, std::string>> released{
        {"0001_begin.sql", "1cd138fbc96fc3560cf6c15fde715085d7cd9169e3b80d60e0ea95ba74c2cd28"},
        {"0002_lives.sql", "72fbdd2a6467eebdf0aa3d11f06db8d6079ca90bb2866e9833c702dd94a19ce2"},
        {"0003_causes.sql", "2e6b8d335becd2eb715bd75ef7d447a2dc94e4ba3b41e30fe900c7679bede6b9"},
        {"0004_day_state.sql", "741942e0f0f1d21321146fa5bbd5607b3ea4033cb77d3460e5a0116eca51c8fc"},
    };
    const auto migrations = schema::ledger_migrations();
    ASSERT_THAT(migrations, SizeIs(released.size()));
    for (std::size_t i = 0; i < released.size(); ++i) {
        EXPECT_EQ(migrations[i].number, static_cast<int>(i) + 1);
        EXPECT_EQ(migrations[i].name, released[i].first);
        EXPECT_EQ(sha256(migrations[i].sql), released[i].second) << released[i].first << " was changed";
    }
}

TEST_F(OpenLedger, RefusesASecondWriterAndNamesTheFirst) {
    ledger();
    const std::string failure = failure_of([&] { open_ledger(plant_); });
    EXPECT_THAT(failure, HasSubstr(std::to_string(getpid())));
    EXPECT_THAT(failure, HasSubstr("ask that daemon"));
    close();
    EXPECT_NO_THROW(open_ledger(plant_));
}

TEST_F(OpenLedger, RefusesAFileOfALaterVersionToWriterAndReader) {
    ledger();
    close();
    SQLite::Database(plant_.store.path, SQLite::OPEN_READWRITE).exec("PRAGMA user_version = 99");
    EXPECT_THAT(failure_of([&] { open_ledger(plant_); }), HasSubstr("schema 99"));
    EXPECT_THAT(failure_of([&] { Reader(plant_.store.path); }), HasSubstr("later version"));
}

TEST_F(OpenLedger, SaysThatThereIsNone) {
    EXPECT_THAT(failure_of([&] { Reader(folder_ / "nothing.db"); }), HasSubstr("no ledger"));
    plant_.store.path = folder_ / "no/such/folder/ledger.db";
    EXPECT_THAT(failure_of([&] { open_ledger(plant_); }), HasSubstr("no/such/folder"));
}

TEST_F(OpenLedger, LeavesAMigrationThatFailsUndone) {
    SQLite::Database database(folder_ / "half.db", SQLite::OPEN_READWRITE | SQLite::OPEN_CREATE);
    const std::array<schema::Migration, 2> migrations{{{1, "0001_a.sql", "CREATE TABLE a (x); CREATE TABLE b (x);"},
                                                       {2, "0002_b.sql", "CREATE TABLE c (x); CREATE TABLE a (x);"}}};
    EXPECT_THROW(migrate(database, migrations), SQLite::Exception);
    EXPECT_EQ(schema_number(database), 1);
    EXPECT_TRUE(database.tableExists("b"));
    EXPECT_FALSE(database.tableExists("c"));
}

TEST_F(OpenLedger, KeepsEveryNumberWhenThePlantFileChanges) {
    const PointId lathe = point("lathe");
    const FeedId lab = ledger().directory().feeds.at("lab");
    const auto track = ledger().directory().track("double", "P2", analytics::Basis::delivery).id;
    close();
    plant_.pumps.erase(plant_.pumps.begin(), plant_.pumps.begin() + 2);
    plant_.feeds.erase(plant_.feeds.begin());
    add_pump("new-one", {"A"});
    EXPECT_EQ(point("lathe"), lathe);
    EXPECT_EQ(ledger().directory().feeds.at("lab"), lab);
    EXPECT_EQ(ledger().directory().track("double", "P2", analytics::Basis::delivery).id, track);
    const Directory read = reader().directory();
    EXPECT_EQ(read.points, ledger().directory().points);
    EXPECT_EQ(read.pumps_of_point, ledger().directory().pumps_of_point);
    EXPECT_EQ(read.tracks.size(), ledger().directory().tracks.size());
    EXPECT_THAT(read.pumps_of_point.at(read.reservoirs.at("tank-1")), SizeIs(3));
}

TEST_F(OpenLedger, BacksUpToACopyThatCanBeRead) {
    store({row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 180.0}})});
    const CopyStep copy_more = ledger().begin_backup(folder_ / "copy.db");
    while (copy_more()) {
    }
    EXPECT_EQ(Reader(folder_ / "copy.db").count(point("press-1")).readings, 1U);
    EXPECT_THAT(failure_of([&] { ledger().begin_backup(folder_ / "no/folder/copy.db"); }), HasSubstr("no/folder"));
}

TEST_F(OpenLedger, BacksUpWhatIsStoredBetweenTwoStepsToo) {
    for (int hour = 0; hour < 400; ++hour) {  // a few megabytes: several steps
        std::vector<Row> rows;
        for (int second = 0; second < 600; ++second)
            rows.push_back(row_of(point("press-1"), day_one + std::chrono::hours(hour) + std::chrono::seconds(6 * second),
                                  {{Quantity::outlet_pressure, 180.0 + 0.37 * ((second * 7919 + hour * 104729) % 9973)}}));
        store(rows);
    }
    const CopyStep copy_more = ledger().begin_backup(folder_ / "copy.db");
    ASSERT_TRUE(copy_more()) << "the copy was whole after one step: nothing can come between";
    store({row_of(point("press-1"), day_one + std::chrono::hours(500), {{Quantity::outlet_pressure, 181.0}})});
    int steps = 1;
    while (copy_more()) ++steps;
    EXPECT_LT(steps, 100) << "a commit in between must not begin the copy anew";
    EXPECT_EQ(Reader(folder_ / "copy.db").count(point("press-1")).readings, 400U * 600U + 1U);
}

TEST_F(OpenLedger, LeavesNothingOfABackupThatWasGivenUp) {
    store({row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 180.0}})});
    static_cast<void>(ledger().begin_backup(folder_ / "copy.db"));
    EXPECT_FALSE(std::filesystem::exists(folder_ / "copy.db"));
}

TEST_F(OpenLedger, ShowsViewsWithPlainNames) {
    ledger();
    SQLite::Database database(plant_.store.path, SQLite::OPEN_READONLY);
    for (const char* view : {"summary", "verdict", "alarm", "event", "refused_row"})
        EXPECT_NO_THROW(database.execAndGet(std::string("SELECT count(*) FROM ") + view)) << view;
}

}  // namespace
}  // namespace slipledger::ledger

#include "daemon/intake/file_load.hpp"

#include <fstream>

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include "daemon/intake/sha256.hpp"
#include "tests/daemon/intake/live_mill.hpp"

namespace slipledger::intake {
namespace {

using ::testing::HasSubstr;

class FileLoad : public LiveMill {
protected:
    LoadOutcome load(const std::string& text, bool again = false) {
        const std::string path = folder_ / "week.csv";
        std::ofstream(path) << text;
        const Mapping mapping(plant_.feeds[1], writer().directory(), plant_.pumps);
        const LoadWorld world{mapping, writer(), clock_, find_receipt(), &stop_, {}, again};
        return load_path(path, world);
    }

    std::atomic<bool> stop_{false};
};

// Outside value: FIPS 180-4's example "abc", from memory; `printf abc | sha256sum` gives the same.
TEST(Sha256, OfAbc) {
    Sha256 hash;
    hash.add(std::string_view("ab"));
    hash.add(std::string_view("c"));
    EXPECT_EQ(hash.digest(), "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
}

TEST_F(FileLoad, StoresAllRowsAndCommitsTheReceiptWithTheLast) {
    const LoadOutcome outcome = load(csv_rows(100));
    EXPECT_EQ(outcome.end, LoadEnd::taken) << outcome.failure;
    EXPECT_EQ(outcome.receipt.rows, 100U);
    EXPECT_EQ(outcome.receipt.stored, 100U);
    EXPECT_EQ(stored_readings("press-1"), 100U);
    const auto kept = reader().receipt(outcome.receipt.sha256);
    ASSERT_TRUE(kept);
    EXPECT_EQ(kept->file, "week.csv");
    EXPECT_EQ(kept->stored, 100U);
    EXPECT_EQ(kept->rows, 100U);
}

TEST_F(FileLoad, AddsUpManyBatches) {
    const LoadOutcome outcome = load(csv_rows(70000));
    EXPECT_EQ(outcome.receipt.stored, 70000U) << outcome.failure;
    const auto kept = reader().receipt(outcome.receipt.sha256);
    ASSERT_TRUE(kept);
    EXPECT_EQ(kept->stored, 70000U);
}

TEST_F(FileLoad, TakesALastLineWithoutLineEnd) {
    std::string text = csv_rows(3);
    text.pop_back();
    EXPECT_EQ(load(text).receipt.stored, 3U);
}

TEST_F(FileLoad, DoesNotReadTheSameContentTwiceUnlessTold) {
    load(csv_rows(10));
    EXPECT_EQ(load(csv_rows(10)).end, LoadEnd::already_taken);
    const LoadOutcome again = load(csv_rows(10), true);
    EXPECT_EQ(again.end, LoadEnd::taken);
    EXPECT_EQ(again.receipt.repeated, 10U);
    EXPECT_EQ(again.receipt.stored, 0U);
}

TEST_F(FileLoad, CountsRefusedRowsAndNamesTheirPlaceWithTheFile) {
    const LoadOutcome outcome = load(csv_rows(2) + "2026-03-01T07:00:00Z,press-9,180\n");
    EXPECT_EQ(outcome.receipt.rows, 3U);
    EXPECT_EQ(outcome.receipt.refused, 1U);
    ASSERT_EQ(outcome.faults.size(), 1U);
    EXPECT_EQ(outcome.faults[0].line, 4U);
    const auto refused = reader().refused("files", 10);
    ASSERT_EQ(refused.size(), 1U);
    EXPECT_EQ(refused[0].place, "week.csv line 4");
    EXPECT_EQ(refused[0].code, "unknown-pump");
}

TEST_F(FileLoad, ReadsAFileAgainOfWhichNothingWasTaken) {
    const std::string text = "time,pump,pressure\n2026-03-01T06:00:00Z,press-1,180\n";
    EXPECT_EQ(load(text).receipt.stored, 0U);
    plant_.feeds[1].columns["pressure"] = mill::target(analytics::Quantity::outlet_pressure);  // the mapping is mended
    EXPECT_EQ(load(text).receipt.stored, 1U);
}

TEST_F(FileLoad, StopsBetweenPiecesAndLeavesNoReceipt) {
    stop_ = true;
    const LoadOutcome outcome = load(csv_rows(10));
    EXPECT_EQ(outcome.end, LoadEnd::stopped);
    EXPECT_FALSE(reader().receipt(outcome.receipt.sha256));
}

TEST_F(FileLoad, SaysWhyNothingCouldBeStoredAndSucceedsTheNextTime) {
    fill_the_disk_once();
    const LoadOutcome failed = load(csv_rows(10));
    EXPECT_EQ(failed.end, LoadEnd::failed);
    EXPECT_THAT(failed.failure, HasSubstr("disk is full"));
    EXPECT_EQ(load(csv_rows(10)).receipt.stored, 10U);
}

TEST_F(FileLoad, SaysThatAFileCannotBeOpened) {
    const Mapping mapping(plant_.feeds[1], writer().directory(), plant_.pumps);
    const LoadWorld world{mapping, writer(), clock_, find_receipt(), nullptr, {}, false};
    EXPECT_EQ(load_path(folder_ / "none.csv", world).end, LoadEnd::failed);
    EXPECT_EQ(load_path(folder_.path().string(), world).end, LoadEnd::failed);
}

TEST(FeedForLoad, IsTheNamedOneOrPlainByTheEndingOfTheName) {
    const std::vector<config::Feed> feeds{mill::ndjson_feed()};
    EXPECT_EQ(feed_for_load(feeds, "hall", "x.csv", "UTC")->format, config::FeedFormat::ndjson);
    EXPECT_FALSE(feed_for_load(feeds, "yard", "x.csv", "UTC"));
    EXPECT_EQ(feed_for_load(feeds, "", "x.csv", "UTC")->format, config::FeedFormat::csv);
    EXPECT_EQ(feed_for_load(feeds, "", "x.ndjson", "UTC")->format, config::FeedFormat::ndjson);
    EXPECT_EQ(feed_for_load(feeds, "", "x.csv", "Europe/Berlin")->time.zone, "Europe/Berlin");
}

}  // namespace
}  // namespace slipledger::intake

#include "daemon/intake/drop_folder.hpp"

#include <fstream>
#include <iterator>
#include <thread>

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include "daemon/intake/drop_file.hpp"
#include "tests/daemon/intake/live_mill.hpp"

namespace slipledger::intake {
namespace {

using namespace std::chrono_literals;
namespace fs = std::filesystem;

class Drop : public LiveMill {
protected:
    Drop() { fs::create_directories(drop_); }

    void put(const std::string& name, const std::string& text) { std::ofstream(drop_ / name) << text; }
    DropOutcome take(const std::string& name) {
        const Mapping mapping(plant_.feeds[1], writer().directory(), plant_.pumps);
        const LoadWorld world{mapping, writer(), clock_, find_receipt(), nullptr, {}, false};
        return take_drop_file(drop_, name, world);
    }
    nlohmann::json receipt(const std::string& name) {
        std::ifstream file(drop_ / name);
        return nlohmann::json::parse(file);
    }

    const fs::path drop_ = folder_.path() / "drop";
};

TEST_F(Drop, MovesATakenFileWithItsReceipt) {
    put("week.csv", csv_rows(5));
    take("week.csv");
    EXPECT_FALSE(fs::exists(drop_ / "week.csv"));
    EXPECT_TRUE(fs::exists(drop_ / "taken/week.csv"));
    const auto said = receipt("taken/week.csv.receipt.json");
    EXPECT_EQ(said["stored"], 5);
    EXPECT_EQ(said["feed"], "files");
    EXPECT_EQ(said["already_taken"], false);
    EXPECT_EQ(said["taken"], "2026-03-01T12:00:00.000Z");
}

TEST_F(Drop, MovesAFileOfWhichNothingCanBeReadToRefused) {
    put("week.csv", "a,b\n1,2\n");
    take("week.csv");
    EXPECT_TRUE(fs::exists(drop_ / "refused/week.csv"));
    EXPECT_EQ(receipt("refused/week.csv.receipt.json")["faults"].size(), 3U);
}

TEST_F(Drop, NumbersAnEqualName) {
    put("week.csv", csv_rows(5));
    take("week.csv");
    put("week.csv", csv_rows(7));
    take("week.csv");
    EXPECT_EQ(receipt("taken/week.csv.2.receipt.json")["stored"], 2);
    EXPECT_TRUE(fs::exists(drop_ / "taken/week.csv.2"));
}

TEST_F(Drop, SaysInTheReceiptThatTheContentWasTakenBefore) {
    put("week.csv", csv_rows(5));
    take("week.csv");
    put("copy.csv", csv_rows(5));
    EXPECT_EQ(take("copy.csv").load.end, LoadEnd::already_taken);
    EXPECT_EQ(receipt("taken/copy.csv.receipt.json")["already_taken"], true);
    EXPECT_EQ(receipt("taken/copy.csv.receipt.json")["file"], "week.csv");
}

// The three places where a kill can come: before the receipt, after it, and after its file is written.
TEST_F(Drop, CompletesWhatAKillBeforeTheReceiptLeft) {
    put("week.csv", csv_rows(5));
    const Mapping mapping(plant_.feeds[1], writer().directory(), plant_.pumps);
    auto read = mill::read_all(plant_.feeds[1], csv_rows(3));  // the first rows were committed
    for (auto& row : read.batch.rows) row.point = *writer().directory().point("press-1", "");
    for (auto& row : read.batch.rows) row.feed = mapping.feed_id();
    writer().submit(std::move(read.batch), [](const ledger::IntakeOutcome&) {});
    const DropOutcome outcome = take("week.csv");
    EXPECT_EQ(outcome.load.receipt.stored, 2U);
    EXPECT_EQ(outcome.load.receipt.repeated, 3U);
    EXPECT_EQ(stored_readings("press-1"), 5U);
}

TEST_F(Drop, CompletesWhatAKillAfterTheReceiptLeft) {
    put("week.csv", csv_rows(5));
    take("week.csv");
    fs::rename(drop_ / "taken/week.csv", drop_ / "week.csv");
    fs::remove(drop_ / "taken/week.csv.receipt.json");
    take("week.csv");
    EXPECT_TRUE(fs::exists(drop_ / "taken/week.csv"));
    EXPECT_EQ(receipt("taken/week.csv.receipt.json")["already_taken"], false);
    EXPECT_EQ(receipt("taken/week.csv.receipt.json")["stored"], 5);
}

TEST_F(Drop, CompletesWhatAKillBeforeTheMoveLeft) {
    put("week.csv", csv_rows(5));
    take("week.csv");
    const auto before = receipt("taken/week.csv.receipt.json");
    fs::rename(drop_ / "taken/week.csv", drop_ / "week.csv");
    take("week.csv");
    EXPECT_TRUE(fs::exists(drop_ / "taken/week.csv"));
    EXPECT_EQ(receipt("taken/week.csv.receipt.json"), before);
    EXPECT_FALSE(fs::exists(drop_ / "taken/week.csv.2.receipt.json"));
}

TEST_F(Drop, LeavesAFileThatCouldNotBeStoredWhereItIs) {
    fill_the_disk_once();
    put("week.csv", csv_rows(5));
    EXPECT_TRUE(take("week.csv").moved_to.empty());
    EXPECT_TRUE(fs::exists(drop_ / "week.csv"));
    take("week.csv");
    EXPECT_TRUE(fs::exists(drop_ / "taken/week.csv"));
}

TEST_F(Drop, WritesAFileWholeOrNotAtAll) {
    write_whole(drop_ / "x.json", "first");
    write_whole(drop_ / "x.json", "second");
    std::ifstream file(drop_ / "x.json");
    EXPECT_EQ(std::string(std::istreambuf_iterator<char>(file), {}), "second");
    EXPECT_FALSE(fs::exists(drop_ / "x.json.tmp"));
}

TEST_F(Drop, FolderTakesWhatIsThereAndWhatComesAndStops) {
    plant_.feeds[1].stable_for = 1s;
    put("a.csv", csv_rows(5));
    put("b.csv.part", csv_rows(6));
    fs::create_directories(folder_.path() / "elsewhere");
    std::ofstream(folder_.path() / "elsewhere/secret.csv") << csv_rows(7);
    fs::create_symlink(folder_.path() / "elsewhere/secret.csv", drop_ / "link.csv");
    const Mapping mapping(plant_.feeds[1], writer().directory(), plant_.pumps);
    const LoadWorld world{mapping, writer(), clock_, find_receipt(), nullptr, {}, false};
    FeedCounters counters;
    net::thread_pool readers(1);
    net::io_context io;
    DropFolder folder(io, readers, world, counters);
    folder.start();
    std::thread network([&] { io.run(); });
    EXPECT_TRUE(soon([&] {
        clock_.advance(200ms);
        return fs::exists(drop_ / "taken/a.csv");
    }));
    fs::rename(drop_ / "b.csv.part", drop_ / "b.csv");
    EXPECT_TRUE(soon([&] {
        clock_.advance(200ms);
        return fs::exists(drop_ / "taken/b.csv");
    }));
    EXPECT_TRUE(soon([&] { return counters.stored == 6; }));
    EXPECT_TRUE(fs::is_symlink(drop_ / "link.csv")) << "what a link points at is none of the folder's";
    net::post(io, [&] { folder.stop(); });
    network.join();
    EXPECT_TRUE(folder.idle());
    EXPECT_EQ(stored_readings("press-1"), 6U);
}

}  // namespace
}  // namespace slipledger::intake

// Notices, refusals and receipts: told once, delivered in order, counted for ever.

#include <gmock/gmock.h>

#include "tests/daemon/ledger/ledger_fixture.hpp"

namespace slipledger::ledger {
namespace {

using ::testing::ElementsAre;
using ::testing::IsEmpty;
using ::testing::SizeIs;

class Outbox : public LedgerTest {
protected:
    Outbox() { plant_.alerts.webhooks.push_back({.name = "plant-office", .url = "http://127.0.0.1:9/"}); }

    static Notice notice(const std::string& id, const std::string& pump) {
        return {.id = id, .pump = pump, .section = "A", .episode = "e-" + id, .kind = "raised", .level = "watch",
                .at = day_one, .body = R"({"id":")" + id + "\"}"};
    }

    void tell(std::vector<Notice> notices) { ledger().store(std::span<const Notice>(notices)); }

    void update(std::int64_t id, DeliveryState state, std::optional<Instant> next_try, const std::string& error = "") {
        const std::vector<DeliveryUpdate> updates{
            {.id = id, .state = state, .attempts = 1, .next_try = next_try, .last_error = error}};
        ledger().store(std::span<const DeliveryUpdate>(updates));
    }

    std::vector<std::string> due(const std::string& target, Instant now = day_one) {
        std::vector<std::string> ids;
        for (const OutboxRow& row : reader().due(target, now, 100)) ids.push_back(row.notice.id);
        return ids;
    }
};

TEST_F(Outbox, GetsEachNoticeOnceForEachTarget) {
    tell({notice("a", "press-1"), notice("b", "lathe")});
    tell({notice("b", "lathe"), notice("c", "press-1")});
    for (const char* target : {"log", "plant-office"}) EXPECT_THAT(due(target), ElementsAre("a", "b", "c")) << target;
    EXPECT_THAT(due("nowhere"), IsEmpty());
    EXPECT_THAT(reader().notices("press-1"), SizeIs(2));
    EXPECT_THAT(reader().notices(""), SizeIs(3));
    const Notice back = reader().notices("lathe").at(0);
    EXPECT_EQ(back.body, R"({"id":"b"})");
    EXPECT_EQ(back.episode, "e-b");
    EXPECT_EQ(back.at, day_one);
}

TEST_F(Outbox, KeepsTheOrderOfAPumpWhileItsFirstNoticeMustWait) {
    tell({notice("a", "press-1"), notice("b", "press-1"), notice("c", "lathe")});
    const auto rows = reader().due("plant-office", day_one, 100);
    update(rows[0].id, DeliveryState::pending, day_one + 10min, "connection refused");
    EXPECT_THAT(due("plant-office"), ElementsAre("c"));
    EXPECT_THAT(due("plant-office", day_one + 10min), ElementsAre("a", "b", "c"));
    EXPECT_THAT(due("log"), ElementsAre("a", "b", "c"));
    update(rows[0].id, DeliveryState::delivered, std::nullopt);
    EXPECT_THAT(due("plant-office"), ElementsAre("b", "c"));
    EXPECT_THAT(reader().due("plant-office", day_one, 1), SizeIs(1));
}

TEST_F(Outbox, ShowsWhatCouldNotBeDelivered) {
    tell({notice("a", "press-1"), notice("b", "lathe")});
    update(reader().due("plant-office", day_one, 1)[0].id, DeliveryState::failed, std::nullopt, "gave up");
    const auto counts = reader().deliveries();
    ASSERT_THAT(counts, SizeIs(2));
    EXPECT_EQ(counts[0].target, "log");
    EXPECT_EQ(counts[0].pending, 2U);
    EXPECT_EQ(counts[1].pending, 1U);
    EXPECT_EQ(counts[1].failed, 1U);
    EXPECT_EQ(counts[1].last_error, "gave up");
}

TEST_F(Outbox, KeepsRefusedRowsAndCountsThemByCode) {
    IntakeBatch batch;
    for (const char* code : {"bad-number", "bad-number", "unknown-pump"})
        batch.refused.push_back({.feed = FeedId{1}, .place = "line 17", .code = code, .message = "wanted bar",
                                 .text = "18l.2", .received = day_one});
    const std::vector<IntakeBatch> batches{batch};
    ledger().store(batches);
    const auto feeds = reader().feeds();
    ASSERT_THAT(feeds, SizeIs(3)) << "plc, lab and command";
    EXPECT_EQ(feeds[0].feed, "plc");
    EXPECT_EQ(feeds[0].refused, 3U);
    EXPECT_EQ(feeds[0].refused_by_code.at("bad-number"), 2U);
    EXPECT_EQ(feeds[1].refused, 0U);
    const auto rows = reader().refused("plc", 2);
    ASSERT_THAT(rows, SizeIs(2));
    EXPECT_EQ(rows[0].code, "unknown-pump") << "newest first";
    EXPECT_EQ(rows[0].text, "18l.2");
    EXPECT_EQ(rows[0].received, day_one);
}

TEST_F(Outbox, KeepsAReceiptWithTheCountsOfItsLastBatchAdded) {
    IntakeBatch batch = batch_of({row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 180.0}}),
                                  row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 180.0}})});
    batch.receipt = Receipt{.feed = FeedId{1}, .file = "week-03.csv", .sha256 = "ab12", .rows = 12, .stored = 7,
                            .repeated = 2, .refused = 1, .taken = day_one};
    const std::vector<IntakeBatch> batches{batch};
    ledger().store(batches);
    const auto receipt = reader().receipt("ab12");
    ASSERT_TRUE(receipt);
    EXPECT_EQ(receipt->file, "week-03.csv");
    EXPECT_EQ(receipt->stored, 8U);
    EXPECT_EQ(receipt->repeated, 3U);
    EXPECT_EQ(receipt->refused, 1U);
    EXPECT_EQ(receipt->taken, day_one);
    EXPECT_FALSE(reader().receipt("cd34"));
}

TEST_F(Outbox, TellsOfAFileTakenAfterItWasRefusedWholeThatItWasTaken) {
    IntakeBatch refused;
    refused.receipt = Receipt{.feed = FeedId{1}, .file = "old-name.csv", .sha256 = "ab12", .rows = 1, .refused = 1, .taken = day_one};
    ledger().store(std::vector{refused});
    IntakeBatch taken = batch_of({row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 180.0}})});
    taken.receipt = Receipt{.feed = FeedId{1}, .file = "mended.csv", .sha256 = "ab12", .rows = 1, .taken = day_one};
    ledger().store(std::vector{taken});
    EXPECT_EQ(reader().receipt("ab12")->file, "mended.csv");
    EXPECT_EQ(reader().receipt("ab12")->stored, 1U);
    ledger().store(std::vector{refused});
    EXPECT_EQ(reader().receipt("ab12")->file, "mended.csv") << "what was taken stays told";
}

}  // namespace
}  // namespace slipledger::ledger

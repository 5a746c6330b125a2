#include "daemon/notify/outbox.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <map>
#include <vector>

#include "tests/support/manual_clock.hpp"

namespace slipledger::notify {
namespace {

using namespace std::chrono_literals;
using ledger::DeliveryState;
using testing::ElementsAre;
using testing::SizeIs;

// Takes everything but the ids told otherwise.
class PickyChannel final : public Channel {
public:
    DeliveryOutcome deliver(const ledger::Notice& notice) override {
        tried.push_back(notice.id);
        const auto found = outcomes.find(notice.id);
        return found == outcomes.end() ? DeliveryOutcome{} : DeliveryOutcome{found->second, "no"};
    }
    void abandon() override {}

    std::map<std::string, Delivery> outcomes;
    std::vector<std::string> tried;
};

ledger::OutboxRow row(std::int64_t id, const std::string& pump, const std::string& notice, int attempts = 0) {
    ledger::OutboxRow made;
    made.id = id;
    made.notice.id = notice;
    made.notice.pump = pump;
    made.attempts = attempts;
    return made;
}

constexpr analytics::Instant now{1772000000s};

TEST(Outbox, KeepsTheOrderOfAPumpAndLetsOthersPass) {
    PickyChannel channel;
    channel.outcomes["p1-first"] = Delivery::try_again;
    const support::ManualClock clock(now);
    const std::vector rows{row(1, "p1", "p1-first"), row(2, "p2", "p2-first"), row(3, "p1", "p1-second")};
    const auto updates = deliver_all(rows, channel, {}, clock);
    EXPECT_THAT(channel.tried, ElementsAre("p1-first", "p2-first"));
    ASSERT_THAT(updates, SizeIs(2));
    EXPECT_EQ(updates[0].state, DeliveryState::pending);
    EXPECT_EQ(updates[0].attempts, 1);
    EXPECT_GT(*updates[0].next_try, now);
    EXPECT_EQ(updates[1].state, DeliveryState::delivered);
}

TEST(Outbox, FailsAtOnceWhatWasRefusedAndGoesOnWithThePump) {
    PickyChannel channel;
    channel.outcomes["first"] = Delivery::refused;
    const support::ManualClock clock(now);
    const auto updates = deliver_all(std::vector{row(1, "p1", "first"), row(2, "p1", "second")}, channel, {}, clock);
    ASSERT_THAT(updates, SizeIs(2));
    EXPECT_EQ(updates[0].state, DeliveryState::failed);
    EXPECT_EQ(updates[0].last_error, "no");
    EXPECT_EQ(updates[1].state, DeliveryState::delivered);
}

TEST(Outbox, GivesUpAfterThreeDays) {
    PickyChannel channel;
    channel.outcomes["old"] = Delivery::try_again;
    const support::ManualClock clock(now);
    const auto updates = deliver_all(std::vector{row(1, "p1", "old", 295)}, channel, {}, clock);
    ASSERT_THAT(updates, SizeIs(1));
    EXPECT_EQ(updates[0].state, DeliveryState::failed);
}

TEST(Outbox, LeavesWhatWasAbandonedAsItWas) {
    PickyChannel channel;
    channel.outcomes["second"] = Delivery::abandoned;
    const support::ManualClock clock(now);
    const std::vector rows{row(1, "p1", "first"), row(2, "p2", "second"), row(3, "p3", "third")};
    const auto updates = deliver_all(rows, channel, {}, clock);
    ASSERT_THAT(updates, SizeIs(1));
    EXPECT_EQ(updates[0].id, 1);
}

}  // namespace
}  // namespace slipledger::notify

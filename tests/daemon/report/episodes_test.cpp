#include "daemon/report/episodes.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace slipledger::report {
namespace {

using namespace std::chrono_literals;
using analytics::AlarmChange;
using analytics::AlarmEdge;
using analytics::Instant;
using analytics::Level;
using analytics::Rule;
using testing::SizeIs;

constexpr Instant raised{1772366400s};

class Episodes : public ::testing::Test {
protected:
    static AlarmChange change(AlarmEdge edge, Level level, Instant at) {
        AlarmChange made;
        made.rule = Rule::leakage_ratio;
        made.edge = edge;
        made.level = level;
        made.at = at;
        made.began = raised;
        return made;
    }

    void act(const std::string& kind, Instant at, const std::string& body = "{}") {
        ledger::Event event;
        event.pump = "press-2";
        event.section = "A";
        event.kind = kind;
        event.at = at;
        event.by = "Kim";
        event.body = body;
        acts_.push_back(event);
    }

    Episode only() const {
        const auto episodes = episodes_of({"press-2", "A", analytics::Basis::case_drain}, changes_, acts_, now_);
        EXPECT_THAT(episodes, SizeIs(1));
        return episodes.front();
    }

    std::vector<AlarmChange> changes_{change(AlarmEdge::raised, Level::watch, raised),
                                      change(AlarmEdge::worsened, Level::plan, raised + 48h)};
    std::vector<ledger::Event> acts_;
    Instant now_ = raised + 100h;
};

// States: IEC 62682 (alarm systems), words from memory.
TEST_F(Episodes, AreUnacknowledgedUntilSomebodyActs) {
    EXPECT_EQ(only().state, "unacknowledged");
    EXPECT_EQ(only().level, Level::plan);
    act("acknowledged", raised + 50h, R"({"rule":"leakage-ratio","why":"part ordered"})");
    EXPECT_EQ(only().state, "acknowledged");
    EXPECT_EQ(only().acknowledged_by, "Kim");
    EXPECT_EQ(only().why, "part ordered");
}

TEST_F(Episodes, AreReachedOnlyByActsForTheirTimeRuleAndLife) {
    act("acknowledged", raised - 1h);
    act("acknowledged", raised + 1h, R"({"rule":"efficiency"})");
    act("acknowledged", raised + 1h, R"({"life":2})");
    EXPECT_EQ(only().state, "unacknowledged");
}

TEST_F(Episodes, AreShelvedUntilTheTimeGiven) {
    act("shelved", raised + 1h, R"({"until":"2026-03-06T00:00:00Z","why":"overhaul"})");
    EXPECT_EQ(only().state, "shelved");
    now_ = Instant(std::chrono::sys_days(std::chrono::March / 6 / 2026));
    EXPECT_EQ(only().state, "unacknowledged");
}

TEST_F(Episodes, AreOutOfServiceUntilTakenBack) {
    act("out-of-service", raised + 1h);
    EXPECT_EQ(only().state, "out of service");
    act("in-service", raised + 2h);
    EXPECT_EQ(only().state, "unacknowledged");
}

TEST_F(Episodes, ReturnWithTheTimeTheyCleared) {
    changes_.push_back(change(AlarmEdge::returned, Level::plan, raised + 72h));
    EXPECT_EQ(only().state, "returned");
    EXPECT_EQ(only().cleared, raised + 72h);
}

TEST_F(Episodes, KeepTheirIdWhereOnlyLaterChangesMove) {
    const std::string id = only().id;
    changes_.back().at += 24h;
    EXPECT_EQ(only().id, id);
    for (AlarmChange& moved : changes_) moved.began += 24h;
    EXPECT_NE(only().id, id);
}

}  // namespace
}  // namespace slipledger::report

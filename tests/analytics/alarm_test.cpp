#include "analytics/alarm.hpp"

#include <string>
#include <vector>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

using std::chrono::minutes;

const Instant start = std::chrono::sys_days{std::chrono::year{2026} / 3 / 2};
const Ladder temperature{
    .watch = 80.0, .plan = 90.0, .act = unknown, .on_delay = minutes(10), .off_delay = minutes(20), .deadband = 3.0};

struct Row {
    int minute;
    double value;
    std::string edge;  // empty: no change
    Level after;
};

void follow(const std::vector<Row>& table, const Ladder& ladder) {
    AlarmState state;
    for (const Row& row : table) {
        const auto change = state.judge(Rule::over_temperature, judge_ladder(row.value, ladder), ladder,
                                        {ladder.on_delay, ladder.off_delay, 1}, start + minutes(row.minute));
        EXPECT_EQ(change ? std::string(name_of(change->edge)) : "", row.edge) << "minute " << row.minute;
        EXPECT_EQ(state.level(), row.after) << "minute " << row.minute;
    }
}

// reference: AlarmState::judge, judge_ladder - hand-worked: the table, limit 80/90 degC, 10 min on, 20 min off, 3 K
// deadband
TEST(Alarm, IsRaisedAfterItsOnDelayAndReturnsAfterItsOffDelayBelowTheDeadband) {
    follow({{0, 79.0, "", Level::unjudged},
            {5, 81.0, "", Level::unjudged},   // passes, the on-delay begins
            {10, 79.5, "", Level::unjudged},  // back: it begins anew
            {15, 82.0, "", Level::unjudged},
            {20, 83.0, "", Level::unjudged},
            {25, 82.0, "raised", Level::watch},  // ten minutes beyond 80
            {30, 78.0, "", Level::watch},        // inside 80, but not by 3
            {35, 76.0, "", Level::watch},        // below 77: the off-delay begins
            {50, 76.0, "", Level::watch},
            {54, 77.5, "", Level::watch},  // inside the deadband again: it begins anew
            {60, 76.0, "", Level::watch},
            {79, 76.0, "", Level::watch},
            {80, 76.0, "returned", Level::unjudged}},
           temperature);
}

// reference: AlarmState::judge - hand-worked: the table, as above
TEST(Alarm, WorsensAndEasesWithinOneEpisode) {
    follow({{0, 95.0, "", Level::unjudged},
            {10, 95.0, "raised", Level::plan},  // straight to plan
            {15, 86.0, "", Level::plan},        // below 87
            {35, 86.0, "eased", Level::watch},  // still above 77
            {40, 91.0, "", Level::watch},
            {50, 91.0, "worsened", Level::plan},
            {60, 70.0, "", Level::plan},
            {80, 70.0, "returned", Level::unjudged}},
           temperature);
}

// reference: AlarmState::judge - hand-worked: two judgements in a row wanted; one alone is forgotten
TEST(Alarm, OfADailyRuleWantsTwoJudgedDaysInARowHoweverFarApart) {
    AlarmState state;
    const Ladder ratio{.watch = 1.2};
    const RuleTiming two{.judgements = 2};
    const auto judged = [&](int day, double value) {
        return state.judge(Rule::leakage_ratio, judge_ladder(value, ratio), ratio, two,
                           start + std::chrono::hours(24 * day));
    };
    EXPECT_FALSE(judged(1, 1.3));
    EXPECT_FALSE(judged(2, 1.1));
    EXPECT_FALSE(judged(3, 1.3));
    const auto raised = judged(6, 1.4);
    ASSERT_TRUE(raised);
    EXPECT_EQ(raised->edge, AlarmEdge::raised);
    EXPECT_EQ(raised->at, start + std::chrono::hours(24 * 6));
    EXPECT_DOUBLE_EQ(raised->value, 1.4);
    EXPECT_DOUBLE_EQ(raised->limit, 1.2);
    EXPECT_FALSE(judged(7, 1.1));
    EXPECT_FALSE(judged(8, 1.3));
    EXPECT_EQ(state.level(), Level::watch);
}

// reference: AlarmState::end - hand-worked: an episode on, then none
TEST(Alarm, EndsWithTheLifeItBelongsTo) {
    AlarmState state;
    EXPECT_FALSE(state.end(Rule::case_pressure, start));
    const Ladder ladder{.watch = 1.0};
    state.judge(Rule::case_pressure, judge_ladder(2.0, ladder), ladder, {}, start);
    const auto ended = state.end(Rule::case_pressure, start + minutes(5));
    ASSERT_TRUE(ended);
    EXPECT_EQ(ended->edge, AlarmEdge::returned);
    EXPECT_EQ(ended->level, Level::watch);
    EXPECT_EQ(ended->began, start);
    EXPECT_EQ(state.level(), Level::unjudged);
}

// reference: HeldAlarm::judge - hand-worked: held, it neither begins nor worsens, and shows what it stands at when let go
TEST(Alarm, HeldBackNeitherBeginsNorWorsensAndComesWhenLetGo) {
    const Ladder ladder{.watch = 1.0, .plan = 2.0, .act = 3.0};
    HeldAlarm alarm;
    const auto judged = [&](int minute, double value, bool held) {
        return alarm.judge(Rule::leakage_ratio, judge_ladder(value, ladder), ladder, {}, start + minutes(minute), held);
    };
    EXPECT_FALSE(judged(0, 2.5, true));
    EXPECT_EQ(alarm.level(), Level::unjudged);
    EXPECT_EQ(alarm.unheld(), Level::plan);
    const auto raised = judged(1, 2.5, false);
    ASSERT_TRUE(raised);
    EXPECT_EQ(raised->edge, AlarmEdge::raised);
    EXPECT_EQ(raised->level, Level::plan);
    EXPECT_EQ(raised->began, start + minutes(1));
    EXPECT_DOUBLE_EQ(raised->limit, 2.0);
    EXPECT_FALSE(judged(2, 3.5, true));
    EXPECT_EQ(alarm.level(), Level::plan);
    EXPECT_EQ(judged(3, 1.5, true)->edge, AlarmEdge::eased);
    EXPECT_EQ(judged(4, 0.5, true)->edge, AlarmEdge::returned);
}

// reference: HeldAlarm::end - hand-worked: one that shows is ended, one that is held back never was told
TEST(Alarm, HeldBackEndsUntoldWithItsLife) {
    const Ladder ladder{.watch = 1.0};
    HeldAlarm alarm;
    alarm.judge(Rule::leakage_ratio, judge_ladder(2.0, ladder), ladder, {}, start, true);
    EXPECT_FALSE(alarm.end(Rule::leakage_ratio, start + minutes(5)));
    EXPECT_EQ(alarm.unheld(), Level::unjudged);
    alarm.judge(Rule::leakage_ratio, judge_ladder(2.0, ladder), ladder, {}, start, false);
    EXPECT_EQ(alarm.end(Rule::leakage_ratio, start + minutes(5))->edge, AlarmEdge::returned);
}

TEST(Alarm, IsNeverRaisedWhereThereIsNoLimit) {
    const RuleJudgement judgement = judge_ladder(1.0e6, Ladder{});
    EXPECT_EQ(judgement.beyond, Level::unjudged);
    EXPECT_EQ(judge_ladder(unknown, temperature).beyond, Level::unjudged);
}

}  // namespace
}  // namespace slipledger::analytics

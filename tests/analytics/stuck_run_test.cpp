#include "analytics/stuck_run.hpp"

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

void move(StuckRun& run, int summaries) {
    for (int i = 0; i < summaries; ++i) run.add(3.0, 3.4, true);
}

void stand(StuckRun& run, int summaries, double value = 3.2) {
    for (int i = 0; i < summaries; ++i) run.add(value, value, true);
}

// reference: StuckRun::stuck - hand-worked: never still in 30 summaries, told at the second still one
TEST(StuckRun, IsToldAtTheSecondStillSummaryWhereThereNeverWasOne) {
    StuckRun run;
    move(run, 30);
    stand(run, 1);
    EXPECT_FALSE(run.stuck());
    stand(run, 1);
    EXPECT_TRUE(run.stuck());
    EXPECT_EQ(run.length(), 2);
    EXPECT_TRUE(run.where_it_had_been());
    move(run, 1);
    EXPECT_FALSE(run.stuck());
}

// reference: StuckRun::stuck - hand-worked: three in a row known of old, told at the eighth
TEST(StuckRun, IsMeasuredByTheSensorsOwnWays) {
    StuckRun run;
    for (int i = 0; i < 10; ++i) {
        stand(run, 3);
        move(run, 3);
    }
    stand(run, 7);
    EXPECT_FALSE(run.stuck());
    stand(run, 1);
    EXPECT_TRUE(run.stuck());
}

TEST(StuckRun, NeedsADutyThatMovesAndASensorKnownToMove) {
    StuckRun resting;
    move(resting, 30);
    for (int i = 0; i < 50; ++i) resting.add(3.2, 3.2, false);
    EXPECT_FALSE(resting.stuck());
    StuckRun constant;  // a logger that writes the motor's name plate
    for (int i = 0; i < 500; ++i) constant.add(1480.0, 1480.0, true);
    EXPECT_FALSE(constant.stuck());
}

TEST(StuckRun, SaysWhetherItStandsWhereItHadBeen) {
    StuckRun run;
    move(run, 30);
    stand(run, 3, 0.0);
    EXPECT_TRUE(run.stuck());
    EXPECT_FALSE(run.where_it_had_been());
}

}  // namespace
}  // namespace slipledger::analytics

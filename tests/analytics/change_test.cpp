#include "analytics/change.hpp"

#include <cmath>
#include <random>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

using std::chrono::hours;

const Instant start = std::chrono::sys_days{std::chrono::year{2026} / 3 / 2};
const LogEstimate as_new{0.0, 0.02};

const LogEstimate worn{0.6, 0.05};
constexpr double at_once = 0.0;

bool fed(ChangeDetector& detector, std::initializer_list<double> surprises, LogEstimate before = as_new) {
    bool opened = false;
    int hour = 0;
    for (const double surprise : surprises) {
        opened = detector.add(surprise, start + hours(hour), hour, before);
        ++hour;
    }
    return opened;
}

// reference: ChangeDetector::add - hand-worked: 3 * 3 - 4.5 = 4.5; twice that is 9, past 8
TEST(Change, OpensAtTheSecondOfTwoDeparturesOfThreeDeviations) {
    ChangeDetector detector;
    EXPECT_FALSE(fed(detector, {3.0}));
    EXPECT_TRUE(fed(detector, {3.0}));
    ChangeDetector down;
    EXPECT_TRUE(fed(down, {-3.0, -3.0}, worn));
}

// reference: ChangeDetector::add - hand-worked: held at 4, 3 * 4 - 4.5 = 7.5, short of 8
TEST(Change, IsNeverDecidedByOneSummaryAlone) {
    ChangeDetector detector;
    EXPECT_FALSE(fed(detector, {40.0}));
    EXPECT_FALSE(fed(detector, {0.0}));
    EXPECT_FALSE(fed(detector, {unknown}));
}

// reference: ChangeDetector::add - hand-worked: 3 * 1.4 - 4.5 < 0, so nothing ever adds up
TEST(Change, DoesNotAddUpWhatIsOnlyALittleHigh) {
    ChangeDetector detector;
    for (int i = 0; i < 1000; ++i) EXPECT_FALSE(detector.add(1.4, start + hours(i), i, as_new));
}

// reference: ChangeDetector::add - hand-worked: a ratio of 1 has nowhere to fall from
TEST(Change, TakesNothingForHealing) {
    ChangeDetector detector;
    EXPECT_FALSE(fed(detector, {-4.0, -4.0, -4.0, -4.0}));
}

// reference: ChangeDetector::follow - hand-worked: 0.5 - 0 >= ln 1.3 = 0.262 with its low end 0.5 - 0.064 past 0.131
TEST(Change, BecomesAStepWhenWearHasGrownByAThird) {
    ChangeDetector detector;
    fed(detector, {3.0, 3.0});
    EXPECT_FALSE(detector.follow({0.2, 0.05}, start + hours(2), 2.0, at_once));
    EXPECT_TRUE(detector.follow({0.5, 0.05}, start + hours(3), 3.0, at_once));
    EXPECT_TRUE(detector.step().active);
    EXPECT_FALSE(detector.step().attributed);
    EXPECT_EQ(detector.step().began, start);
    EXPECT_DOUBLE_EQ(detector.step().ln_size, 0.5);
    EXPECT_FALSE(detector.follow({0.14, 0.05}, start + hours(9), 9.0, at_once));
    EXPECT_TRUE(detector.step().active);
    EXPECT_FALSE(detector.follow({0.12, 0.05}, start + hours(10), 10.0, at_once));
    EXPECT_FALSE(detector.step().active);  // gone back to under half of ln 1.3
}

// reference: ChangeDetector::follow - hand-worked: begun at hour 0, it has lasted 12 running hours at hour 12
TEST(Change, IsToldAsAStepOnlyOnceItHasLasted) {
    ChangeDetector detector;
    fed(detector, {3.0, 3.0});
    for (int hour = 3; hour < 12; ++hour) EXPECT_FALSE(detector.follow({0.5, 0.05}, start + hours(hour), hour, 12.0)) << hour;
    EXPECT_TRUE(detector.follow({0.55, 0.05}, start + hours(12), 12.0, 12.0));
    EXPECT_DOUBLE_EQ(detector.step().ln_size, 0.55) << "as it has become";
}

// reference: ChangeDetector::follow - hand-worked: 0.12 is under half of ln 1.3 = 0.131
TEST(Change, IsNeverToldWhenItGoesBackBeforeItHasLasted) {
    ChangeDetector detector;
    fed(detector, {3.0, 3.0});
    EXPECT_FALSE(detector.follow({0.5, 0.05}, start + hours(3), 3.0, 12.0));
    EXPECT_FALSE(detector.follow({0.12, 0.05}, start + hours(6), 6.0, 12.0));
    EXPECT_FALSE(detector.follow({0.5, 0.05}, start + hours(13), 13.0, 12.0));
    EXPECT_FALSE(detector.step().active);
}

// reference: ChangeDetector::follow - hand-worked: 9 running hours are more than 8
TEST(Change, IsNoStepWhenItTookLongerThanEightRunningHours) {
    ChangeDetector detector;
    fed(detector, {3.0, 3.0});
    EXPECT_FALSE(detector.follow({0.2, 0.05}, start + hours(9), 10.0, at_once));
    EXPECT_FALSE(detector.follow({0.5, 0.05}, start + hours(10), 11.0, at_once));
    EXPECT_FALSE(detector.step().active);
}

// reference: ChangeDetector::follow - hand-worked: downward departures open and are followed, never steps
TEST(Change, DownwardIsFollowedWithoutBeingAStep) {
    ChangeDetector detector;
    EXPECT_TRUE(fed(detector, {-4.0, -4.0}, worn));
    EXPECT_FALSE(detector.follow({-0.6, 0.05}, start + hours(3), 3.0, at_once));
    EXPECT_FALSE(detector.step().active);
}

// reference: ChangeDetector::follow - hand-worked: facts changed half an hour before it began
TEST(Change, IsAttributedFirstToWhatElseChangedThatHour) {
    ChangeDetector detector;
    detector.explain(start - std::chrono::minutes(30));
    fed(detector, {3.0, 3.0});
    EXPECT_TRUE(detector.follow({0.5, 0.05}, start + hours(3), 3.0, at_once));
    EXPECT_TRUE(detector.step().attributed);
    ChangeDetector late;
    late.explain(start - hours(2));
    fed(late, {3.0, 3.0});
    late.follow({0.5, 0.05}, start + hours(3), 3.0, at_once);
    EXPECT_FALSE(late.step().attributed);
}

// How often pure noise opens it: two in a row past 6 together, either way, is 2e-5 a summary. Seed 5.
TEST(Change, IsOpenedByNoiseLessThanThriceAYear) {
    std::mt19937 random(5);
    std::normal_distribution<double> normal;
    ChangeDetector detector;
    int opened = 0;
    for (int i = 0; i < 10 * 8760; ++i) opened += detector.add(normal(random), start + hours(i), i, as_new) ? 1 : 0;
    EXPECT_LT(opened, 30);
}

}  // namespace
}  // namespace slipledger::analytics

#include "analytics/replacement.hpp"

#include <cmath>
#include <vector>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

using std::chrono::hours;

const Instant start = std::chrono::sys_days{std::chrono::year{2026} / 3 / 2};

LogEstimate ratio(double value, double sd = 0.04) {
    return {std::log(value), sd};
}

// Summaries an hour apart: the ratio before each, how surprising it is, the ratio after.
struct Step {
    double before;
    double surprise;
    double after;
};

bool found(ReplacementWatch& watch, const std::vector<Step>& steps, double sd = 0.04) {
    bool any = false;
    int hour = 0;
    for (const Step& step : steps) {
        watch.note(step.surprise, start + hours(hour), hour, ratio(step.before));
        ++hour;
        any = watch.follow(ratio(step.after, sd), hour) || any;
    }
    return any;
}

// reference: ReplacementWatch::follow - hand-worked: ln 1.9 = 0.64 is past ln 1.3, falls by ln 1.81, and 1.05 is below
// the greater of 1.1 and 1.9^(1/4) = 1.17
TEST(Replacement, IsSeenWhereAWornPartLeaksAsNewWithinHours) {
    ReplacementWatch watch;
    EXPECT_TRUE(found(watch, {{1.9, 0.3, 1.9}, {1.9, -6.0, 1.7}, {1.7, -9.0, 1.1}, {1.1, -0.5, 1.05}}));
    const LikelyReplacement likely = watch.likely();
    ASSERT_TRUE(likely.at);
    EXPECT_EQ(*likely.at, start + hours(1));
    EXPECT_NEAR(likely.ratio_before, 1.9, 1e-12);
    EXPECT_LT(likely.ratio_after, 1.18);
}

// reference: ReplacementWatch::follow - hand-worked: 1.4 is above 1.9^(1/4) = 1.17; 1.2 is below 1.3; 0.6 is below
// exp(-0.35) = 0.70
TEST(Replacement, IsNotSeenInHalfAFallNorWhereNothingWasWornNorWhereAMeterFails) {
    ReplacementWatch half;
    EXPECT_FALSE(found(half, {{1.9, -6.0, 1.6}, {1.6, -5.0, 1.4}, {1.4, 0.0, 1.4}}));
    ReplacementWatch sound;
    EXPECT_FALSE(found(sound, {{1.2, -6.0, 1.1}, {1.1, -5.0, 1.0}}));
    ReplacementWatch dead;
    EXPECT_FALSE(found(dead, {{1.9, -20.0, 0.6}, {0.6, -20.0, 0.3}}));
    ReplacementWatch unsure;
    EXPECT_FALSE(found(unsure, {{1.9, -6.0, 1.05}, {1.05, 0.0, 1.05}}, 0.2));
}

// reference: ReplacementWatch::follow - hand-worked: eight running hours and no more
TEST(Replacement, IsNotSeenWhereTheFallTookLongerThanEightRunningHours) {
    std::vector<Step> slow;
    for (int hour = 0; hour < 20; ++hour) slow.push_back({1.9 - 0.045 * hour, -2.5, 1.9 - 0.045 * (hour + 1)});
    ReplacementWatch watch;
    EXPECT_FALSE(found(watch, slow));
}

// reference: ReplacementWatch::explain, ReplacementWatch::note - hand-worked: facts changed half an hour before the
// fall; a low summary of which nothing came does not date what follows
TEST(Replacement, IsNotSeenWhereSomethingElseChangedAndIsDatedFromItsOwnFall) {
    ReplacementWatch told;
    told.explain(start + hours(1) - std::chrono::minutes(30));
    EXPECT_FALSE(found(told, {{1.9, 0.3, 1.9}, {1.9, -6.0, 1.05}, {1.05, 0.0, 1.05}}));
    ReplacementWatch noisy;
    EXPECT_TRUE(found(noisy, {{1.9, -2.2, 1.9}, {1.9, 0.4, 1.9}, {1.9, -6.0, 1.3}, {1.3, -8.0, 1.04}}));
    EXPECT_EQ(*noisy.likely().at, start + hours(2));
}

// reference: ReplacementWatch::likely - hand-worked: half way between ln 1.9 and ln 1.05 is ln 1.41
TEST(Replacement, IsTakenBackWhenTheRatioRisesMoreThanHalfWay) {
    ReplacementWatch watch;
    found(watch, {{1.9, -6.0, 1.2}, {1.2, -6.0, 1.05}});
    ASSERT_TRUE(watch.likely().at);
    watch.follow(ratio(1.39), 40.0);
    EXPECT_TRUE(watch.likely().at);
    watch.follow(ratio(1.45), 41.0);
    EXPECT_FALSE(watch.likely().at);
}

}  // namespace
}  // namespace slipledger::analytics

#include "analytics/witnesses.hpp"

#include <cmath>
#include <functional>
#include <random>
#include <vector>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

// Days of 10 running hours and 2 L/min when healthy.
std::vector<DayVerdict> days_with(const std::function<double(int day)>& ratio, int count, double healthy_sd = 0.0) {
    std::vector<DayVerdict> days;
    for (int day = 0; day < count; ++day) {
        DayVerdict verdict;
        verdict.day.date = 1000 + day;
        verdict.judged_h = 10.0;
        verdict.life_running_h = 10.0 * (day + 1);
        verdict.leakage_lpm = 2.0 * ratio(day);
        verdict.excess_lpm = 2.0 * (ratio(day) - 1.0);
        verdict.healthy_sd = healthy_sd;
        days.push_back(verdict);
    }
    return days;
}

std::vector<double> scatter(unsigned seed, double kept, double sd, int count) {
    std::mt19937 random(seed);
    std::normal_distribution<double> normal;
    std::vector<double> noise;
    for (int i = 0; i < count; ++i)
        noise.push_back((i > 0 ? kept * noise.back() : 0.0) + sd * std::sqrt(1.0 - kept * kept) * normal(random));
    return noise;
}

// reference: witnesses_of - hand-worked: 0.01 a day of 10 h is 1.0 per 1000 h, from day 20 on
TEST(Witnesses, MeasureTheSlopeSinceTheOnset) {
    const auto noise = scatter(1, 0.0, 0.002, 60);
    const auto days = days_with(
        [&](int day) { return 1.0 + 0.01 * std::max(0, day - 20) + noise[static_cast<std::size_t>(day)]; }, 60);
    const Witnesses witnesses = witnesses_of(days, 1020);
    EXPECT_EQ(witnesses.days, 60);
    EXPECT_NEAR(witnesses.slope_per_1000_h.value, 1.0, 0.01);
    EXPECT_LT(witnesses.slope_per_1000_h.low, 1.0);
    EXPECT_GT(witnesses.slope_per_1000_h.high, 1.0);
    EXPECT_LT(witnesses.rank_p, 1e-4);
    EXPECT_EQ(witnesses.shape, stats::Shape::ramp);
    EXPECT_NEAR(*witnesses.changed, 1020, 2);
}

// Each day at ratio 1.4 with a doubt of 0.05 adds ln 1.4 - 0.05 - 0.18 = 0.1065: past 0.25 on the third.
//
// reference: witnesses_of - hand-worked: 30 days of 0.1065 are 3.19 ln-ratio-days
TEST(Witnesses, SumUpWhatIsBeyondDoubt) {
    const auto days = days_with([](int day) { return day < 10 ? 1.0 : 1.4; }, 40, 0.05);
    const Witnesses witnesses = witnesses_of(days, 1000);
    EXPECT_NEAR(witnesses.cumulative_sum, 30.0 * (std::log(1.4) - 0.23), 1e-9);
    EXPECT_EQ(witnesses.sum_passed, 1012);
    EXPECT_EQ(witnesses.shape, stats::Shape::step);
    EXPECT_EQ(witnesses.changed, 1010);
    EXPECT_NEAR(witnesses.weighted_mean.value, 1.4, 0.03);
    EXPECT_LT(witnesses.weighted_mean.low, witnesses.weighted_mean.value);
}

// Days of a healthy section hang together; a plain daily test finds a trend in most of them.
TEST(Witnesses, SeldomSeeSomethingInAHealthySection) {
    int ranks = 0;
    int sums = 0;
    int shapes = 0;
    for (unsigned seed = 1; seed <= 60; ++seed) {
        const auto noise = scatter(seed, 0.9, 0.03, 180);
        const Witnesses witnesses =
            witnesses_of(days_with([&](int day) { return std::exp(noise[static_cast<std::size_t>(day)]); }, 180), 1000);
        ranks += witnesses.rank_p < 0.05 ? 1 : 0;
        sums += witnesses.sum_passed ? 1 : 0;
        shapes += witnesses.shape == stats::Shape::level ? 0 : 1;
    }
    std::printf("healthy: %d, %d and %d of 60 by ranks, sum and shape\n", ranks, sums, shapes);
    EXPECT_LE(ranks, 12);  // 5 % asked for; Hamed and Rao's correction takes only part of a memory of ten days away
    EXPECT_EQ(sums, 0);
    EXPECT_LE(shapes, 12);
}

// reference: witnesses_of - hand-worked: 180 judged days at most, of the newest life alone
TEST(Witnesses, LookAtTheNewestDaysOfTheLife) {
    auto days = days_with([](int) { return 1.1; }, 300);
    EXPECT_EQ(witnesses_of(days, 0).days, 180);
    for (std::size_t i = 0; i < 250; ++i) days[i].life = 0;
    EXPECT_EQ(witnesses_of(days, 0).days, 50);
    days[299].judged_h = 0.0;
    days[299].leakage_lpm = days[299].excess_lpm = unknown;
    EXPECT_EQ(witnesses_of(days, 0).days, 49);
}

TEST(Witnesses, SayNothingOfTooFewDays) {
    EXPECT_TRUE(std::isnan(witnesses_of(days_with([](int) { return 2.0; }, 4), 0).cumulative_sum));
    EXPECT_EQ(witnesses_of({}, 0).days, 0);
}

}  // namespace
}  // namespace slipledger::analytics

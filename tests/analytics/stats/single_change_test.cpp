#include "analytics/stats/single_change.hpp"

#include <cmath>
#include <random>
#include <vector>

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics::stats {
namespace {

// The Nile's yearly flow at Aswan fell once, with the first dam, and the weather turning.
//
// reference: single_change - outside: R 4.2 strucchange 1.5 breakpoints(Nile ~ 1): 28 values, to 1898 (nile.R)
TEST(SingleChange, FindsTheYear1898InTheNilesFlowAsStrucchangeDoes) {
    std::vector<double> years;
    std::vector<double> flow;
    for (const auto& row : analytics::testing::reference_table("nile.csv")) {
        years.push_back(row[0]);
        flow.push_back(row[1]);
    }
    const auto theirs = analytics::testing::reference_table("nile_breaks.csv").front();
    const SingleChange change = single_change(years, flow, 15);
    EXPECT_EQ(change.shape, Shape::step);
    EXPECT_EQ(change.before_step, static_cast<std::size_t>(theirs[0]));
    EXPECT_EQ(years[change.before_step - 1], theirs[1]);
    EXPECT_EQ(theirs[1], 1898.0);
    EXPECT_NEAR(change.bic_level, theirs[2], 1e-6);
    EXPECT_NEAR(change.bic_step, theirs[3], 1e-6);
}

// reference: single_change - hand-worked: 4 values at 1, 4 at 2: a step of 1 after 4; RSS 8 * 0.25 = 2 about the mean
TEST(SingleChange, MeasuresAStep) {
    const std::vector<double> xs{0.0, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0, 8.0};
    const SingleChange change = single_change(xs, std::vector{1.0, 1.1, 0.9, 1.0, 2.0, 2.1, 1.9, 2.0, 2.0}, 2);
    EXPECT_EQ(change.shape, Shape::step);
    EXPECT_EQ(change.before_step, 4U);
    EXPECT_NEAR(change.step, 1.0, 1e-12);
}

// reference: single_change - hand-worked: flat to x = 4, then 0.5 for each x
TEST(SingleChange, TellsARampFromAStepAndWhereItBegan) {
    std::mt19937 random(5);
    std::normal_distribution<double> noise(0.0, 0.02);
    std::vector<double> xs;
    std::vector<double> ys;
    for (int i = 0; i < 30; ++i) {
        xs.push_back(0.5 * i);
        ys.push_back(1.0 + 0.5 * std::fmax(0.0, xs.back() - 4.0) + noise(random));
    }
    const SingleChange change = single_change(xs, ys, 3);
    EXPECT_EQ(change.shape, Shape::ramp);
    EXPECT_NEAR(xs[change.before_ramp - 1], 4.0, 0.51);  // one place either way
    EXPECT_NEAR(change.slope, 0.5, 0.02);
    EXPECT_LT(change.bic_ramp, change.bic_step);
}

// Scatter alone must not look like a change: BIC asks 2 ln n more of one.
TEST(SingleChange, LeavesScatterLevel) {
    int changed = 0;
    for (unsigned seed = 1; seed <= 100; ++seed) {
        std::mt19937 random(seed);
        std::normal_distribution<double> noise;
        std::vector<double> xs;
        std::vector<double> ys;
        for (int i = 0; i < 180; ++i) {
            xs.push_back(i);
            ys.push_back(noise(random));
        }
        changed += single_change(xs, ys, 5).shape == Shape::level ? 0 : 1;
    }
    EXPECT_LE(changed, 12);
}

TEST(SingleChange, OfTooFewValuesIsNotANumber) {
    EXPECT_TRUE(std::isnan(single_change(std::vector{1.0, 2.0}, std::vector{1.0, 2.0}, 1).bic_level));
}

}  // namespace
}  // namespace slipledger::analytics::stats

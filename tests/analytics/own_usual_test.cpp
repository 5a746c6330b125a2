#include "analytics/own_usual.hpp"

#include <cmath>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

// reference: OwnUsual::add, OwnUsual::moved - hand-worked: learned 1 from 1, 1; then 1 + (5 - 1) / 2 of late
TEST(OwnUsual, IsLearnedOnceAndFollowedOfLate) {
    OwnUsual usual({.learn = 2.0, .memory = 2.0});
    usual.add(1.0, 1.0);
    EXPECT_FALSE(usual.known());
    EXPECT_TRUE(std::isnan(usual.moved()));
    usual.add(1.0, 1.0);
    ASSERT_TRUE(usual.known());
    usual.add(5.0, 1.0);
    EXPECT_DOUBLE_EQ(usual.learned(), 1.0);
    EXPECT_DOUBLE_EQ(usual.recent(), 3.0);
    EXPECT_DOUBLE_EQ(usual.moved(), 2.0);
}

// reference: OwnUsual::learned_sd - hand-worked: 1 and 3 at equal weight
TEST(OwnUsual, KnowsHowFarItScattersWhenLearned) {
    OwnUsual usual({.learn = 2.0, .memory = 2.0});
    EXPECT_DOUBLE_EQ(usual.learned_sd(), 0.0);
    usual.add(1.0, 1.0);
    usual.add(3.0, 1.0);
    usual.add(9.0, 1.0);
    EXPECT_DOUBLE_EQ(usual.learned_sd(), 1.0);
}

TEST(OwnUsual, TakesNothingFromWhatIsMissing) {
    OwnUsual usual({.learn = 2.0, .memory = 2.0});
    usual.add(std::nan(""), 1.0);
    usual.add(7.0, 0.0);
    EXPECT_TRUE(std::isnan(usual.recent()));
    EXPECT_FALSE(usual.known());
}

}  // namespace
}  // namespace slipledger::analytics

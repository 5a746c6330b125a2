#include "analytics/causes.hpp"

#include <cmath>
#include <numeric>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

Signs with(std::initializer_list<std::pair<Sign, double>> strengths) {
    Signs signs;
    for (const auto& [sign, strength] : strengths) signs[sign] = {.known = true, .strength = strength};
    return signs;
}

double weight_of(const std::array<double, cause_count>& weights, CauseKind cause) {
    return weights[static_cast<std::size_t>(cause)];
}

// reference: cause_weights - hand-worked: with no sign known the weights are the priors of those that can be, over
// their sum
TEST(Causes, BeginWithHowCommonTheyAre) {
    const auto weights = cause_weights({}, {.basis = Basis::case_drain});
    // 0.30 of 0.30 + 0.08 + 0.05 + 0.10 + 0.03 + 0.04 + 0.08 + 0.03 + 0.03 + 0.02 + 0.02 on a fixed piston pump by
    // drain
    EXPECT_NEAR(weight_of(weights, CauseKind::wear), 0.30 / 0.78, 1e-12);
    EXPECT_NEAR(std::accumulate(weights.begin(), weights.end(), 0.0), 1.0, 1e-12);
    EXPECT_EQ(weight_of(weights, CauseKind::compensator), 0.0);
    EXPECT_EQ(weight_of(weights, CauseKind::bypass), 0.0);
}

// reference: cause_weights - hand-worked: odds of damage to wear 0.08 / 0.30 times e^(3 + 1.5) for a plain step, e^(-3
// - 0.7) without one
TEST(Causes, AreShiftedBySignsAsBayesHasIt) {
    const auto odds = [](double step) {
        const auto weights = cause_weights(with({{Sign::step, step}}), {});
        return weight_of(weights, CauseKind::sudden_damage) / weight_of(weights, CauseKind::wear);
    };
    EXPECT_NEAR(odds(1.0), 0.08 / 0.30 * std::exp(4.5), 1e-9);
    EXPECT_NEAR(odds(0.0), 0.08 / 0.30 * std::exp(-3.7), 1e-9);
    EXPECT_NEAR(odds(0.5), 0.08 / 0.30 * std::exp(0.4), 1e-9);
}

// reference: rank_causes - hand-worked: the evidence is what cause_weights adds up
TEST(Causes, AreRankedWithWhatSpeaksForAndAgainstThem) {
    Signs signs = with({{Sign::ratio_up, 1.0}, {Sign::step, 0.0}, {Sign::excess_scales, 1.0}, {Sign::share_up, 1.0}});
    signs[Sign::ratio_up].value = 2.1;
    signs[Sign::ratio_up].beside = 1.9;
    const auto ranked = rank_causes(signs, {});
    ASSERT_FALSE(ranked.empty());
    EXPECT_EQ(ranked.front().kind, CauseKind::wear);
    ASSERT_EQ(ranked.front().in_favour.size(), 3u);
    EXPECT_EQ(ranked.front().in_favour[0].sign, Sign::ratio_up);
    EXPECT_FLOAT_EQ(ranked.front().in_favour[0].value, 2.1F);
    EXPECT_FLOAT_EQ(ranked.front().in_favour[0].beside, 1.9F);
    EXPECT_TRUE(ranked.front().in_favour[0].present);
    EXPECT_FALSE(ranked.front().in_favour[2].present);  // no step
    EXPECT_TRUE(ranked.front().against.empty());
    double sum = 0.0;
    for (std::size_t i = 0; i < ranked.size(); ++i) {
        sum += ranked[i].weight;
        EXPECT_TRUE(i == 0 || ranked[i].weight <= ranked[i - 1].weight);
    }
    EXPECT_NEAR(sum, 1.0, 1e-12);
}

// reference: instrument_doubt - hand-worked: 0.04 + 0.08 + 0.03 + 0.03 + 0.02 + 0.02 of 0.78
TEST(Causes, CountEveryInstrumentIntoTheDoubt) {
    EXPECT_NEAR(instrument_doubt(cause_weights({}, {})), 0.22 / 0.78, 1e-12);
    EXPECT_TRUE(is_instrument(CauseKind::clock_off));
    EXPECT_FALSE(is_instrument(CauseKind::air_in_oil));
}

TEST(Causes, ShareTheWeightBetweenInternalReturnAndAValveThatPasses) {
    const auto weights =
        cause_weights(with({{Sign::ratio_up, 1.0}, {Sign::other_basis_differs, 1.0}, {Sign::other_basis_agrees, 0.0}}),
                      {.basis = Basis::delivery});
    EXPECT_DOUBLE_EQ(weight_of(weights, CauseKind::internal_return), weight_of(weights, CauseKind::bypass));
    EXPECT_GT(weight_of(weights, CauseKind::bypass), weight_of(weights, CauseKind::wear));
}

TEST(Causes, NeedThePartTheySpeakOf) {
    const auto vane = cause_weights({}, {.type = PumpType::vane, .basis = Basis::delivery});
    EXPECT_GT(weight_of(vane, CauseKind::vanes), 0.0);
    EXPECT_EQ(weight_of(vane, CauseKind::blocked_drain), 0.0);
    const auto gear = cause_weights({}, {.type = PumpType::external_gear, .basis = Basis::delivery});
    EXPECT_EQ(weight_of(gear, CauseKind::vanes), 0.0);
    EXPECT_EQ(weight_of(gear, CauseKind::internal_return), 0.0);  // there it is wear
    EXPECT_GT(weight_of(gear, CauseKind::bypass), 0.0);
}

}  // namespace
}  // namespace slipledger::analytics

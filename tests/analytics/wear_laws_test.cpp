#include "analytics/wear_laws.hpp"

#include <cmath>
#include <functional>
#include <random>

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics {
namespace {

const LawWeights even{0.25, 0.25, 0.25, 0.25};

WearLaws begun() {
    WearLaws laws;
    laws.begin({.ln = 0.0, .sd = 0.03}, Basis::case_drain);
    return laws;
}

// Days of 16 running hours whose ln ratio strays with a memory of ten days, as a plant's does.
WearLaws fed(const std::function<double(double running_days)>& ratio, int days, unsigned seed) {
    std::mt19937 random(seed);
    std::normal_distribution<double> normal;
    WearLaws laws = begun();
    double stray = 0.0;
    const double keep = std::exp(-0.1);
    for (int day = 1; day <= days; ++day) {
        stray = keep * stray + 0.025 * std::sqrt(1.0 - keep * keep) * normal(random);
        const double noise = stray + 0.01 * normal(random);
        laws.take(std::log(ratio(day * 2.0 / 3.0)) + noise, 2.0 / 3.0, 1.0, Basis::case_drain);
    }
    return laws;
}

// reference: WearLaws::take, WearLaws::laws, WearLaws::drift - outside: the same models written apart in NumPy with
// plain Kalman updates (wear_laws.py)
TEST(WearLaws, AreTheInteractingModelsOfTheReference) {
    WearLaws laws;
    laws.begin({.ln = 0.02, .sd = 0.03}, Basis::case_drain);
    for (const auto& row : analytics::testing::reference_table("wear_laws.csv")) {
        laws.take(row[2], row[0], row[1], Basis::case_drain);
        const DriftEstimate drift = laws.drift(even);
        // Relative: 240 steps in two forms of the same update.
        EXPECT_NEAR(drift.mean, row[3], 1e-6 * std::abs(row[3]) + 1e-9);
        EXPECT_NEAR(drift.sd, row[4], 1e-6 * row[4]);
        EXPECT_NEAR(drift.positive, row[5], 1e-6);
        const auto beliefs = laws.laws(even);
        for (std::size_t i = 0; i < wear_laws; ++i) {
            const std::size_t at = 6 + 6 * i;
            EXPECT_NEAR(beliefs[i].weight, row[at], 1e-6);
            EXPECT_NEAR(beliefs[i].ln_ratio, row[at + 1], 1e-6);
            EXPECT_NEAR(beliefs[i].rate, row[at + 2], 1e-6);
            EXPECT_NEAR(beliefs[i].ratio_variance, row[at + 3], 1e-6 * row[at + 3] + 1e-12);
            EXPECT_NEAR(beliefs[i].covariance, row[at + 4], 1e-6 * std::abs(row[at + 4]) + 1e-12);
            EXPECT_NEAR(beliefs[i].rate_variance, row[at + 5], 1e-6 * row[at + 5] + 1e-15);
        }
    }
}

// reference: WearLaws::drift - outside: truth of the simulation, ratio 1 + 0.006 a running day: drift 0.006 / 2.2 at
// day 200
TEST(WearLaws, KnowTheDriftOfSteadyWearWithinAFifth) {
    double sum = 0.0;
    for (unsigned seed = 1; seed <= 10; ++seed) {
        const DriftEstimate drift = fed([](double d) { return 1.0 + 0.006 * d; }, 300, seed).drift(even);
        EXPECT_NEAR(drift.mean, 0.006 / 2.2, 3.5 * drift.sd) << seed;
        EXPECT_LT(drift.sd, 0.25 * 0.006 / 2.2) << seed;
        EXPECT_GT(drift.positive, 0.999) << seed;
        sum += drift.mean;
    }
    EXPECT_NEAR(sum / 10.0, 0.006 / 2.2, 0.1 * 0.006 / 2.2);
}

// reference: WearLaws::drift - outside: truth of the simulation, no wear for 400 days, then 0.008 a running day
TEST(WearLaws, SeeWearThatBeginsLate) {
    const auto late = [](double d) { return 1.0 + 0.008 * std::fmax(0.0, d - 270.0); };
    EXPECT_LT(fed(late, 400, 3).drift(even).positive, 0.98);
    const DriftEstimate drift = fed(late, 520, 3).drift(even);
    EXPECT_GT(drift.positive, 0.98);
    EXPECT_NEAR(drift.mean, 0.008 / 1.61, 0.3 * 0.008 / 1.61);
}

// reference: WearLaws::drift - outside: truth of the simulation, ratio 1 for a year and a half
TEST(WearLaws, SeldomSeeADriftWhereThereIsNone) {
    int surely = 0;
    for (unsigned seed = 1; seed <= 20; ++seed)
        surely += fed([](double) { return 1.0; }, 500, seed).drift(even).positive > 0.98 ? 1 : 0;
    EXPECT_LE(surely, 1);
}

// reference: WearLaws::laws - outside: truth of the simulation, k = -0.6 and 1.2 from 1 to 3 in 330 running days
TEST(WearLaws, WeighTheLawsByHowWearGoes) {
    LawWeights slowing{};
    LawWeights racing{};
    for (unsigned seed = 1; seed <= 10; ++seed) {
        const auto one = fed([](double d) { return std::pow(1.0 + 4.8 * d / 330.0, 1.0 / 1.6); }, 480, seed).laws(even);
        const auto other = fed([](double d) { return std::pow(1.0 - 0.197 * d / 330.0, -5.0); }, 480, seed).laws(even);
        for (std::size_t i = 0; i < wear_laws; ++i) {
            slowing[i] += one[i].weight / 10.0;
            racing[i] += other[i].weight / 10.0;
        }
    }
    EXPECT_GT(slowing[0] + slowing[1], 0.7);
    EXPECT_GT(racing[2] + racing[3], 0.7);
}

// reference: WearLaws::let_go - hand-worked: 0.35^2 more on x of each run, and so of both together
TEST(WearLaws, LetWearGoAtAJumpAndKeepTheirRates) {
    WearLaws laws = fed([](double d) { return 1.0 + 0.004 * d; }, 100, 4);
    const auto before = laws.laws(even);
    laws.let_go();
    const auto after = laws.laws(even);
    for (std::size_t i = 0; i < wear_laws; ++i) {
        EXPECT_NEAR(after[i].ratio_variance, before[i].ratio_variance + 0.35 * 0.35, 1e-12);
        EXPECT_EQ(after[i].rate, before[i].rate);
    }
    laws.take(0.9, 2.0 / 3.0, 1.0, Basis::case_drain);
    EXPECT_GT(laws.laws(even)[1].ln_ratio, 0.75);
}

TEST(WearLaws, SayNothingBeforeTheyBeginAndOnlyMoveOnADayWithoutANumber) {
    EXPECT_TRUE(std::isnan(WearLaws{}.drift(even).mean));
    WearLaws laws = fed([](double d) { return 1.0 + 0.004 * d; }, 100, 5);
    const auto before = laws.laws(even);
    laws.take(std::nan(""), 10.0, 14.0, Basis::case_drain);
    const auto after = laws.laws(even);
    EXPECT_GT(after[1].ln_ratio, before[1].ln_ratio);
    EXPECT_GT(after[1].rate_variance, before[1].rate_variance);
    EXPECT_NEAR(after[1].weight, before[1].weight, 1e-12);
}

}  // namespace
}  // namespace slipledger::analytics

#include "analytics/stats/kalman.hpp"

#include <vector>

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics::stats {
namespace {

using analytics::testing::reference_table;

constexpr double relative = 1e-9;  // both are double arithmetic; statsmodels' start variance of 100 costs some digits

void expect_close(double ours, double theirs) {
    EXPECT_NEAR(ours, theirs, relative * std::max(1.0, std::abs(theirs)));
}

// reference: carry, best_gain, take_in - outside: statsmodels 0.13 Kalman filter, local linear trend (kalman.py)
TEST(KalmanStep, FollowsALocalLinearTrendAsStatsmodelsDoes) {
    Belief<2> belief;
    belief.covariance.diagonal() << 100.0, 1.0;
    StateMatrix<2> motion;
    motion << 1.0, 1.0, 0.0, 1.0;
    StateMatrix<2> noise = StateMatrix<2>::Zero();
    noise.diagonal() << 0.01, 0.0004;
    bool first = true;
    for (const auto& row : reference_table("kalman_trend.csv")) {
        if (!first) carry(belief, motion, noise);
        first = false;
        Sighting<2> seen;
        seen.design << 1.0, 0.0;
        seen.innovation = row[0] - belief.mean(0);
        seen.variance = 0.04;
        take_in(belief, seen, best_gain(belief, seen));
        expect_close(belief.mean(0), row[1]);
        expect_close(belief.mean(1), row[2]);
        expect_close(belief.covariance(0, 0), row[3]);
        expect_close(belief.covariance(0, 1), row[4]);
        expect_close(belief.covariance(1, 1), row[5]);
    }
}

// reference: smooth - outside: statsmodels 0.13 Kalman smoother, local linear trend (kalman.py)
TEST(KalmanSmoother, LooksBackOnALocalLinearTrendAsStatsmodelsDoes) {
    const auto rows = reference_table("kalman_smoothed.csv");
    StateMatrix<2> motion;
    motion << 1.0, 1.0, 0.0, 1.0;
    StateMatrix<2> noise = StateMatrix<2>::Zero();
    noise.diagonal() << 0.01, 0.0004;
    std::vector<Belief<2>> expected(1);
    std::vector<Belief<2>> filtered;
    expected[0].covariance.diagonal() << 100.0, 1.0;
    for (const auto& row : rows) {
        Belief<2> belief = expected.back();
        Sighting<2> seen;
        seen.design << 1.0, 0.0;
        seen.innovation = row[0] - belief.mean(0);
        seen.variance = 0.04;
        take_in(belief, seen, best_gain(belief, seen));
        filtered.push_back(belief);
        carry(belief, motion, noise);
        expected.push_back(belief);
    }
    Belief<2> smoothed = filtered.back();
    for (std::size_t i = rows.size(); i-- > 0;) {
        if (i + 1 < rows.size()) smoothed = smooth(filtered[i], motion, expected[i + 1], smoothed);
        expect_close(smoothed.mean(0), rows[i][1]);
        expect_close(smoothed.mean(1), rows[i][2]);
        expect_close(smoothed.covariance(0, 0), rows[i][3]);
        expect_close(smoothed.covariance(0, 1), rows[i][4]);
        expect_close(smoothed.covariance(1, 1), rows[i][5]);
    }
}

// reference: best_gain, take_in - outside: statsmodels 0.13 Kalman filter, regression with fixed coefficients
// (kalman.py)
TEST(KalmanStep, FitsARegressionWithFixedCoefficientsAsStatsmodelsDoes) {
    Belief<3> belief;
    belief.covariance.diagonal().setConstant(25.0);
    for (const auto& row : reference_table("kalman_regression.csv")) {
        Sighting<3> seen;
        seen.design << 1.0, row[0], row[1];
        seen.innovation = row[2] - seen.design.dot(belief.mean);
        seen.variance = 0.01;
        take_in(belief, seen, best_gain(belief, seen));
        for (int i = 0; i < 3; ++i) {
            expect_close(belief.mean(i), row[static_cast<std::size_t>(3 + i)]);
            expect_close(belief.covariance(i, i), row[static_cast<std::size_t>(6 + i)]);
        }
    }
}

// reference: innovation_variance, take_in - hand-worked: 1 + 1 = 2; gain 1/2; mean 1/2; variance 1/4 + 1/4
TEST(KalmanStep, WeighsOneStateAndOneSightingEquallyWhenTheyAreEquallySure) {
    Belief<1> belief;
    belief.covariance(0, 0) = 1.0;
    Sighting<1> seen{StateVector<1>::Ones(), 1.0, 1.0};
    EXPECT_DOUBLE_EQ(innovation_variance(belief, seen), 2.0);
    take_in(belief, seen, best_gain(belief, seen));
    EXPECT_DOUBLE_EQ(belief.mean(0), 0.5);
    EXPECT_DOUBLE_EQ(belief.covariance(0, 0), 0.5);
}

// Schmidt's consider filter: the state that is held keeps its variance, and its doubt stays in the other's.
//
// reference: take_in - hand-worked: seen = p + q, P = I, R = 1, K = (1/3, 0): var p = 4/9 + 1/9 + 1/9, cov = -1/3
TEST(KalmanStep, LeavesAHeldStateAloneAndCountsItsDoubt) {
    Belief<2> belief;
    belief.covariance.setIdentity();
    Sighting<2> seen{StateVector<2>::Ones(), 3.0, 1.0};
    StateVector<2> gain = best_gain(belief, seen);
    EXPECT_DOUBLE_EQ(gain(0), 1.0 / 3.0);
    gain(1) = 0.0;
    take_in(belief, seen, gain);
    EXPECT_DOUBLE_EQ(belief.mean(0), 1.0);
    EXPECT_DOUBLE_EQ(belief.mean(1), 0.0);
    EXPECT_NEAR(belief.covariance(0, 0), 6.0 / 9.0, 1e-15);
    EXPECT_NEAR(belief.covariance(0, 1), -1.0 / 3.0, 1e-15);
    EXPECT_DOUBLE_EQ(belief.covariance(1, 1), 1.0);
}

}  // namespace
}  // namespace slipledger::analytics::stats

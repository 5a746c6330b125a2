#include "analytics/prognosis.hpp"

#include <cmath>

#include <gtest/gtest.h>
#include <boost/math/distributions/inverse_gaussian.hpp>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics {
namespace {

// All laws agree on x and on the drift it has now; each knows its own rate at ratio 1 for that.
WearOutlook outlook_of(double x, double drift, double x_sd, double drift_sd, double correlation, double limit) {
    WearOutlook outlook{.ln_limit = std::log(limit)};
    for (std::size_t i = 0; i < wear_laws; ++i) {
        const double speed = std::exp((wear_powers[i] - 1.0) * x);
        outlook.laws[i] = {.power = wear_powers[i],
                           .weight = 0.25,
                           .ln_ratio = x,
                           .rate = drift / speed,
                           .ratio_variance = x_sd * x_sd,
                           .rate_variance = drift_sd * drift_sd / speed / speed,
                           .covariance = correlation * x_sd * drift_sd / speed};
    }
    return outlook;
}

WearOutlook exactly(double power, double x, double rate, double limit) {
    WearOutlook outlook = outlook_of(x, rate, 0.0, 0.0, 0.0, limit);
    for (LawBelief& law : outlook.laws) {
        law.power = power;
        law.rate = rate;
    }
    outlook.wander = 0.0;
    outlook.jitter = 0.0;
    return outlook;
}

// reference: passage_quantiles - outside: simulation of 1.6 million passages with NumPy (first_passage.py)
TEST(Prognosis, HasTheQuantilesOfSimulatedPassages) {
    for (const auto& row : analytics::testing::reference_table("first_passage.csv")) {
        WearOutlook outlook = outlook_of(row[0], row[1], row[2], row[3], row[4], row[5]);
        outlook.prior.median_h = row[6];
        outlook.prior.ln_sd = row[7];
        outlook.wander = row[8];
        outlook.jitter = 0.0;
        for (std::size_t i = 0; i < wear_laws; ++i) outlook.laws[i].weight = row[9 + i];
        const PassageQuantiles quantiles = passage_quantiles(outlook);
        // Simulation scatters by some 0.5 %; seven points over the rate and a normal ln hours cost a little more.
        EXPECT_NEAR(quantiles.low_h / row[13], 1.0, 0.03);
        EXPECT_NEAR(quantiles.mid_h / row[14], 1.0, 0.03);
        EXPECT_NEAR(quantiles.high_h / row[15], 1.0, 0.04);
    }
}

// Under k = 1 with an exact rate, ln ratio is a Wiener process with constant drift.
//
// reference: passage_quantiles - outside: SciPy 1.10 scipy.stats.invgauss.ppf, 10, 50 and 90 % (inverse_gaussian.py)
TEST(Prognosis, OfAConstantDriftIsSciPysInverseGaussian) {
    const auto rows = analytics::testing::reference_table("inverse_gaussian.csv");
    for (std::size_t i = 0; i + 4 < rows.size(); i += 5) {
        WearOutlook outlook = exactly(1.0, 0.0, rows[i][1], std::exp(rows[i][0]));
        outlook.jitter = rows[i][2];
        const PassageQuantiles quantiles = passage_quantiles(outlook);
        // A normal ln hours for it: within 2 % while the jitter makes up less than a third of the time.
        const double share = rows[i][2] / std::sqrt(rows[i][0] * rows[i][1]);
        if (share > 0.35) continue;
        EXPECT_NEAR(quantiles.low_h / 24.0 / rows[i + 1][4], 1.0, 0.02) << share;
        EXPECT_NEAR(quantiles.mid_h / 24.0 / rows[i + 2][4], 1.0, 0.01) << share;
        EXPECT_NEAR(quantiles.high_h / 24.0 / rows[i + 3][4], 1.0, 0.02) << share;
    }
}

// reference: passage_share - outside: Boost.Math inverse_gaussian of mean c / v and shape (c / s)^2
TEST(Prognosis, OfAConstantDriftIsBoostsInverseGaussian) {
    const double distance = std::log(3.0);
    for (const double jitter : {0.002, 0.006, 0.02}) {
        WearOutlook outlook = exactly(1.0, 0.0, 0.003, 3.0);
        outlook.jitter = jitter;
        const boost::math::inverse_gaussian theirs(distance / 0.003, distance * distance / (jitter * jitter));
        for (const double share : {0.1, 0.5, 0.9})
            EXPECT_NEAR(passage_share(outlook, 24.0 * boost::math::quantile(theirs, share)), share, 0.01) << jitter;
    }
}

// reference: passage_share, passage_quantiles - hand-worked: 24 (3^(1-k) - 1) / (0.01 (1-k)) = 7199, 4800, 3311, 2367 h
// for k = -0.6, 0, 0.6, 1.2
TEST(Prognosis, OfExactWearAndRateIsTheClosedFormOfEachLaw) {
    const std::array<double, wear_laws> hours{7199.2, 4800.0, 3311.2, 2367.2};
    for (std::size_t i = 0; i < wear_laws; ++i) {
        const WearOutlook outlook = exactly(wear_powers[i], 0.0, 0.01, 3.0);
        EXPECT_NEAR(passage_quantiles(outlook).mid_h, hours[i], 1.0) << wear_powers[i];
        EXPECT_NEAR(passage_share(outlook, 0.999 * hours[i]), 0.0, 1e-6);
        EXPECT_NEAR(passage_share(outlook, 1.001 * hours[i]), 1.0, 1e-6);
    }
}

// reference: rate_of_life - hand-worked: straight from 1 to 3 in 4800 h = 200 days: 0.01 a day; at k = 1 ln 3 / 200
TEST(Prognosis, KnowsTheRateThatMakesALife) {
    EXPECT_NEAR(rate_of_life(0.0, 4800.0), 0.01, 1e-12);
    EXPECT_NEAR(rate_of_life(1.0, 4800.0), std::log(3.0) / 200.0, 1e-12);
    EXPECT_NEAR(rate_of_life(-0.6, 7199.2), 0.01, 1e-5);
}

// A rate that may change makes the range wider and its middle no later.
//
// reference: passage_quantiles - hand-worked: sd of ln hours sqrt(0.25 ln 3 / 3) = 0.3026: 1.2816 of it is a
// factor 1.474
TEST(Prognosis, IsLessSureWhereTheRateWanders) {
    WearOutlook outlook = exactly(0.0, 0.0, 0.01, 3.0);
    outlook.wander = rate_wander;
    const PassageQuantiles quantiles = passage_quantiles(outlook);
    EXPECT_NEAR(quantiles.mid_h, 4800.0, 1.0);
    EXPECT_NEAR(quantiles.high_h / quantiles.mid_h, 1.474, 0.001);
    EXPECT_NEAR(quantiles.mid_h / quantiles.low_h, 1.474, 0.001);
}

// reference: passage_quantiles - hand-worked: a limit that is behind is reached at once
TEST(Prognosis, IsNothingBehindTheLimit) {
    EXPECT_DOUBLE_EQ(passage_quantiles(outlook_of(1.2, 0.001, 0.001, 1e-4, 0.0, 3.0)).high_h, 0.0);
}

TEST(Prognosis, IsNotANumberWhereSomethingIsNotKnown) {
    EXPECT_TRUE(std::isnan(passage_quantiles({}).low_h));
    EXPECT_TRUE(std::isnan(passage_share({}, 10.0)));
}

}  // namespace
}  // namespace slipledger::analytics

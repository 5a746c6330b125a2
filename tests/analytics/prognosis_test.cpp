#include "analytics/prognosis.hpp"

#include <cmath>

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics {
namespace {

// reference: passage_quantiles - outside: simulation of 4 million passages with NumPy (first_passage.py)
TEST(Prognosis, HasTheQuantilesOfSimulatedPassages) {
    for (const auto& row : analytics::testing::reference_table("first_passage.csv")) {
        const PassageQuantiles quantiles = passage_quantiles({.ln_ratio = row[0],
                                                              .drift_per_day = row[1],
                                                              .ratio_variance = row[2] * row[2],
                                                              .drift_variance = row[3] * row[3],
                                                              .covariance = row[4] * row[2] * row[3],
                                                              .ln_limit = std::log(row[5])});
        // Simulation scatters by some 0.2 %, more in a flat tail; five points over x cost about as much.
        EXPECT_NEAR(quantiles.low_h / row[6], 1.0, 0.01);
        EXPECT_NEAR(quantiles.mid_h / row[7], 1.0, 0.01);
        if (std::isfinite(row[8]))
            EXPECT_NEAR(quantiles.high_h / row[8], 1.0, 0.03);
        else
            EXPECT_TRUE(std::isinf(quantiles.high_h));
    }
}

// With nothing unsure but the law, a quarter more is reached at each law's own time; for k = 0, where the ratio grows
// straight, from 1 to 3 at 0.01 a day: 2 / 0.01 = 200 days.
//
// reference: passage_share - hand-worked: 24 (3^(1-k) - 1) / (0.01 (1-k)) = 7199, 4800, 3311, 2367 h for the four laws
TEST(Prognosis, OfExactWearAndDriftIsTheClosedFormOfEachLaw) {
    const WearOutlook exact{.ln_ratio = 0.0,
                            .drift_per_day = 0.01,
                            .ratio_variance = 0.0,
                            .drift_variance = 0.0,
                            .ln_limit = std::log(3.0)};
    EXPECT_NEAR(passage_share(exact, 2360.0), 0.0, 1e-12);
    EXPECT_NEAR(passage_share(exact, 2375.0), 0.25, 1e-12);
    EXPECT_NEAR(passage_share(exact, 3300.0), 0.25, 1e-12);
    EXPECT_NEAR(passage_share(exact, 3320.0), 0.50, 1e-12);
    EXPECT_NEAR(passage_share(exact, 4799.0), 0.50, 1e-12);
    EXPECT_NEAR(passage_share(exact, 4801.0), 0.75, 1e-12);
    EXPECT_NEAR(passage_share(exact, 7200.0), 1.00, 1e-12);
}

// reference: passage_quantiles - hand-worked: a limit that is behind is reached at once; without drift never
TEST(Prognosis, IsNothingBehindTheLimitAndNeverWithoutDrift) {
    WearOutlook outlook{.ln_ratio = 1.2,
                        .drift_per_day = 0.001,
                        .ratio_variance = 1e-6,
                        .drift_variance = 1e-8,
                        .ln_limit = std::log(3.0)};
    EXPECT_DOUBLE_EQ(passage_quantiles(outlook).high_h, 0.0);
    outlook.ln_ratio = 0.0;
    outlook.drift_per_day = -0.01;
    EXPECT_TRUE(std::isinf(passage_quantiles(outlook).low_h));
}

TEST(Prognosis, IsNotANumberWhereSomethingIsNotKnown) {
    EXPECT_TRUE(std::isnan(passage_quantiles({}).low_h));
    EXPECT_TRUE(std::isnan(passage_share({}, 10.0)));
}

}  // namespace
}  // namespace slipledger::analytics

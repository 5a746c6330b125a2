#include "analytics/stats/mann_kendall.hpp"

#include <cmath>
#include <vector>

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics::stats {
namespace {

// reference: mann_kendall, tie_sum - outside: SciPy 1.10 scipy.stats.kendalltau against time, ties included (trend.py)
TEST(MannKendall, CountsAsSciPysKendallTauDoes) {
    for (const auto& row : analytics::testing::reference_table("trend.csv")) {
        const std::vector<double> values(row.begin() + 12, row.end());
        const MannKendall test = mann_kendall(values);
        EXPECT_EQ(test.s, row[7]) << values.size();
        EXPECT_NEAR(test.variance, row[8], 1e-9 * row[8]) << values.size();
        EXPECT_NEAR(test.p, row[9], 1e-12) << values.size();
    }
}

// reference: mann_kendall_autocorrelated - outside: Hamed and Rao's formula worked out with SciPy's ranks and
// statsmodels' autocorrelation (trend.py)
TEST(MannKendall, IsCorrectedForAutocorrelationAsHamedAndRaoSay) {
    int corrected = 0;
    for (const auto& row : analytics::testing::reference_table("trend.csv")) {
        const std::vector<double> values(row.begin() + 12, row.end());
        const MannKendall test = mann_kendall_autocorrelated(values);
        EXPECT_NEAR(test.variance_factor, row[10], 1e-9 * row[10]) << values.size();
        EXPECT_NEAR(test.p, row[11], 1e-9) << values.size();
        corrected += test.variance_factor > 1.5 ? 1 : 0;
    }
    EXPECT_GE(corrected, 15);  // else the table would not try it
}

// reference: mann_kendall, tie_sum - hand-worked: 6 rising pairs, var 4 * 3 * 13 / 18; groups of 2 and 3: 18 + 66
TEST(MannKendall, CountsPairs) {
    const MannKendall test = mann_kendall(std::vector{1.0, 2.0, 3.0, 4.0});
    EXPECT_EQ(test.s, 6.0);
    EXPECT_NEAR(test.variance, 8.6667, 1e-4);
    EXPECT_NEAR(test.z, 5.0 / std::sqrt(test.variance), 1e-12);
    EXPECT_EQ(tie_sum(std::vector{2.0, 1.0, 2.0, 1.0, 2.0}), 84.0);
}

TEST(MannKendall, OfEqualValuesHasNoTrendAndOfTooFewNoAnswer) {
    EXPECT_EQ(mann_kendall_autocorrelated(std::vector(10, 1.0)).p, 1.0);
    EXPECT_TRUE(std::isnan(mann_kendall(std::vector{1.0, 2.0}).p));
    EXPECT_TRUE(std::isnan(mann_kendall_autocorrelated(std::vector{1.0, 2.0, 3.0}).z));
}

}  // namespace
}  // namespace slipledger::analytics::stats

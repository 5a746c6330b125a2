#include "analytics/stats/control_chart.hpp"

#include <array>
#include <cmath>

#include <gtest/gtest.h>

namespace slipledger::analytics::stats {
namespace {

struct ChartRow {
    double seen;
    double high;
    double low;
};

// Twenty group means, target 325, k = 0.3175, h = 4.1959; the handbook prints two decimals.
constexpr std::array<ChartRow, 20> handbook_sums{{
    {324.925, 0.00, 0.00},  {324.675, 0.00, 0.01},  {324.725, 0.00, 0.00},  {324.350, 0.00, 0.33},
    {325.350, 0.03, 0.00},  {325.225, 0.00, 0.00},  {324.125, 0.00, 0.56},  {324.525, 0.00, 0.72},
    {325.225, 0.00, 0.17},  {324.600, 0.00, 0.25},  {324.625, 0.00, 0.31},  {325.150, 0.00, 0.00},
    {328.325, 3.01, 0.00},  {327.250, 4.94, 0.00},  {327.825, 7.45, 0.00},  {328.500, 10.63, 0.00},
    {326.675, 11.99, 0.00}, {327.775, 14.44, 0.00}, {326.875, 16.00, 0.00}, {328.350, 19.04, 0.00},
}};

// reference: cumulative_sum - outside: NIST/SEMATECH e-Handbook 6.3.2.3, worked example (quoted from memory)
TEST(ControlChart, HasTheHandbooksCumulativeSums) {
    CumulativeSum sum;
    int first_beyond = 0;
    for (std::size_t i = 0; i < handbook_sums.size(); ++i) {
        sum = cumulative_sum(sum, handbook_sums[i].seen - 325.0, 0.3175);
        EXPECT_NEAR(sum.high, handbook_sums[i].high, 0.0051) << "group " << i + 1;
        EXPECT_NEAR(sum.low, handbook_sums[i].low, 0.0051) << "group " << i + 1;
        if (first_beyond == 0 && sum.high > 4.1959) first_beyond = static_cast<int>(i) + 1;
    }
    EXPECT_EQ(first_beyond, 14);
}

// Twenty values, weight 0.3, mean 50 and standard deviation 2.0539 of history; the handbook prints two decimals.
constexpr std::array<std::array<double, 2>, 20> handbook_means{{
    {52.0, 50.60}, {47.0, 49.52}, {53.0, 50.56}, {49.3, 50.18}, {50.1, 50.16}, {47.0, 49.21}, {51.0, 49.75},
    {50.1, 49.85}, {51.2, 50.26}, {50.5, 50.33}, {49.6, 50.11}, {47.6, 49.36}, {49.9, 49.52}, {51.3, 50.05},
    {47.8, 49.38}, {51.2, 49.92}, {52.6, 50.73}, {52.4, 51.23}, {53.6, 51.94}, {52.1, 51.99},
}};

// reference: weighted_mean, weighted_mean_sd - outside: NIST/SEMATECH e-Handbook 6.3.2.4, worked example (quoted from
// memory)
TEST(ControlChart, HasTheHandbooksWeightedMeansAndLimits) {
    double mean = 50.0;
    for (const auto& [seen, expected] : handbook_means) {
        mean = weighted_mean(mean, seen, 0.3);
        EXPECT_NEAR(mean, expected, 0.0051) << seen;
    }
    EXPECT_NEAR(50.0 + 3.0 * weighted_mean_sd(2.0539, 0.3), 52.5884, 5e-5);
    EXPECT_NEAR(50.0 - 3.0 * weighted_mean_sd(2.0539, 0.3), 47.4115, 1.5e-4);
}

TEST(ControlChart, TakesNothingFromWhatIsNotANumber) {
    EXPECT_EQ(cumulative_sum({.high = 1.0, .low = 2.0}, std::nan(""), 0.1).low, 2.0);
    EXPECT_EQ(weighted_mean(50.0, std::nan(""), 0.3), 50.0);
}

}  // namespace
}  // namespace slipledger::analytics::stats

#include "analytics/stats/theil_sen.hpp"

#include <cmath>
#include <numeric>
#include <vector>

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics::stats {
namespace {

// reference: theil_sen - outside: SciPy 1.10 scipy.stats.theilslopes at 80 and 95 % (trend.py)
TEST(TheilSen, HasSciPysSlopeAndInterval) {
    for (const auto& row : analytics::testing::reference_table("trend.csv")) {
        const std::vector<double> values(row.begin() + 12, row.end());
        std::vector<double> places(values.size());
        std::iota(places.begin(), places.end(), 0.0);
        const SlopeRange slope = theil_sen(places, values, 0.8);
        const SlopeRange wide = theil_sen(places, values, 0.95);
        EXPECT_NEAR(slope.value, row[1], 1e-12) << values.size();
        EXPECT_NEAR(slope.low, row[2], 1e-12) << values.size();
        EXPECT_NEAR(slope.high, row[3], 1e-12) << values.size();
        EXPECT_NEAR(wide.low, row[5], 1e-12) << values.size();
        EXPECT_NEAR(wide.high, row[6], 1e-12) << values.size();
    }
}

// reference: theil_sen - hand-worked: slopes 1, 1, 1, 3, 4, 7 of which the middle two are 1 and 3
TEST(TheilSen, IsTheMiddleOfAllSlopes) {
    EXPECT_DOUBLE_EQ(theil_sen(std::vector{0.0, 1.0, 2.0, 3.0}, std::vector{1.0, 2.0, 3.0, 10.0}, 0.8).value, 2.0);
}

// reference: theil_sen - hand-worked: n = 8 is 28 slopes, var S = 8 * 7 * 21 / 18 = 65.3; four times that is z S twice
TEST(TheilSen, IsLessSureWhereDaysHangTogether) {
    const std::vector<double> places{0.0, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0};
    const std::vector<double> values{0.0, 1.3, 1.8, 3.3, 3.9, 5.5, 5.8, 7.2};
    const SlopeRange plain = theil_sen(places, values, 0.8);
    const SlopeRange wider = theil_sen(places, values, 0.8, 4.0);
    EXPECT_EQ(wider.value, plain.value);
    EXPECT_LT(wider.low, plain.low);
    EXPECT_GT(wider.high, plain.high);
}

TEST(TheilSen, IsNotANumberWithoutTwoPlaces) {
    EXPECT_TRUE(std::isnan(theil_sen({}, {}, 0.8).value));
    EXPECT_TRUE(std::isnan(theil_sen(std::vector{1.0, 1.0}, std::vector{1.0, 2.0}, 0.8).value));
    EXPECT_TRUE(std::isnan(theil_sen(std::vector{1.0, 2.0}, std::vector{1.0, 2.0}, 1.0).value));
}

}  // namespace
}  // namespace slipledger::analytics::stats

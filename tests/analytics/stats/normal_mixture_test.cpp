#include "analytics/stats/normal_mixture.hpp"

#include <cmath>
#include <vector>

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics::stats {
namespace {

// reference: mixture_quantile, mixture_share - outside: SciPy 1.10, brentq on scipy.stats.norm.cdf (normal_mixture.py)
TEST(NormalMixture, HasTheQuantilesThatSciPyFinds) {
    for (const auto& row : analytics::testing::reference_table("normal_mixture.csv")) {
        std::vector<NormalPart> parts;
        for (std::size_t i = 2; i + 2 < row.size(); i += 3)
            parts.push_back({.weight = row[i], .mean = row[i + 1], .sd = row[i + 2]});
        EXPECT_NEAR(mixture_quantile(parts, row[0]), row[1], 2e-6) << parts.size() << " parts at " << row[0];
        EXPECT_NEAR(mixture_share(parts, row[1]), row[0], 1e-9) << parts.size() << " parts at " << row[0];
    }
}

// reference: mixture_quantile, mixture_share - hand-worked: halfway between two alike
TEST(NormalMixture, LiesHalfwayBetweenTwoAlike) {
    const std::vector<NormalPart> parts{{.weight = 3.0, .mean = 0.0}, {.weight = 3.0, .mean = 2.0}};
    EXPECT_NEAR(mixture_quantile(parts, 0.5), 1.0, 1e-6);
    EXPECT_DOUBLE_EQ(mixture_share(parts, 1.0), 0.5);
}

TEST(NormalMixture, OfNothingIsNotANumber) {
    EXPECT_TRUE(std::isnan(mixture_quantile({}, 0.5)));
    EXPECT_TRUE(std::isnan(mixture_share({}, 0.0)));
    EXPECT_TRUE(std::isnan(mixture_quantile(std::vector<NormalPart>{{.weight = 1.0}}, 1.0)));
}

}  // namespace
}  // namespace slipledger::analytics::stats

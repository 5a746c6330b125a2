#include "analytics/life_prior.hpp"

#include <cmath>
#include <limits>
#include <numeric>
#include <vector>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

// 1 / (0.81 - 0.25) = 1.786; three exact lives add 4 each: ln m = (1.786 ln 10000 + 12 ln 4000) / 13.786
//
// reference: life_prior - hand-worked: exp(8.4128) = 4504 h; sqrt(1 / 13.786 + 0.25) = 0.568; laws (0.5 + 3) / 5 and
// 0.1
TEST(LifePrior, LeansOnPastLivesTheMoreOfThemThereAre) {
    const PastLife life{.life_h = 4000.0, .ln_sd = 0.0, .laws = {0.0, 1.0, 0.0, 0.0}};
    const LifePrior prior = life_prior(std::vector(3, life));
    EXPECT_NEAR(prior.median_h, 4504.1, 0.1);
    EXPECT_NEAR(prior.ln_sd, 0.5679, 1e-4);
    EXPECT_DOUBLE_EQ(prior.laws[1], 0.7);
    EXPECT_DOUBLE_EQ(prior.laws[3], 0.1);
    EXPECT_NEAR(std::accumulate(prior.laws.begin(), prior.laws.end(), 0.0), 1.0, 1e-12);
}

// reference: life_prior - hand-worked: with a doubt of 0.9 a life counts 1 / (0.25 + 0.81) = 0.943 where it counted 4
TEST(LifePrior, LeansLessOnALifeThatIsHardlyKnown) {
    const LifePrior sure =
        life_prior(std::vector<PastLife>{{.life_h = 3000.0, .ln_sd = 0.0, .laws = {0.0, 1.0, 0.0, 0.0}}});
    const LifePrior vague =
        life_prior(std::vector<PastLife>{{.life_h = 3000.0, .ln_sd = 0.9, .laws = {0.0, 1.0, 0.0, 0.0}}});
    EXPECT_NEAR(sure.median_h, std::exp((1.7857 * std::log(10000.0) + 4.0 * std::log(3000.0)) / 5.7857), 1.0);
    EXPECT_NEAR(vague.median_h, std::exp((1.7857 * std::log(10000.0) + 0.9434 * std::log(3000.0)) / 2.7291), 1.0);
}

TEST(LifePrior, IsTheDefaultWithoutLivesThatCount) {
    EXPECT_EQ(life_prior({}), LifePrior{});
    const double nan = std::numeric_limits<double>::quiet_NaN();
    EXPECT_EQ(life_prior(std::vector<PastLife>{{.life_h = nan}, {.life_h = 0.0}, {.life_h = 100.0, .ln_sd = nan}}),
              LifePrior{});
}

}  // namespace
}  // namespace slipledger::analytics

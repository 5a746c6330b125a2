#include "analytics/wear_prior.hpp"

#include <cmath>

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

const SectionSpec spec = testing::SimulatedSection{}.spec();  // 71 cm3 at 1480 rpm: 105.08 L/min
const Features at_reference{1.0, 1.0, 1.0};

double level_of(const WearBelief& belief) {
    return belief.mean.head<3>().array().exp().sum();
}

// reference: prior_belief - hand-worked: shares 1 : 0.15 : 0.06 of 2.42 L/min are 2, 0.3 and 0.12; variances 0.36 +
// 0.36, 0.49
TEST(WearPrior, SharesTheFirstLookAmongTheThreeTerms) {
    const WearBelief belief = prior_belief(spec, Basis::case_drain, 2.42, at_reference);
    EXPECT_NEAR(std::exp(belief.mean(ln_laminar)), 2.0, 1e-12);
    EXPECT_NEAR(std::exp(belief.mean(ln_orifice)), 0.3, 1e-12);
    EXPECT_NEAR(std::exp(belief.mean(ln_speed)), 0.12, 1e-12);
    EXPECT_NEAR(belief.covariance(ln_laminar, ln_laminar), 0.72, 1e-12);
    EXPECT_NEAR(belief.covariance(ln_orifice, ln_orifice), 0.85, 1e-12);
    EXPECT_NEAR(belief.covariance(ln_laminar, ln_orifice), 0.36, 1e-12);
    EXPECT_EQ(belief.covariance(ln_wear, ln_wear), 0.0);
    EXPECT_EQ(belief.covariance(displacement, displacement), 0.0);
    EXPECT_NEAR(std::sqrt(belief.covariance(meter_zero, meter_zero)), 0.02, 1e-12);
}

// reference: disturbance_spread - hand-worked: the two figures of its header, and their squares in the belief
TEST(WearPrior, LetsTheDisturbanceWanderFurtherByDelivery) {
    EXPECT_DOUBLE_EQ(disturbance_spread(Basis::case_drain), 0.03);
    EXPECT_DOUBLE_EQ(disturbance_spread(Basis::delivery), 0.05);
    const WearBelief belief = prior_belief(spec, Basis::delivery, 2.42, at_reference);
    EXPECT_DOUBLE_EQ(belief.covariance(disturbance, disturbance), 0.05 * 0.05);
}

// reference: prior_belief - hand-worked: 0.5 % and 15 % of 105.08 L/min; dV +-71 sqrt(0.012^2 + 0.005^2) = 0.923 cm3
TEST(WearPrior, HoldsAnAbsurdFirstLookWithinWhatPumpsLeak) {
    EXPECT_NEAR(level_of(prior_belief(spec, Basis::delivery, -3.0, at_reference)), 0.5254, 1e-9);
    const WearBelief belief = prior_belief(spec, Basis::delivery, 60.0, at_reference);
    EXPECT_NEAR(level_of(belief), 15.762, 1e-9);
    EXPECT_NEAR(std::sqrt(belief.covariance(displacement, displacement)), 0.923, 1e-9);
}

// reference: prior_belief - hand-worked: level of the maker's 3 L/min at the reference point, known to 0.15 beside 0.7
// loose
TEST(WearPrior, TakesItsLevelFromTheMakersTest) {
    SectionSpec tested = spec;
    tested.maker_test = MakerTest{.leakage_lpm = 3.0, .at = spec.reference};
    tested.watched_from_new = true;
    const WearBelief belief = prior_belief(tested, Basis::case_drain, 6.0, at_reference);
    EXPECT_NEAR(level_of(belief), 3.0, 1e-9);
    const Eigen::Vector3d shares = belief.mean.head<3>().array().exp() / 3.0;
    const double sd = std::sqrt(shares.dot(belief.covariance.topLeftCorner<3, 3>() * shares));
    EXPECT_NEAR(sd, 0.15, 0.005);
    EXPECT_EQ(belief.covariance(ln_wear, ln_wear), 0.0);
    tested.watched_from_new = false;  // what it wore before it was watched is then open
    EXPECT_NEAR(prior_belief(tested, Basis::case_drain, 6.0, at_reference).covariance(ln_wear, ln_wear), 0.1225, 1e-12);
}

}  // namespace
}  // namespace slipledger::analytics

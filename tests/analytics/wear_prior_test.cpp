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

// reference: leakage_state - hand-worked: 32e-6 x 852.9 = 0.02729 Pa s, the density at the reference's 50 degC
TEST(WearPrior, HeedsAMakersTestThatGivesViscosityAndNoTemperature) {
    const LeakageState at = leakage_state({210.0, 1480.0, unknown}, 32.0, spec);
    EXPECT_NEAR(at.viscosity_pas, 0.02729, 1e-5);
    SectionSpec tested = spec;
    tested.maker_test = MakerTest{.leakage_lpm = 3.0, .at = {210.0, 1480.0, unknown}, .viscosity_cst = 32.0};
    const Features f = features_at(at, reference_state(spec));
    const WearBelief belief = prior_belief(tested, Basis::case_drain, 6.0, at_reference);
    const Eigen::Vector3d features(f.laminar, f.orifice, f.speed);
    EXPECT_NEAR((belief.mean.head<3>().array().exp() * features.array()).sum(), 3.0, 1e-9);
}

// reference: prior_belief - hand-worked: the level of the sisters' 2.42 L/min, known to their 0.2; a worn pump that is taken
// over leaks twice that, and its wear is open by 0.35
TEST(WearPrior, TakesItsLevelFromSistersWhereNoTestIsTold) {
    SectionSpec sister = spec;
    sister.sisters = SistersFigure{.leakage_lpm = 2.42, .sd = 0.2, .count = 3};
    const WearBelief belief = prior_belief(sister, Basis::case_drain, 4.84, at_reference);
    EXPECT_NEAR(level_of(belief), 2.42, 1e-9);
    EXPECT_NEAR(belief.covariance(ln_wear, ln_wear), 0.1225, 1e-12);
    const Eigen::Vector3d shares = belief.mean.head<3>().array().exp() / 2.42;
    EXPECT_NEAR(std::sqrt(shares.dot(belief.covariance.topLeftCorner<3, 3>() * shares)), 0.2, 0.015);
    sister.maker_test = MakerTest{.leakage_lpm = 3.0, .at = spec.reference};
    EXPECT_NEAR(level_of(prior_belief(sister, Basis::case_drain, 4.84, at_reference)), 3.0, 1e-9);
}

// reference: baseline_kind - hand-worked: the order of its header
TEST(WearPrior, SaysWhatItRestsOn) {
    SectionSpec made = spec;
    EXPECT_EQ(baseline_kind(made), BaselineKind::watching_began);
    made.sisters = SistersFigure{2.42, 0.2, 1};
    EXPECT_EQ(name_of(baseline_kind(made)), "sisters");
    made.watched_from_new = true;
    EXPECT_EQ(name_of(baseline_kind(made)), "own, from new");
    made.maker_test = MakerTest{};
    EXPECT_EQ(name_of(baseline_kind(made)), "maker-test");
    made.maker_test->made_here = true;
    EXPECT_EQ(name_of(baseline_kind(made)), "reference-test");
}

// reference: zero_spread - hand-worked: 0.2 % of 71 x 1480 / 1000 = 105.08 L/min is 0.210
TEST(WearPrior, TakesAMetersAccuracyOrAFractionOfFlow) {
    SectionSpec made = spec;
    EXPECT_DOUBLE_EQ(zero_spread(made, Basis::delivery), 0.2);
    made.delivery_meter.accuracy_lpm = unknown;
    EXPECT_NEAR(zero_spread(made, Basis::delivery), 0.21016, 1e-9);
}

}  // namespace
}  // namespace slipledger::analytics

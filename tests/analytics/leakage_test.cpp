#include "analytics/leakage.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace slipledger::analytics {
namespace {

constexpr LeakageState reference{
    .pressure_rise_bar = 157.5, .viscosity_pas = 0.030, .density_kgm3 = 855.0, .speed_rpm = 1480.0};

// On paper: 210 / 157.5 = 1.3333, its root 1.1547; oil half as thick doubles the laminar term alone.
// reference: features_at - hand-worked: figures above
TEST(LeakageFeatures, AreOneAtTheReferencePointAndGoAsTheLawsSay) {
    const Features one = features_at(reference, reference);
    EXPECT_DOUBLE_EQ(one.laminar, 1.0);
    EXPECT_DOUBLE_EQ(one.orifice, 1.0);
    EXPECT_DOUBLE_EQ(one.speed, 1.0);
    LeakageState at = reference;
    at.pressure_rise_bar = 210.0;
    EXPECT_NEAR(features_at(at, reference).laminar, 1.3333, 1e-4);
    EXPECT_NEAR(features_at(at, reference).orifice, 1.1547, 1e-4);
    at = reference;
    at.viscosity_pas = 0.015;
    at.speed_rpm = -740.0;
    EXPECT_DOUBLE_EQ(features_at(at, reference).laminar, 2.0);
    EXPECT_DOUBLE_EQ(features_at(at, reference).orifice, 1.0);
    EXPECT_DOUBLE_EQ(features_at(at, reference).speed, 0.5);
}

TEST(LeakageFeatures, TakeSuctionForNoPressureAndKeepWhatIsUnknownUnknown) {
    LeakageState at = reference;
    at.pressure_rise_bar = -0.3;
    EXPECT_DOUBLE_EQ(features_at(at, reference).laminar, 0.0);
    at.pressure_rise_bar = unknown;
    EXPECT_TRUE(std::isnan(features_at(at, reference).laminar));
    EXPECT_TRUE(std::isnan(features_at(at, reference).orifice));
    EXPECT_TRUE(std::isnan(features_at(reference, {}).speed));
}

TEST(ReferenceState, TakesTheOilAtTheReferenceTemperature) {
    SectionSpec spec;
    spec.reference = {.pressure_bar = 210.0, .speed_rpm = 1480.0, .temperature_c = 40.0};
    const LeakageState state = reference_state(spec);
    EXPECT_DOUBLE_EQ(state.pressure_rise_bar, 210.0);
    EXPECT_NEAR(state.viscosity_pas, 0.0395, 1e-4);
    EXPECT_NEAR(state.density_kgm3, 859.2, 0.1);
}

// On paper: 2.0 * 1.2 + 0.3 * 1.1 + 0.12 * 1 = 2.85.
// reference: healthy_leakage_lpm - hand-worked: figures above
TEST(HealthyLeakage, IsTheSumOfItsTerms) {
    EXPECT_NEAR(healthy_leakage_lpm({2.0, 0.3, 0.12}, {1.2, 1.1, 1.0}), 2.85, 1e-12);
}

// On paper: 5e-5 m3/s * 0.040 Pa s / (71e-6 / 6.28319 m3 * 2e7 Pa) = 8.85e-9.
// reference: slip_coefficient - hand-worked: figures above
TEST(SlipCoefficient, OfAWorkedExample) {
    EXPECT_NEAR(slip_coefficient({3.0, 0.040, 71.0, 200.0}), 8.85e-9, 0.005e-9);
    EXPECT_TRUE(std::isnan(slip_coefficient({3.0, 0.040, 71.0, 0.0})));
    EXPECT_TRUE(std::isnan(slip_coefficient({-0.1, 0.040, 71.0, 200.0})));
}

// On paper: all laminar, g = cube root of 2 = 1.25992. Shares 1 : 0.15 : 0.06 and w = 2: g^3 + 0.21 g = 2.42 has its
// root at 1.29046 (2.14900 + 0.27100 = 2.42000). No laminar part: g = w.
//
// reference: clearance_growth - hand-worked: figures above
TEST(ClearanceGrowth, SolvesTheCubicOfTheGap) {
    EXPECT_NEAR(clearance_growth({1.0, 0.0, 0.0}, 2.0), 0.25992, 1e-5);
    EXPECT_NEAR(clearance_growth({1.0, 0.15, 0.06}, 2.0), 0.29046, 1e-5);
    EXPECT_NEAR(clearance_growth({0.0, 0.2, 0.1}, 1.5), 0.5, 1e-12);
    EXPECT_NEAR(clearance_growth({3.0, 0.45, 0.18}, 1.0), 0.0, 1e-12);
    EXPECT_NEAR(clearance_growth({1.0, 0.0, 0.0}, 0.125), -0.5, 1e-12);
}

TEST(ClearanceGrowth, IsUnknownWithoutLeakageOrRatio) {
    EXPECT_TRUE(std::isnan(clearance_growth({0.0, 0.0, 0.0}, 2.0)));
    EXPECT_TRUE(std::isnan(clearance_growth({1.0, 0.0, 0.0}, 0.0)));
    EXPECT_TRUE(std::isnan(clearance_growth({1.0, 0.0, 0.0}, unknown)));
}

// reference: leakage_law, leakage_lpm - hand-worked: 2 x 0.0274 / 210, 0.3 / sqrt(210 / 853), 0.12 / 1480; then 150 bar at
// 0.040 Pa s: 0.9786 + 0.2535 + 0.1200
TEST(LeakageLaw, CarriesHealthyLeakageToAnotherPointAndOil) {
    const LeakageState reference{210.0, 0.0274, 853.0, 1480.0};
    const LeakageLaw law = leakage_law({2.0, 0.3, 0.12}, reference);
    EXPECT_NEAR(law.laminar, 2.6095e-4, 1e-8);
    EXPECT_NEAR(law.orifice, 0.60463, 1e-5);
    EXPECT_NEAR(law.speed, 8.1081e-5, 1e-9);
    EXPECT_NEAR(leakage_lpm(law, {150.0, 0.040, 853.0, 1480.0}), 1.3521, 1e-4);
    EXPECT_NEAR(leakage_lpm(law, reference), 2.42, 1e-12);
    EXPECT_TRUE(std::isnan(leakage_lpm({}, reference)));
    EXPECT_TRUE(std::isnan(leakage_law({2.0, 0.3, 0.12}, {0.0, 0.0274, 853.0, 1480.0}).laminar));
}

}  // namespace
}  // namespace slipledger::analytics

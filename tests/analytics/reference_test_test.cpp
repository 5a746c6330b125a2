#include "analytics/reference_test.hpp"

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

const SectionSpec spec = testing::SimulatedSection{}.spec();  // 71 cm3; 210 bar, 1480 rpm, 50 degC

// reference: tested_leakage - hand-worked: 3 % of 3.3 is 0.099; at half the pressure f1 is 0.5, f2 sqrt 0.5
TEST(ReferenceTest, OfTheDrainIsTheLeakageItself) {
    ReferenceTest test{.flow_lpm = 3.3, .at = spec.reference};
    const auto tested = tested_leakage(test, spec);
    ASSERT_TRUE(tested);
    EXPECT_DOUBLE_EQ(tested->leakage_lpm, 3.3);
    EXPECT_NEAR(tested->sd_lpm, 0.099, 1e-12);
    EXPECT_NEAR(tested->features.laminar, 1.0, 1e-12);
    test.at.pressure_bar = 105.0;
    EXPECT_NEAR(tested_leakage(test, spec)->features.laminar, 0.5, 1e-12);
    EXPECT_NEAR(tested_leakage(test, spec)->features.orifice, 0.70711, 1e-5);
}

// reference: tested_leakage - hand-worked: 71 x 1480 / 1000 = 105.08 less 101.0 delivered leaves 4.08
TEST(ReferenceTest, OfTheDeliveryIsWhatIsMissingOfTheoreticalFlow) {
    const ReferenceTest test{.of = Basis::delivery, .flow_lpm = 101.0, .at = spec.reference, .accuracy = 0.01};
    EXPECT_NEAR(tested_leakage(test, spec)->leakage_lpm, 4.08, 1e-9);
    EXPECT_NEAR(tested_leakage(test, spec)->sd_lpm, 1.01, 1e-12);
}

// reference: tested_leakage - hand-worked: twice the reference's viscosity halves f1, whatever the temperature
TEST(ReferenceTest, TakesAMeasuredViscosityForTheOils) {
    ReferenceTest test{.flow_lpm = 2.0, .at = {210.0, 1480.0, unknown}};
    EXPECT_FALSE(tested_leakage(test, spec));  // neither temperature nor viscosity
    test.viscosity_cst = 2.0 * spec.fluid.kinematic_cst(50.0);
    EXPECT_NEAR(tested_leakage(test, spec)->features.laminar, 0.5, 1e-12);
    test.at.speed_rpm = 0.0;
    EXPECT_FALSE(tested_leakage(test, spec));
}

}  // namespace
}  // namespace slipledger::analytics

#include "analytics/flow.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "analytics/units.hpp"

namespace slipledger::analytics {
namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();

// A worked test-stand line: 71 cm3/rev at 1480 rpm sweeps 105.08 L/min; 98.7 arrive, 3.1 run out of the case.
// reference: theoretical_flow_lpm, efficiency_by_delivery, efficiency_by_drain - hand-worked: ISO 4409's definition of
// volumetric efficiency on the line above: 98.7 / 105.08 = 0.93928, 1 - 3.1 / 105.08 = 0.97050
TEST(VolumetricEfficiency, FollowsTheDefinitionOnAWorkedTestStandLine) {
    const double swept = theoretical_flow_lpm(71.0, 1480.0);
    EXPECT_NEAR(swept, 105.08, 1e-9);
    EXPECT_NEAR(efficiency_by_delivery(98.7, swept), 0.93928, 1e-5);
    EXPECT_NEAR(efficiency_by_drain(3.1, swept), 0.97050, 1e-5);
}

TEST(VolumetricEfficiency, IsUnknownWithoutTheoreticalFlow) {
    EXPECT_TRUE(std::isnan(efficiency_by_delivery(1.0, 0.0)));
    EXPECT_TRUE(std::isnan(efficiency_by_drain(1.0, nan)));
}

TEST(TheoreticalFlow, GoesWithTheStroke) {
    EXPECT_DOUBLE_EQ(theoretical_flow_lpm(100.0, 1500.0, 0.4), 60.0);
    EXPECT_DOUBLE_EQ(theoretical_flow_lpm(100.0, 1500.0, -1.0), -150.0);
}

// kW from base units: 1 bar = 1e5 N/m2, 1 L/min = 1e-3 / 60 m3/s. Horsepower: 550 foot-pounds a second.
// reference: hydraulic_power_kw - outside: the trade's hp = gpm psi / 1714 (exactly 1714.29) and kW = bar L/min / 600
TEST(HydraulicPower, AgreesWithTheTradesFormulasAndWithBaseUnits) {
    EXPECT_DOUBLE_EQ(hydraulic_power_kw(200.0, 60.0), 20.0);
    EXPECT_NEAR(hydraulic_power_kw(173.0, 41.0), 173.0e5 * 41.0e-3 / 60.0 / 1000.0, 1e-12);
    const double bar = to_canonical(3000.0, *unit_named(Quantity::outlet_pressure, "psi"));
    const double lpm = to_canonical(20.0, *unit_named(Quantity::delivery_flow, "gpm"));
    const double hp = from_canonical(hydraulic_power_kw(bar, lpm), *unit_named(Quantity::shaft_power, "hp"));
    // 1714 is 231 cubic inches and 33 000 foot-pounds a minute, rounded: 12 * 33000 / 231 = 1714.2857.
    EXPECT_NEAR(hp, 20.0 * 3000.0 / (12.0 * 33000.0 / 231.0), 1e-9);
    EXPECT_NEAR(hp / (20.0 * 3000.0 / 1714.0), 1.0, 2e-4);
}

// On paper: 100 / (1 - 250 / 14000) = 101.818.
// reference: to_inlet_density_lpm - hand-worked: figures above; method.md: 1.5 to 1.8 % at 250 bar
TEST(InletDensity, GivesBackWhatCompressionTook) {
    EXPECT_NEAR(to_inlet_density_lpm(100.0, 250.0, 1.4), 101.818, 0.001);
    EXPECT_DOUBLE_EQ(to_inlet_density_lpm(100.0, 0.0, 1.4), 100.0);
    EXPECT_TRUE(std::isnan(to_inlet_density_lpm(100.0, 250.0, 0.0)));
    EXPECT_TRUE(std::isnan(to_inlet_density_lpm(100.0, 14000.0, 1.4)));
}

// On paper: 1e7 Pa (1 - 0.0007 * 323.15) / (860 * 1900) = 4.736 K.
// reference: heating_of_leaked_oil_k - hand-worked: figures above; method.md: about 4.7 K per 100 bar
TEST(LeakedOil, WarmsByNearlyFiveKelvinForAHundredBar) {
    EXPECT_NEAR(heating_of_leaked_oil_k({.pressure_drop_bar = 100.0, .temperature_c = 50.0, .density_kgm3 = 860.0}),
                4.736, 0.001);
    EXPECT_TRUE(std::isnan(heating_of_leaked_oil_k({100.0, 50.0, 0.0})));
}

// On paper: 1500 (1 - 0.015 * 140 / 280) = 1488.75.
// reference: motor_speed_rpm - hand-worked: figures above
TEST(MotorSpeed, FallsWithPressureAndIsConstantWithoutSlip) {
    EXPECT_DOUBLE_EQ(motor_speed_rpm({1500.0, 0.015, 140.0, 280.0}), 1488.75);
    EXPECT_DOUBLE_EQ(motor_speed_rpm({1500.0, 0.015, -0.5, 280.0}), 1500.0);
    EXPECT_DOUBLE_EQ(motor_speed_rpm({1500.0, 0.0, nan, nan}), 1500.0);
    EXPECT_TRUE(std::isnan(motor_speed_rpm({1500.0, 0.015, 140.0, nan})));
}

}  // namespace
}  // namespace slipledger::analytics

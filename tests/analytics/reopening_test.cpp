#include "analytics/reopening.hpp"

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

const SectionSpec spec = testing::SimulatedSection{}.spec();

// Something is known of everything, and of each thing together with the next.
WearBelief settled_belief() {
    WearBelief belief;
    belief.mean.setConstant(0.2);
    belief.covariance.setConstant(0.0001);
    belief.covariance.diagonal().setConstant(0.0004);
    return belief;
}

FactChange instrument(Quantity quantity) {
    FactChange change;
    change.instruments = static_cast<std::uint16_t>(1U << index_of(quantity));
    return change;
}

// reference: open_for - hand-worked: 0.0004 + 0.058^2 = 0.003764, all else untouched
TEST(Reopening, ForAnOilByItsLabelOpensTheLaminarTermAlone) {
    WearBelief belief = settled_belief();
    open_for(belief, {.oil = true, .oil_by_label = true}, spec, Basis::case_drain);
    EXPECT_NEAR(belief.covariance(ln_laminar, ln_laminar), 0.003764, 1e-12);
    belief.covariance(ln_laminar, ln_laminar) = 0.0004;
    EXPECT_EQ(belief.covariance, settled_belief().covariance);
    open_for(belief, {.oil = true}, spec, Basis::case_drain);
    EXPECT_EQ(belief.covariance, settled_belief().covariance) << "a measured viscosity leaves nothing open";
}

// reference: open_for - hand-worked: zero +-0.02 L/min of the meter again; 0.0004 + 0.35^2 = 0.1229 common to a, b, c
TEST(Reopening, ForANewDrainMeterForgetsTheZeroAndOpensTheLevel) {
    WearBelief belief = settled_belief();
    open_for(belief, instrument(Quantity::case_drain_flow), spec, Basis::case_drain);
    EXPECT_EQ(belief.mean(meter_zero), 0.0);
    EXPECT_NEAR(belief.covariance(meter_zero, meter_zero), 0.0004, 1e-12);
    EXPECT_EQ(belief.covariance(meter_zero, ln_laminar), 0.0);
    EXPECT_NEAR(belief.covariance(ln_laminar, ln_laminar), 0.1229, 1e-12);
    EXPECT_NEAR(belief.covariance(ln_laminar, ln_speed), 0.1226, 1e-12);
    EXPECT_NEAR(belief.covariance(ln_wear, ln_wear), 0.0004, 1e-12);
    EXPECT_EQ(belief.mean(ln_wear), 0.2);
    WearBelief other = settled_belief();
    open_for(other, instrument(Quantity::delivery_flow), spec, Basis::case_drain);
    EXPECT_EQ(other.covariance, settled_belief().covariance) << "another basis' meter";
}

// reference: open_for - hand-worked: (0.03 x 71)^2 = 4.5369 and (0.01 x 71)^2 = 0.5041 cm6 on top of 0.0004
TEST(Reopening, ByDeliveryTakesAGainForADisplacement) {
    WearBelief belief = settled_belief();
    open_for(belief, instrument(Quantity::delivery_flow), spec, Basis::delivery);
    EXPECT_NEAR(belief.covariance(displacement, displacement), 4.5373, 1e-12);
    EXPECT_NEAR(belief.covariance(ln_laminar, ln_laminar), 0.0004, 1e-12);
    WearBelief speed = settled_belief();
    open_for(speed, instrument(Quantity::shaft_speed), spec, Basis::delivery);
    EXPECT_NEAR(speed.covariance(displacement, displacement), 0.5045, 1e-12);
}

// reference: open_for - hand-worked: 0.0004 + 0.1^2 = 0.0104, + 0.05^2 = 0.0029
TEST(Reopening, ForAGaugeOrAThermometerOpensWhatTheyWouldMove) {
    WearBelief gauge = settled_belief();
    open_for(gauge, instrument(Quantity::outlet_pressure), spec, Basis::case_drain);
    EXPECT_NEAR(gauge.covariance(ln_laminar, ln_laminar), 0.0104, 1e-12);
    EXPECT_NEAR(gauge.covariance(ln_orifice, ln_orifice), 0.0029, 1e-12);
    WearBelief thermometer = settled_belief();
    open_for(thermometer, instrument(Quantity::fluid_temperature), spec, Basis::case_drain);
    EXPECT_NEAR(thermometer.covariance(ln_laminar, ln_laminar), 0.0104, 1e-12);
    EXPECT_NEAR(thermometer.covariance(ln_orifice, ln_orifice), 0.0004, 1e-12);
}

}  // namespace
}  // namespace slipledger::analytics

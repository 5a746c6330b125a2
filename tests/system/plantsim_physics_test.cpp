#include <gtest/gtest.h>

#include <cmath>

#include "tools/plantsim/gap.hpp"
#include "tools/plantsim/oil.hpp"
#include "tools/plantsim/section.hpp"
#include "tools/plantsim/veneer_mill.hpp"

namespace slipledger::plantsim {
namespace {

const Oil vg46{.at_40_cst = 46.0, .at_100_cst = 6.8, .thinning_per_year = 0.0};

TEST(PlantsimOil, GoesThroughBothMeasuredPoints) {
    EXPECT_NEAR(kinematic_cst(vg46, 40.0, 0.0), 46.0, 1e-9);
    EXPECT_NEAR(kinematic_cst(vg46, 100.0, 0.0), 6.8, 1e-9);
}

// Worked by hand from log10 log10 (nu + 0.7) = A - B log10 T: at 40 degC the left side is 0.222450, at 100 degC
// -0.056516, log10 T 2.495752 and 2.571883; at 60 degC log10 T is 2.522640, so the left side 0.123928, nu 20.61.
TEST(PlantsimOil, LiesOnTheStraightLineBetweenThem) {
    EXPECT_NEAR(kinematic_cst(vg46, 60.0, 0.0), 20.61, 0.05);
}

// Gap heating and the thickening by pressure nearly cancel (method: at 280 bar one alone changes leakage by 12 %).
TEST(PlantsimOil, HeatingAndThickeningInAGapNearlyCancel) {
    const double free_pas = gap_viscosity_pas(vg46, 50.0, 0.0, 0.0);
    EXPECT_NEAR(gap_viscosity_pas(vg46, 50.0, 280.0, 0.0) / free_pas, 1.0, 0.08);
}

// pi 0.024 (27e-6)^3 / (12 0.035) = 3.533e-15 m3, by hand.
TEST(PlantsimGap, HasTheConductanceOfTheTextbookAnnulus) {
    EXPECT_NEAR(annulus_conductance(1, 0.024, 0.035, 27e-6), 3.533e-15, 0.001e-15);
}

TEST(PlantsimGap, LeaksEightTimesAsMuchAtTwiceTheHeight) {
    const Gap gap{.name = "slot", .conductance_m3 = 1e-14, .area_m2 = 1e-4, .wears = 1.0};
    const Strain healthy{.pressure_bar = 200.0, .speed_rpm = 1480.0};
    Strain worn = healthy;
    worn.growth = 2.0;
    const double ratio = gap_flow_lpm(gap, vg46, worn, 280.0) / gap_flow_lpm(gap, vg46, healthy, 280.0);
    EXPECT_NEAR(ratio, 8.0, 0.01);
}

// Otherwise the judging side would be shown its own model: a hole goes with the root of pressure, a slot with pressure,
// and plates that close up with less than that.
TEST(PlantsimGap, DoesNotFollowOneLawOnly) {
    const auto gain = [](const Gap& gap) {
        const auto at = [&](double bar) {
            return gap_flow_lpm(gap, vg46, {.pressure_bar = bar, .speed_rpm = 1480.0}, 280.0);
        };
        return at(200.0) / at(100.0);
    };
    EXPECT_NEAR(gain({.name = "hole", .conductance_m3 = 1e-30, .hole_m2 = 1e-7}), std::sqrt(2.0), 0.01);
    EXPECT_NEAR(gain({.name = "slot", .conductance_m3 = 1e-14}), 2.0, 0.08);
    EXPECT_LT(gain({.name = "plates", .conductance_m3 = 1e-14, .opens_with_pressure = -0.25}), 1.6);
}

TEST(PlantsimSection, FindsTheGrowthThatGivesARatio) {
    const PlantDrawing mill = veneer_mill();
    const PumpDrawing& press = mill.pumps.front();
    const Life& life = press.sections[0].lives[0];
    const Seen seen = seen_by(press.sections[0].fitted);
    const double growth = growth_for(life, seen, vg46, press.rated, 2.5);
    EXPECT_NEAR(true_ratio(life, seen, vg46, press.rated, growth), 2.5, 1e-6);
    EXPECT_GT(growth, 1.3);  // not the cube root of 2.5 for all gaps alike: some do not wear
}

// Compressibility takes 1.5 to 1.8 % of delivery at 250 bar (method.md, 1).
TEST(PlantsimOil, ShrinksByOneAndAHalfPerCentAtPressPressure) {
    EXPECT_NEAR(compression(50.0, 250.0), 0.0168, 0.0015);
}

}  // namespace
}  // namespace slipledger::plantsim

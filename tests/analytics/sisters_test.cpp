#include "analytics/sisters.hpp"

#include <array>
#include <cmath>

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

const SectionSpec spec = testing::SimulatedSection{}.spec();  // 71 cm3

Sister sister(double leakage_lpm, double displacement_cm3 = 71.0, double sd = 0.03) {
    const double laminar = leakage_lpm * 0.8;
    return {leakage_law({laminar, leakage_lpm - laminar, 0.0}, reference_state(spec)), sd, displacement_cm3};
}

// reference: sisters_figure - hand-worked: s^2 = 2 x 0.0225 / 2 = 0.0225; sd^2 = 2 x 0.0225 + 0.0009 = 0.0459
TEST(Sisters, OneAloneIsAsGoodAsPartsOfAModelAreAlike) {
    const auto figure = sisters_figure(std::array{sister(2.42)}, spec);
    ASSERT_TRUE(figure);
    EXPECT_NEAR(figure->leakage_lpm, 2.42, 1e-9);
    EXPECT_NEAR(figure->sd, std::sqrt(0.0459), 1e-9);
    EXPECT_EQ(figure->count, 1);
}

// reference: sisters_figure - hand-worked: 4 L/min of 140 cm3 are 4 x 71 / 140 = 2.0286; with 2.5 and 3.0 of 71 cm3 the
// geometric mean is cbrt(2.0286 x 2.5 x 3) = 2.4779; logs less their mean: -0.20005, 0.00889, 0.19122
TEST(Sisters, MeetInTheirGeometricMeanScaledByDisplacement) {
    const auto figure = sisters_figure(std::array{sister(4.0, 140.0), sister(2.5), sister(3.0)}, spec);
    EXPECT_NEAR(figure->leakage_lpm, 2.4779, 1e-4);
    const double squares = 0.20005 * 0.20005 + 0.00889 * 0.00889 + 0.19122 * 0.19122;
    const double scatter = (2.0 * 0.0225 + squares) / 4.0;
    EXPECT_NEAR(figure->sd, std::sqrt(scatter * 4.0 / 3.0 + 0.0009 / 3.0), 1e-4);
}

// reference: sisters_figure - hand-worked: laminar leakage in an oil of half the viscosity is twice as much
TEST(Sisters, AreHeldAgainstThisSectionsOwnOilAndPoint) {
    SectionSpec thin = spec;
    thin.fluid = *Fluid::from_points({40.0, 23.0}, {100.0, 4.5});
    const double by = spec.fluid.dynamic_pas(50.0) / thin.fluid.dynamic_pas(50.0);
    const Sister laminar{leakage_law({2.0, 0.0, 0.0}, reference_state(spec)), 0.03, 71.0};
    EXPECT_NEAR(sisters_figure(std::array{laminar}, thin)->leakage_lpm, 2.0 * by, 1e-9);
}

TEST(Sisters, OfWhomNothingIsKnownSayNothing) {
    EXPECT_FALSE(sisters_figure({}, spec));
    EXPECT_FALSE(sisters_figure(std::array{Sister{}}, spec));
}

}  // namespace
}  // namespace slipledger::analytics

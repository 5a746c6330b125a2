#include "analytics/instrument_watch.hpp"

#include <functional>

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

using testing::Shown;
using testing::simulate;
using testing::SimulatedSection;

constexpr double fails_at = 400.0;  // running hours

Signs signs_after(SimulatedSection section, InstrumentWatch& watch) {
    section.days = 36;
    for (const auto& hour : simulate(section)) watch.add(hour.summary, section.spec());
    Signs signs;
    watch.fill(signs);
    return signs;
}

SimulatedSection failing(Basis basis, const std::function<void(Shown&)>& fail) {
    SimulatedSection section{.seed = 3, .basis = basis};
    section.instruments = [fail](Shown& shown, double running_h) {
        if (running_h >= fails_at) fail(shown);
    };
    return section;
}

void expect_only(const Signs& signs, Sign wanted, Quantity quantity) {
    for (const Sign sign : {Sign::unit_jump, Sign::stuck, Sign::off_the_scale, Sign::missing, Sign::contradicting})
        EXPECT_EQ(signs[sign].strength > 0.0, sign == wanted) << name_of(sign);
    EXPECT_EQ(signs[wanted].quantity, quantity);
}

// reference: InstrumentWatch::fill - outside: truth of the simulation, in which nothing fails
TEST(InstrumentWatch, FindsNothingWhereNothingFails) {
    for (const Basis basis : {Basis::case_drain, Basis::delivery}) {
        InstrumentWatch watch;
        const Signs signs = signs_after({.seed = 4, .basis = basis}, watch);
        for (const Sign sign : {Sign::unit_jump, Sign::stuck, Sign::off_the_scale, Sign::missing, Sign::contradicting,
                                Sign::flow_at_standstill})
            EXPECT_EQ(signs[sign].strength, 0.0) << name_of(sign);
        EXPECT_FALSE(watch.broken());
    }
}

// reference: InstrumentWatch::fill - outside: truth of the simulation, one instrument stands still from hour 400 on
TEST(InstrumentWatch, FindsTheOneThatStandsStill) {
    const std::vector<std::pair<std::function<void(Shown&)>, Quantity>> cases{
        {[](Shown& s) { s.flow_lpm = 2.0; }, Quantity::case_drain_flow},
        {[](Shown& s) { s.pressure_bar = 181.0; }, Quantity::outlet_pressure},
        {[](Shown& s) { s.speed_rpm = 1475.0; }, Quantity::shaft_speed},
        {[](Shown& s) { s.temperature_c = 46.0; }, Quantity::fluid_temperature}};
    for (const auto& [fail, quantity] : cases) {
        InstrumentWatch watch;
        const Signs signs = signs_after(failing(Basis::case_drain, fail), watch);
        expect_only(signs, Sign::stuck, quantity);
        EXPECT_TRUE(watch.broken()) << name_of(quantity);
    }
}

// reference: InstrumentWatch::fill - outside: truth of the simulation, one instrument speaks another unit from hour 400
// on
TEST(InstrumentWatch, FindsTheOneThatSpeaksAnotherUnit) {
    const std::vector<std::tuple<Basis, std::function<void(Shown&)>, Quantity>> cases{
        {Basis::case_drain, [](Shown& s) { s.flow_lpm /= 3.785; }, Quantity::case_drain_flow},
        {Basis::delivery, [](Shown& s) { s.flow_lpm /= 3.785; }, Quantity::delivery_flow},
        {Basis::case_drain, [](Shown& s) { s.pressure_bar /= 10.0; }, Quantity::outlet_pressure},
        {Basis::delivery, [](Shown& s) { s.speed_rpm /= 60.0; }, Quantity::shaft_speed},
        {Basis::case_drain, [](Shown& s) { s.temperature_c = 1.8 * s.temperature_c + 32.0; },
         Quantity::fluid_temperature}};
    for (const auto& [basis, fail, quantity] : cases) {
        InstrumentWatch watch;
        const Signs signs = signs_after(failing(basis, fail), watch);
        EXPECT_EQ(signs[Sign::unit_jump].strength, 1.0) << name_of(quantity);
        EXPECT_EQ(signs[Sign::unit_jump].quantity, quantity);
    }
}

// reference: InstrumentWatch::fill - hand-worked: pressure and drain fall together tenfold, a pump that runs idle
TEST(InstrumentWatch, DoesNotTakeAPumpThatRunsIdleForAnotherUnit) {
    InstrumentWatch watch;
    const Signs signs = signs_after(failing(Basis::case_drain,
                                            [](Shown& s) {
                                                s.pressure_bar /= 10.0;
                                                s.flow_lpm /= 10.0;
                                            }),
                                    watch);
    EXPECT_EQ(signs[Sign::unit_jump].strength, 0.0);
}

// reference: InstrumentWatch::fill - hand-worked: 300 degF as degC, and a broken wire that stands at full scale
TEST(InstrumentWatch, FindsTheOneThatIsOffTheScale) {
    InstrumentWatch hot;
    const Signs burnt = signs_after(failing(Basis::case_drain, [](Shown& s) { s.temperature_c += 100.0; }), hot);
    expect_only(burnt, Sign::off_the_scale, Quantity::fluid_temperature);
    EXPECT_DOUBLE_EQ(burnt[Sign::off_the_scale].beside, 120.0);
    InstrumentWatch wire;
    const Signs dead = signs_after(failing(Basis::case_drain, [](Shown& s) { s.flow_lpm = 0.0; }), wire);
    expect_only(dead, Sign::off_the_scale, Quantity::case_drain_flow);
    EXPECT_TRUE(wire.broken());
}

// reference: InstrumentWatch::fill - hand-worked: counts and stops as given
TEST(InstrumentWatch, FindsReadingsThatStayAwayContradictOrFlowAtStandstill) {
    SimulatedSection section{.seed = 5};
    section.spoil = [](Summary& hour, double running_h) {
        if (running_h < fails_at) return;
        hour.counts[static_cast<std::size_t>(Standing::full_flow)] = 1;
        hour.counts[static_cast<std::size_t>(Standing::no_temperature)] = 5;
        hour.stop_count = 6;
        hour.stop_flow_lpm = 1.6;
    };
    InstrumentWatch watch;
    const Signs signs = signs_after(section, watch);
    EXPECT_EQ(signs[Sign::missing].strength, 1.0);
    EXPECT_EQ(signs[Sign::missing].quantity, Quantity::fluid_temperature);
    EXPECT_EQ(signs[Sign::flow_at_standstill].strength, 1.0);
    section.spoil = [](Summary& hour, double running_h) {
        if (running_h < fails_at) return;
        hour.counts[static_cast<std::size_t>(Standing::full_flow)] = 2;
        hour.counts[static_cast<std::size_t>(Standing::impossible)] = 4;
    };
    InstrumentWatch other;
    EXPECT_EQ(signs_after(section, other)[Sign::contradicting].strength, 1.0);
}

}  // namespace
}  // namespace slipledger::analytics
